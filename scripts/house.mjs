/** The processes of a running instance: one server, some workers, kept alive and ended together. */
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, openSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { root } from './paths.mjs';
import { alive, endProcess } from './process.mjs';

/** A process that ends so often within a minute is left alone. */
const RESTARTS = 5;
const MINUTE = 60_000;
const PATIENCE = 15_000;

export class House {
  #children = new Map();
  #closing = false;

  /** @param {string} stateDir where ids and logs go; @param {NodeJS.ProcessEnv} environment */
  constructor(stateDir, environment) {
    this.stateDir = stateDir;
    this.environment = environment;
    mkdirSync(join(stateDir, 'logs'), { recursive: true });
  }

  /** Ends what a crash of the last start left behind. */
  async endLeftovers() {
    const file = join(this.stateDir, 'processes.json');
    if (!existsSync(file)) return;
    for (const pid of JSON.parse(readFileSync(file, 'utf8'))) {
      const command = existsSync(`/proc/${pid}/cmdline`)
        ? readFileSync(`/proc/${pid}/cmdline`, 'utf8')
        : '';
      if (alive(pid) && command.includes(join(root, 'dist')))
        await endProcess(pid, 'SIGTERM', PATIENCE);
    }
  }

  /** Starts dist/`script`.js under a name of its own and starts it again whenever it ends by itself. */
  keep(name, script, more = {}) {
    const log = openSync(join(this.stateDir, 'logs', `${name}.log`), 'a');
    const starts = [];
    const begin = () => {
      starts.push(Date.now());
      const child = spawn(
        process.execPath,
        ['--enable-source-maps', join(root, 'dist', `${script}.js`)],
        {
          cwd: root,
          detached: true,
          stdio: ['ignore', log, log],
          env: { ...process.env, ...this.environment, ...more },
        },
      );
      this.#children.set(name, child);
      this.#remember();
      child.once('exit', (code, signal) => {
        if (this.#closing) return;
        console.error(
          `${name} ended by itself (${signal ?? `status ${code}`}); see ${join('.heddle', 'logs', `${name}.log`)}.`,
        );
        if (starts.filter((at) => Date.now() - at < MINUTE).length <= RESTARTS)
          setTimeout(begin, 500);
        else
          console.error(
            `${name} ended ${RESTARTS} times within a minute and is not started again.`,
          );
      });
    };
    begin();
  }

  /** Ends all processes, the workers handing over what they were at. */
  async close() {
    this.#closing = true;
    await Promise.all(
      [...this.#children.values()].map(({ pid }) => endProcess(pid, 'SIGTERM', PATIENCE)),
    );
  }

  #remember() {
    const pids = [...this.#children.values()].map(({ pid }) => pid);
    writeFileSync(join(this.stateDir, 'processes.json'), JSON.stringify(pids));
  }
}
