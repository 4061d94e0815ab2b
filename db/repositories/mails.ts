import { and, eq, isNull, sql } from 'drizzle-orm';
import type { Db, Transaction } from '../client';
import { mails } from '../schema/index';
import { addToOutbox } from './outbox';

export type MailRow = typeof mails.$inferSelect;

export interface NewMail {
  readonly recipient: string;
  readonly subject: string;
  readonly body: string;
}

/** Writes a message and the row that will enqueue it. */
export async function createMail(
  tx: Transaction,
  workspaceId: string,
  mail: NewMail,
): Promise<void> {
  const [row] = await tx
    .insert(mails)
    .values({ workspaceId, ...mail })
    .returning({ id: mails.id });
  if (!row) throw new Error('An inserted mail was not returned.');
  await addToOutbox(tx, workspaceId, { kind: 'mail', payload: { mailId: row.id } });
}

/** @returns the message, if it still waits to be sent, with `tries` raised; else null. */
export async function claimMail(db: Db, mailId: string): Promise<MailRow | null> {
  const [row] = await db
    .update(mails)
    .set({ tries: sql`${mails.tries} + 1` })
    .where(and(eq(mails.id, mailId), isNull(mails.sentAt), isNull(mails.note)))
    .returning();
  return row ?? null;
}

export async function markSent(db: Db, mailId: string): Promise<void> {
  await db
    .update(mails)
    .set({ sentAt: sql`now()` })
    .where(eq(mails.id, mailId));
}

/** The message will not be sent; the note says why. */
export async function markUnsent(db: Db, mailId: string, note: string): Promise<void> {
  await db.update(mails).set({ note }).where(eq(mails.id, mailId));
}

/** Asks again for messages whose job was lost. */
export async function redispatchMails(db: Db, seconds: number): Promise<void> {
  await db.execute(sql`
    with late as (
      update mails set dispatched_at = now()
      where sent_at is null and note is null
        and dispatched_at < now() - make_interval(secs => ${seconds})
        and not exists (
          select 1 from outbox o where o.kind = 'mail' and o.payload->>'mailId' = mails.id::text
        )
      returning id, workspace_id
    ), asked as (
      insert into outbox (kind, workspace_id, payload)
      select 'mail', workspace_id, jsonb_build_object('mailId', id) from late
      returning 1
    )
    select pg_notify('outbox_added', '') from asked`);
}
