import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { MUTANT_SEED, mutantOf, MUTANTS } from '../support/fuzzing';
import { bring, LIMITS } from './bring';
import { expectLaws } from './networkLaws';

const FIXTURES = join(import.meta.dirname, 'fixtures');
const LIMITS_OF_MUTANTS = { ...LIMITS, nodes: 500, edgeRows: 20_000, lineCharacters: 20_000 };

/** Files of a folder, by the ending that chooses their parser. */
function parsersOf(folder: string): [string, { name: string; bytes: Uint8Array }[]][] {
  if (!existsSync(join(FIXTURES, folder))) return [];
  const byEnding = new Map<string, { name: string; bytes: Uint8Array }[]>();
  for (const name of readdirSync(join(FIXTURES, folder))) {
    const ending = folder === 'tables' ? 'tables' : (name.split('.').at(-1) ?? '');
    const files = byEnding.get(ending) ?? [];
    files.push({ name, bytes: new Uint8Array(readFileSync(join(FIXTURES, folder, name))) });
    byEnding.set(ending, files);
  }
  return [...byEnding];
}

const PARSERS = readdirSync(FIXTURES).flatMap(parsersOf);

describe('a mutated file gives a whole network, or says why there is none', () => {
  test.each(PARSERS)('%s', { timeout: 24 * 3_600_000 }, async (_, files) => {
    await fc.assert(
      fc.asyncProperty(mutantOf(files), async ({ name, bytes }) => {
        expectLaws(await bring({ [name]: bytes }, {}, {}, LIMITS_OF_MUTANTS));
      }),
      { numRuns: MUTANTS, seed: MUTANT_SEED },
    );
  });

  test('two mutated tables together', { timeout: 24 * 3_600_000 }, async () => {
    const tables = PARSERS.flatMap(([name, files]) => (name === 'tables' ? files : []));
    expect(tables.length).toBeGreaterThan(20);
    const missing = fc.constantFrom('refuse' as const, 'leave_out' as const, 'last' as const);
    const years = fc.constantFrom('numbers' as const, 'dates' as const);
    const weights = fc.constantFrom(
      { kind: 'all' as const },
      { kind: 'threshold' as const, least: 1 },
      { kind: 'density' as const, share: 0.5 },
    );
    const choices = fc.record({
      missing,
      years,
      weights,
      tolerance: fc.constantFrom(null, 0, 3),
      dayOrder: fc.constantFrom(null, 'day_first' as const, 'month_first' as const),
      order: fc.record({
        kind: fc.constantFrom('column' as const, 'rows' as const, 'first_edge' as const),
      }),
    });
    await fc.assert(
      fc.asyncProperty(mutantOf(tables), mutantOf(tables), choices, async (one, other, changes) => {
        const files = { [`one ${one.name}`]: one.bytes, [`other ${other.name}`]: other.bytes };
        expectLaws(await bring(files, changes, {}, LIMITS_OF_MUTANTS));
      }),
      { numRuns: MUTANTS, seed: MUTANT_SEED },
    );
  });
});
