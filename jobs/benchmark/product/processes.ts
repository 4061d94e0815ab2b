import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import type { ProductConfig } from './config';

/** Milliseconds that a process may take to be ready, or to hand over and end. */
const PATIENCE = 30_000;

/** The server and the workers of a product of its own; ends what it has started and nothing else. */
export class Processes {
  private server: ChildProcess | null = null;
  private workers: ChildProcess[] = [];

  constructor(
    private readonly config: ProductConfig,
    private readonly dist: string,
  ) {}

  async startServer(): Promise<void> {
    this.server = this.start('server', {});
    await this.answers('/health');
  }

  /** Replaces the workers by `count` processes of so many threads each. */
  async startWorkers(count: number, threads: number): Promise<void> {
    await this.end(this.workers);
    this.workers = Array.from({ length: count }, () =>
      this.start('worker', { HEDDLE_THREADS: String(threads) }),
    );
    await this.answers('/ready');
  }

  async close(): Promise<void> {
    await this.end(this.workers);
    if (this.server !== null) await this.end([this.server]);
  }

  private start(script: string, more: Readonly<Record<string, string>>): ChildProcess {
    return spawn(process.execPath, [join(this.dist, `${script}.js`)], {
      env: this.config.environmentOf(more),
      stdio: ['ignore', 'inherit', 'inherit'],
    });
  }

  private async answers(path: string): Promise<void> {
    const deadline = Date.now() + PATIENCE;
    for (;;) {
      const answer = await fetch(`${this.config.origin}${path}`).catch(() => null);
      if (answer?.ok === true) return;
      if (Date.now() > deadline) throw new Error(`${path} did not answer within ${PATIENCE} ms.`);
      await pause(50);
    }
  }

  private async end(children: readonly ChildProcess[]): Promise<void> {
    await Promise.all(
      children.map(async (child) => {
        if (child.exitCode !== null || child.signalCode !== null) return;
        const ended = once(child, 'exit');
        child.kill('SIGTERM');
        const timer = setTimeout(() => child.kill('SIGKILL'), PATIENCE);
        await ended;
        clearTimeout(timer);
      }),
    );
  }
}
