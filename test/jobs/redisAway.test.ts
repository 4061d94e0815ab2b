import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { constantProbability } from '../support/graphs';
import { networkTaking } from '../support/heavyNetwork';
import { Workshop } from '../support/workshop';

async function freePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return port;
}

describe('while Redis is away', () => {
  let workshop: Workshop;
  let port: number;
  let redis: ChildProcess | null = null;

  const startRedis = () => {
    const settings = ['--port', String(port), '--bind', '127.0.0.1', '--save', ''];
    redis = spawn('redis-server', [...settings, '--appendonly', 'no'], { stdio: 'ignore' });
  };
  const killRedis = async () => {
    redis?.kill('SIGKILL');
    if (redis) await once(redis, 'exit');
    redis = null;
  };

  beforeAll(async () => {
    workshop = await Workshop.open();
    port = await freePort();
  });
  afterAll(async () => {
    await workshop.close();
    await killRedis();
  });

  test('submissions are kept, and drained within ten seconds of its return', async () => {
    workshop.startWorker({ REDIS_URL: `redis://127.0.0.1:${port}/0`, HEDDLE_THREADS: '2' });
    const subject = await workshop.bring(constantProbability(12, 0.4, 2));
    const early = await workshop.submit(subject);
    startRedis();
    await workshop.reached(subject.scope, early, ({ state }) => state === 'done', 10);
    await killRedis();
    // Another network: an equal run would be answered by the early one.
    const other = await workshop.bring(constantProbability(12, 0.4, 3));
    const late = await workshop.submit(other);
    expect((await workshop.progress(other.scope, late)).state).toBe('queued');
    startRedis();
    await workshop.reached(other.scope, late, ({ state }) => state === 'done', 10);
  });

  test('and came back with nothing, a run goes on to its end', async () => {
    const subject = await workshop.bring(networkTaking(4));
    const runId = await workshop.submit(subject);
    await workshop.reached(subject.scope, runId, ({ blocksDone }) => blocksDone > 0);
    await killRedis();
    startRedis();
    const end = await workshop.reached(subject.scope, runId, ({ state }) => state === 'done', 50);
    expect(end.blocksDone).toBe(end.blockCount);
  });
});
