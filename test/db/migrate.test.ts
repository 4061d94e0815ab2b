import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { z } from 'zod';
import { migrateDatabase, migrationsFolder } from '../../db/migrate';
import { addToOutbox, takeFromOutbox } from '../../db/repositories/outbox';
import { Workshop } from '../support/workshop';

const journal = z.object({ entries: z.array(z.object({ when: z.number(), tag: z.string() })) });

describe('the database', () => {
  let workshop: Workshop;
  beforeAll(async () => {
    workshop = await Workshop.open();
  });
  afterAll(() => workshop.close());

  test('has migrations whose timestamps strictly increase', () => {
    const text = readFileSync(join(migrationsFolder(), 'meta', '_journal.json'), 'utf8');
    const times = journal.parse(JSON.parse(text)).entries.map(({ when }) => when);
    expect(times.length).toBeGreaterThan(0);
    for (const [k, time] of times.entries()) expect(time).toBeGreaterThan(times[k - 1] ?? 0);
  });

  test('is migrated once by any number of processes at the same time', async () => {
    const url = await workshop.emptyDatabase();
    await Promise.all(Array.from({ length: 5 }, () => migrateDatabase(url)));
    const applied = await workshop.rowsOf(url, 'select hash from drizzle.__drizzle_migrations');
    const text = readFileSync(join(migrationsFolder(), 'meta', '_journal.json'), 'utf8');
    expect(applied).toHaveLength(journal.parse(JSON.parse(text)).entries.length);
  });

  test('gives every outbox row to one of several takers, and keeps it if its taker fails', async () => {
    for (let k = 0; k < 20; k++)
      await addToOutbox(workshop.db, null, { kind: 'beat', payload: {} });
    await expect(
      takeFromOutbox(workshop.db, () => Promise.reject(new Error('Redis is away.'))),
    ).rejects.toThrow('Redis is away.');
    const taken: number[] = [];
    const take = async () => {
      while (
        await takeFromOutbox(workshop.db, ({ id }) => {
          taken.push(id);
          return Promise.resolve();
        })
      );
    };
    await Promise.all([take(), take(), take()]);
    expect(taken).toHaveLength(20);
    expect(new Set(taken).size).toBe(20);
  });
});
