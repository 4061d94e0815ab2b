import { readFileSync, writeFileSync } from 'node:fs';
import { setFlagsFromString } from 'node:v8';
import { Script } from 'node:vm';

setFlagsFromString('--expose-gc');
const garbage = new Script('gc()');

/** Collects garbage of this thread and begins a new peak of resident memory (proc(5), clear_refs). */
export function beginPeak(): void {
  garbage.runInNewContext();
  writeFileSync('/proc/self/clear_refs', '5');
}

/** Most bytes that this process, all its threads included, has held in memory since `beginPeak`. */
export function peakBytes(): number {
  const kilobytes = /^VmHWM:\s*(\d+) kB$/m.exec(readFileSync('/proc/self/status', 'utf8'))?.[1];
  if (kilobytes === undefined) throw new Error('/proc/self/status names no VmHWM.');
  return 1024 * Number(kilobytes);
}
