/** A private Redis on loopback. Everything in it can be thrown away: PostgreSQL is the truth. */
import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, openSync, readFileSync, writeFileSync } from 'node:fs';
import { connect } from 'node:net';
import { join } from 'node:path';
import { PlainError } from './plain.mjs';
import { rememberedSecret } from './postgres.mjs';
import { alive, endProcess, freePort, until } from './process.mjs';

/**
 * Starts Redis (append-only file, no eviction); one that was left running is taken over.
 * @returns {Promise<{url: string, stop: () => Promise<void>}>}
 */
export async function startRedis(stateDir) {
  const folder = join(stateDir, 'redis');
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const password = rememberedSecret(join(stateDir, 'redis.password'));
  const { pid, port } = runningServer(folder) ?? (await launch(folder, password));
  await until('Redis answers', 30_000, () => {
    if (!alive(pid))
      throw new PlainError(`Redis ended by itself; see ${join(folder, 'redis.log')}.`);
    return answers(port, password);
  });
  return {
    url: `redis://:${password}@127.0.0.1:${port}/0`,
    stop: () => endProcess(pid, 'SIGTERM', 30_000),
  };
}

function runningServer(folder) {
  const file = join(folder, 'redis.pid');
  if (!existsSync(file)) return null;
  const pid = Number(readFileSync(file, 'utf8'));
  const command = existsSync(`/proc/${pid}/cmdline`)
    ? readFileSync(`/proc/${pid}/cmdline`, 'utf8')
    : '';
  const port = Number(readFileSync(join(folder, 'port'), 'utf8'));
  return alive(pid) && command.includes('redis-server') && command.includes(`:${port}`)
    ? { pid, port }
    : null;
}

async function launch(folder, password) {
  const port = await freePort(join(folder, 'port'));
  const settings = [
    'bind 127.0.0.1',
    `port ${port}`,
    `dir "${folder}"`,
    'appendonly yes',
    'save ""',
    'maxmemory-policy noeviction',
    `requirepass ${password}`,
    `pidfile "${join(folder, 'redis.pid')}"`,
  ];
  // The password stands in the file and not on the command line, which everybody on the machine reads.
  writeFileSync(join(folder, 'redis.conf'), `${settings.join('\n')}\n`, { mode: 0o600 });
  const log = openSync(join(folder, 'redis.log'), 'a', 0o600);
  const child = spawn('redis-server', [join(folder, 'redis.conf')], {
    detached: true,
    stdio: ['ignore', log, log],
  });
  writeFileSync(join(folder, 'redis.pid'), String(child.pid));
  child.unref();
  return { pid: child.pid, port };
}

/** Whether Redis is up and has read its append-only file. */
function answers(port, password) {
  return new Promise((resolve) => {
    const socket = connect(port, '127.0.0.1', () => socket.write(`AUTH ${password}\r\nPING\r\n`));
    let text = '';
    const finish = (yes) => {
      socket.destroy();
      resolve(yes);
    };
    socket.setTimeout(2_000, () => finish(false));
    socket.on('error', () => finish(false));
    socket.on('close', () => finish(false));
    socket.on('data', (bytes) => {
      text += bytes;
      if (/PONG/.test(text)) finish(true);
      else if (/-/.test(text)) finish(false);
    });
  });
}
