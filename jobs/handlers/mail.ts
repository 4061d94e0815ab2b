import { mkdir, rename, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { createTransport } from 'nodemailer';
import { claimMail, markSent, markUnsent, type MailRow } from '../../db/repositories/mails';
import type { MailRule } from '../../db/repositories/runWork';
import type { MailConfig } from '../config';
import type { Payload } from '../queue/jobs';
import type { Context } from './context';

const MOST_TRIES = 10;

/** What is written when a long run has ended. */
export function mailRule({ afterSeconds, publicUrl }: MailConfig): MailRule {
  return {
    afterSeconds,
    compose(ended) {
      const run = `Run ${ended.number} of “${oneLine(ended.datasetName)}”`;
      const how = ended.state === 'done' ? 'is done' : 'has failed';
      const path = `/workspaces/${ended.workspaceId}/runs/${ended.id}`;
      const address = publicUrl ? `\n\n${publicUrl.replace(/\/$/, '')}${path}` : '';
      const why = ended.failureMessage ? `\n\n${ended.failureMessage}` : '';
      return {
        subject: `${run} ${how}`,
        body: `${oneLine(ended.recipientName)},\n\n${run} ${how} after ${Math.round(ended.seconds)} s.${why}${address}\n`,
      };
    },
  };
}

/** A name must not begin a header or a paragraph of its own. */
const oneLine = (text: string): string => text.replace(/\p{Cc}+/gu, ' ').trim();

/** Sends one message by SMTP, or puts it into a folder, or notes that there is neither. */
export async function mail({ mailId }: Payload<'mail'>, { db, config }: Context): Promise<void> {
  const row = await claimMail(db, mailId);
  if (!row) return;
  const { smtpUrl, folder } = config.mail;
  if (row.tries > MOST_TRIES) {
    return markUnsent(db, mailId, `Given up after ${MOST_TRIES} tries.`);
  }
  if (smtpUrl !== null) {
    await send(row, smtpUrl, config.mail.from);
    return markSent(db, mailId);
  }
  if (folder === null) return markUnsent(db, mailId, 'No SMTP server is configured.');
  await file(row, folder, config.mail.from);
  await markUnsent(db, mailId, 'No SMTP server is configured; written to the folder of messages.');
}

const message = ({ id, recipient, subject, body }: MailRow, from: string) => ({
  from,
  to: { name: '', address: recipient },
  subject,
  text: body,
  // The same on every try, so that a mail server can drop a repeat.
  messageId: `<${id}@heddle>`,
});

async function send(row: MailRow, smtpUrl: string, from: string): Promise<void> {
  const transport = createTransport(smtpUrl, {});
  try {
    await transport.sendMail(message(row, from));
  } finally {
    transport.close();
  }
}

async function file(row: MailRow, folder: string, from: string): Promise<void> {
  const transport = createTransport({ streamTransport: true, buffer: true, newline: 'windows' });
  const { message: bytes } = await transport.sendMail(message(row, from));
  await mkdir(folder, { recursive: true });
  const name = join(folder, `${row.id}.eml`);
  await writeFile(`${name}.part`, bytes as Buffer);
  await rename(`${name}.part`, name);
}
