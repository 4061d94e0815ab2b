import { describe, expect, test } from 'vitest';
import { TableShelf } from '../../jobs/pool/tableShelf';
import type { PreparedData } from '../../jobs/engine/index';
import type { Outcome } from '../../jobs/pool/tasks';

type Prepared = Outcome<PreparedData>;

/** Tables that can be told apart; nothing reads them here. */
const tables = (name: string) =>
  ({ kind: 'finished', result: { name } as unknown as PreparedData }) satisfies Prepared;

const nobody = new AbortController().signal;

/** Makes `outcome` once it is let go. */
function maker(outcome: Prepared) {
  let go = (): void => undefined;
  const gate = new Promise<void>((resolve) => (go = resolve));
  const state = { made: 0 };
  const make = async () => {
    state.made++;
    await gate;
    return outcome;
  };
  return { make, go: () => go(), state };
}

describe('the shelf of prepared tables', () => {
  test('makes the tables of a run once, however many ask at the same time', async () => {
    const shelf = new TableShelf();
    const { make, go, state } = maker(tables('a'));
    const asked = [1, 2, 3].map(() => shelf.get('a', nobody, make));
    go();
    expect(await Promise.all(asked)).toEqual([tables('a'), tables('a'), tables('a')]);
    expect(await shelf.get('a', nobody, make)).toEqual(tables('a'));
    expect(state.made).toBe(1);
  });

  test('an asker whose maker was stopped or died makes the tables itself', async () => {
    for (const lost of ['stopped', 'crashed'] as const) {
      const shelf = new TableShelf();
      const first = maker(
        lost === 'stopped'
          ? { kind: 'stopped' }
          : { kind: 'crashed', outOfMemory: true, message: 'gone' },
      );
      const second = maker(tables('b'));
      second.go();
      const begun = shelf.get('a', nobody, first.make);
      const waiting = shelf.get('a', nobody, second.make);
      first.go();
      expect((await begun).kind).toBe(lost);
      expect(await waiting).toEqual(tables('b'));
    }
  });

  test('a refusal is told to all who wait and is not kept', async () => {
    const shelf = new TableShelf();
    const refused = { kind: 'refused', code: 'engine.limit_bytes', message: 'Too large.' } as const;
    const first = maker(refused);
    const asked = [shelf.get('a', nobody, first.make), shelf.get('a', nobody, first.make)];
    first.go();
    expect(await Promise.all(asked)).toEqual([refused, refused]);
    const second = maker(tables('a'));
    second.go();
    expect(await shelf.get('a', nobody, second.make)).toEqual(tables('a'));
  });

  test('an asker that is stopped does not wait for the maker', async () => {
    const shelf = new TableShelf();
    const { make, go } = maker(tables('a'));
    const begun = shelf.get('a', nobody, make);
    const ending = new AbortController();
    const waiting = shelf.get('a', ending.signal, make);
    ending.abort();
    expect(await waiting).toEqual({ kind: 'stopped' });
    go();
    expect(await begun).toEqual(tables('a'));
  });

  test('keeps the two used last', async () => {
    const shelf = new TableShelf();
    const made: string[] = [];
    const get = (key: string) =>
      shelf.get(key, nobody, () => {
        made.push(key);
        return Promise.resolve(tables(key));
      });
    for (const key of ['a', 'b', 'a', 'c', 'a', 'b']) await get(key);
    expect(made).toEqual(['a', 'b', 'c', 'b']);
  });
});
