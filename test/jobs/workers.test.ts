import { once } from 'node:events';
import type { ChildProcess } from 'node:child_process';
import { eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import type { RunPart } from '../../server/contract/enums';
import { runBlocks } from '../../db/schema/index';
import type { Network } from '../../jobs/engine/types';
import { constantProbability } from '../support/graphs';
import { networkTaking } from '../support/heavyNetwork';
import { storedHash } from '../support/wholeMatrix';
import { Workshop, until } from '../support/workshop';

const WITHIN: RunPart = { kind: 'within', positions: 12 };

describe('worker processes that share a run', () => {
  let workshop: Workshop;
  let network: Network;
  const undisturbed = new Map<string, string>();

  beforeAll(async () => {
    workshop = await Workshop.open();
    network = networkTaking(3);
    workshop.startWorker({ HEDDLE_THREADS: '2' });
    for (const part of [undefined, WITHIN]) {
      const { hash } = await finishedRun(part, () => Promise.resolve());
      undisturbed.set(JSON.stringify(part), hash);
    }
    await workshop.endWorkers();
  }, 120_000);
  afterEach(() => workshop.endWorkers());
  afterAll(() => workshop.close());

  /** @param disturb is called once the first block has landed */
  async function finishedRun(part: RunPart | undefined, disturb: () => Promise<void>) {
    const subject = await workshop.bring(network);
    const runId = await workshop.submit(subject, part && { part });
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 0, 60);
    await disturb();
    await workshop.reached(subject.scope, runId, ({ state }) => state === 'done', 60);
    return { runId, hash: await storedHash(workshop.db, subject.scope, runId) };
  }

  /** Worker processes that take blocks already. */
  async function working(count: number): Promise<ChildProcess[]> {
    const children = Array.from({ length: count }, () => workshop.spawnWorker());
    const name = `${workshop.prefix}:${Buffer.from('blocks').toString('base64')}`;
    await until(
      async () => String(await workshop.redis.client('LIST')),
      (clients) => clients.split('\n').filter((line) => line.includes(name)).length >= count,
    );
    return children;
  }

  test.each([
    [1, false, undefined],
    [2, false, undefined],
    [3, false, undefined],
    [2, false, WITHIN],
    [1, true, undefined],
    [2, true, undefined],
    [3, true, WITHIN],
  ])(
    '%i of them, one killed: %s, store the bytes of one undisturbed worker (part %o)',
    async (count, killed, part) => {
      const children = await working(count);
      const { hash } = await finishedRun(part, async () => {
        if (!killed) return;
        const [victim] = children;
        victim?.kill('SIGKILL');
        if (victim) await once(victim, 'exit');
        workshop.spawnWorker();
      });
      expect(hash).toBe(undisturbed.get(JSON.stringify(part)));
    },
    130_000,
  );

  test('two of them each store between 30 and 70 per cent of the work', async () => {
    // Many pairs and few cliques: what every process prepares for itself is short against the pairs.
    const subject = await workshop.bring(constantProbability(900, 0.03, 1));
    await working(2);
    const runId = await workshop.submit(subject, { dimensions: [1, 2] });
    await workshop.reached(subject.scope, runId, ({ state }) => state === 'done', 100);
    const blocks = await workshop.db.select().from(runBlocks).where(eq(runBlocks.runId, runId));
    expect(blocks.length).toBeGreaterThanOrEqual(16);
    const cost = new Map<string, number>();
    for (const { storedBy, cost: seconds } of blocks) {
      cost.set(storedBy ?? '', (cost.get(storedBy ?? '') ?? 0) + seconds);
    }
    const total = blocks.reduce((sum, block) => sum + block.cost, 0);
    const shares = [...cost.values()].map((seconds) => seconds / total);
    expect(shares).toHaveLength(2);
    for (const share of shares) {
      expect(share).toBeGreaterThan(0.3);
      expect(share).toBeLessThan(0.7);
    }
  }, 130_000);
});
