import { execFileSync } from 'node:child_process';
import { join } from 'node:path';
import { z } from 'zod';

const bytes = z.number().int().min(0);
export const memory = z.strictObject({
  /** Most bytes of the engine's typed arrays on any thread, shared tables included. */
  counted: bytes,
  /** Most resident bytes of the process while it computed the matrix, and before. */
  resident: bytes,
  idle: bytes,
});
export type Memory = z.infer<typeof memory>;

/** Memory of one whole matrix, computed by a process that has done nothing else. */
export function memoryOf(graph: string, maxDimension: number, threads: number): Memory {
  const child = join(import.meta.dirname, 'benchMemory.js');
  const args = [child, graph, String(maxDimension), String(threads)];
  return memory.parse(JSON.parse(execFileSync(process.execPath, args, { encoding: 'utf8' })));
}
