/** Processes, ports and waiting for a state. */
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { setTimeout as pause } from 'node:timers/promises';
import { PlainError } from './plain.mjs';

/** Whether a process lives (one that has ended and waits to be collected does not). */
export function alive(pid) {
  try {
    process.kill(pid, 0);
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return stat.charAt(stat.lastIndexOf(')') + 2) !== 'Z';
  } catch {
    return false;
  }
}

/** Asks again and again until `state()` is true. @throws PlainError naming the state after `limit` milliseconds */
export async function until(what, limit, state) {
  const deadline = Date.now() + limit;
  while (!(await state())) {
    if (Date.now() > deadline)
      throw new PlainError(`Waited ${limit / 1000} s in vain until ${what}.`);
    await pause(50);
  }
}

/** Ends a process by its id and waits; past the limit it is killed. */
export async function endProcess(pid, signal, limit) {
  if (!alive(pid)) return;
  process.kill(pid, signal);
  try {
    await until('the process ends', limit, () => !alive(pid));
  } catch {
    process.kill(pid, 'SIGKILL');
  }
}

/** Ends every process of a group, named by its leader, and waits; past the limit they are killed. */
export async function endGroup(leader, limit) {
  const signalled = (signal) => {
    try {
      process.kill(-leader, signal);
      return true;
    } catch (error) {
      if (error.code === 'ESRCH') return false;
      throw error;
    }
  };
  if (!signalled('SIGTERM')) return;
  try {
    await until('the processes end', limit, () => !signalled(0));
  } catch {
    signalled('SIGKILL');
  }
}

/** A free loopback port: the one remembered in `file` if it is free, else a new one, remembered. */
export async function freePort(file, preferred = 0) {
  const remembered = existsSync(file) ? Number(readFileSync(file, 'utf8')) : preferred;
  const port = (await tryPort(remembered)) ?? (await tryPort(0));
  writeFileSync(file, String(port));
  return port;
}

function tryPort(port) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(null));
    probe.listen(port, '127.0.0.1', () => {
      const { port: got } = probe.address();
      probe.close(() => resolve(got));
    });
  });
}
