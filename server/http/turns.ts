import type { Failure } from './failure';

/** Runs a task when its turn comes. */
export type InTurn = <T>(task: () => Promise<T>) => Promise<T>;

/** Runs at most `atOnce` tasks together, first come first served; refuses when `most` wait. */
export function makeTurns(atOnce: number, most: number, refusal: () => Failure): InTurn {
  let running = 0;
  const waiting: (() => void)[] = [];
  return async (task) => {
    if (running >= atOnce) {
      if (waiting.length >= most) throw refusal();
      await new Promise<void>((resolve) => waiting.push(resolve));
    } else {
      running++;
    }
    try {
      return await task();
    } finally {
      // The place goes to the next in line, else it is free.
      const next = waiting.shift();
      if (next === undefined) running--;
      else next();
    }
  };
}
