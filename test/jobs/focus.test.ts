import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { decodeBlockPairs } from '../../db/codecs/blockPairs';
import { setFocus } from '../../db/repositories/runOrders';
import { outbox, runBlocks } from '../../db/schema/index';
import { blocksInFocus, type WaitingBlock } from '../../jobs/focus';
import type { Network } from '../../jobs/engine/types';
import { networkTaking } from '../support/heavyNetwork';
import { Workshop, until } from '../support/workshop';

describe('the blocks that hold what a reader looks at', () => {
  const whole = (block: number, ...rows: number[]): WaitingBlock => ({
    block,
    rows: Uint32Array.from(rows),
    choice: null,
    pairs: rows.reduce((sum, p) => sum + 9 - p, 0),
  });
  const blocks = [
    whole(0, 0, 1),
    whole(1, 2, 3),
    whole(2, 4),
    {
      block: 3,
      rows: Uint32Array.of(5, 6),
      choice: { starts: Uint32Array.of(0, 1, 3), partners: Uint32Array.of(9, 7, 8) },
      pairs: 3,
    },
  ];

  test.each([
    ['a pair of a whole row', { kind: 'pair', p: 3, q: 8 }, [1]],
    ['a listed pair', { kind: 'pair', p: 6, q: 8 }, [3]],
    ['a pair that is not listed', { kind: 'pair', p: 6, q: 9 }, []],
    ['a node: its own row, then rows before it by their share', { kind: 'node', p: 4 }, [2, 1, 0]],
    ['a node among listed partners', { kind: 'node', p: 7 }, [3, 2, 1, 0]],
    ['a window', { kind: 'window', from: 2, to: 4 }, [1]],
  ] as const)('%s', (_, focus, expected) => {
    expect(blocksInFocus(blocks, focus)).toEqual(expected);
  });
});

describe('while a run goes', () => {
  let workshop: Workshop;
  let network: Network;
  beforeAll(async () => {
    workshop = await Workshop.open();
    network = networkTaking(6);
  });
  afterAll(() => workshop.close());

  test('what is looked at is computed before the rest, and nothing twice', async () => {
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject);
    workshop.startWorker();
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 0, 60);
    const stored = await workshop.db
      .select()
      .from(runBlocks)
      .where(eq(runBlocks.runId, runId))
      .orderBy(runBlocks.block);
    // Blocks go in their order: the last one would be the last.
    const last = stored.at(-1);
    if (!last) throw new Error('There is no block.');
    const [p = 0] = decodeBlockPairs(last).rows;
    const focus = { kind: 'pair' as const, p, q: network.nodeCount - 1 };
    expect(await setFocus(workshop.db, subject.scope, runId, focus)).toBe(true);
    await until(
      () => workshop.db.select().from(outbox),
      (rows) => rows.every(({ kind }) => kind !== 'focus'),
    );
    const { blocksDone } = await workshop.progress(subject.scope, runId);
    await workshop.reached(subject.scope, runId, ({ state }) => state === 'done', 60);
    const after = await workshop.db
      .select()
      .from(runBlocks)
      .where(eq(runBlocks.runId, runId))
      .orderBy(runBlocks.block);
    const landed = after.at(-1)?.landed ?? Infinity;
    expect(after.length - blocksDone).toBeGreaterThan(6);
    // Those that a thread had, or had at hand, were ahead of it.
    expect(landed).toBeLessThanOrEqual(blocksDone + 4);
    expect(new Set(after.map((block) => block.landed)).size).toBe(after.length);
    expect(await setFocus(workshop.db, subject.scope, runId, focus)).toBe(false);
  }, 130_000);

  test('asked for before the run is planned, it counts from the first block', async () => {
    const subject = await workshop.bring(network);
    await workshop.endWorkers();
    const runId = await workshop.submit(subject);
    const focus = { kind: 'pair' as const, p: network.nodeCount - 2, q: network.nodeCount - 1 };
    expect(await setFocus(workshop.db, subject.scope, runId, focus)).toBe(true);
    workshop.startWorker();
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 5, 60);
    const blocks = await workshop.db.select().from(runBlocks).where(eq(runBlocks.runId, runId));
    const looked = blocks.find((block) => decodeBlockPairs(block).rows.includes(focus.p));
    expect(looked?.landed).toBeLessThanOrEqual(5);
  }, 130_000);
});
