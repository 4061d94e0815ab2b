import { once } from 'node:events';
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { SMTPServer } from 'smtp-server';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { createMail } from '../../db/repositories/mails';
import { mails } from '../../db/schema/index';
import { Workshop, until } from '../support/workshop';

describe('a message', () => {
  let workshop: Workshop;
  beforeAll(async () => {
    workshop = await Workshop.open();
  });
  afterAll(() => workshop.close());

  const write = (workspaceId: string, subject: string) =>
    workshop.db.transaction((tx) =>
      createMail(tx, workspaceId, { recipient: 'ada@example.org', subject, body: 'Done.\n' }),
    );
  const settled = (subject: string) =>
    until(
      async () => (await workshop.db.select().from(mails)).find((row) => row.subject === subject),
      (row) => row !== undefined && (row.sentAt !== null || row.note !== null),
    );

  test('goes out by SMTP, once', async () => {
    const received: string[] = [];
    const smtp = new SMTPServer({
      authOptional: true,
      disabledCommands: ['STARTTLS'],
      onData(stream, _session, done) {
        const parts: Buffer[] = [];
        stream.on('data', (part: Buffer) => parts.push(part));
        stream.on('end', () => {
          received.push(Buffer.concat(parts).toString());
          done();
        });
      },
    });
    smtp.listen(0, '127.0.0.1');
    await once(smtp.server, 'listening');
    const { port } = smtp.server.address() as AddressInfo;
    workshop.startWorker({ SMTP_URL: `smtp://127.0.0.1:${port}` });
    const { scope } = await workshop.bring({
      nodeCount: 0,
      edges: new Uint32Array(),
      values: new Float64Array(),
    });
    await write(scope.workspaceId, 'By post');
    expect((await settled('By post'))?.sentAt).not.toBeNull();
    expect(received).toHaveLength(1);
    expect(received[0]).toContain('Subject: By post');
    expect(received[0]).toContain('To: ada@example.org');
    await workshop.endWorkers();
    await new Promise<void>((resolve) => void smtp.close(resolve));
  });

  test('without an SMTP server is put into the folder, or says that there is neither', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'heddle-mail-'));
    const { scope } = await workshop.bring({
      nodeCount: 0,
      edges: new Uint32Array(),
      values: new Float64Array(),
    });
    workshop.startWorker({ HEDDLE_MAIL_DIR: folder });
    await write(scope.workspaceId, 'Into the folder');
    expect((await settled('Into the folder'))?.note).toContain('folder');
    const [file = ''] = readdirSync(folder);
    expect(readFileSync(join(folder, file), 'utf8')).toContain('Subject: Into the folder');
    await workshop.endWorkers();
    workshop.startWorker();
    await write(scope.workspaceId, 'Nowhere');
    expect((await settled('Nowhere'))?.note).toBe('No SMTP server is configured.');
    rmSync(folder, { recursive: true });
  });
});
