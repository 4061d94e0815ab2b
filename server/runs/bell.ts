import type { Channel, Listener } from '../../db/listener';

/** Rings when the channel carries this name, or when the listener may have missed it. */
export function bellFor(listener: Listener, channel: Channel, name: string) {
  let rings = 0;
  let wake: (() => void) | null = null;
  const remove = listener.subscribe(channel, (payload) => {
    if (payload !== null && payload !== name) return;
    rings++;
    wake?.();
  });
  return {
    remove,
    /** Resolves at the next ring, at once after an unheard one, or after the given milliseconds. */
    async rung(milliseconds: number): Promise<void> {
      if (rings === 0) {
        await new Promise<void>((resolve) => {
          const timer = setTimeout(resolve, milliseconds);
          wake = () => {
            clearTimeout(timer);
            resolve();
          };
        });
      }
      wake = null;
      rings = 0;
    },
  };
}
