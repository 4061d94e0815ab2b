import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { FACES, FORMS, PLAIN_VIEW, readView, writeView } from '../../src/composables/benchQuery';
import { MEASURES } from '../../src/graphs/measures';
import { ORDERINGS } from '../../src/graphs/ordering';

const N = 30;
const position = fc.integer({ min: 0, max: N - 1 });

const view = fc.record({
  form: fc.constantFrom(...FORMS),
  measure: fc.constantFrom(...MEASURES),
  dimension: fc.constantFrom(null, 0, 1, 2, 3),
  lower: fc.constantFrom(...MEASURES),
  order: fc.constantFrom(...ORDERINGS),
  arcs: fc.constantFrom('safe' as const, 'moved' as const),
  threshold: fc.constantFrom(0.05, 0.5, 1),
  pair: fc.option(
    fc
      .uniqueArray(position, { minLength: 2, maxLength: 2 })
      .map(([a = 0, b = 1]) => ({ p: Math.min(a, b), q: Math.max(a, b) })),
  ),
  node: fc.option(position),
  group: fc.option(
    fc.oneof(
      fc.record({ kind: fc.constant('community' as const), index: fc.nat(20) }),
      fc.record({ kind: fc.constant('saved' as const), id: fc.uuid() }),
      fc.record({
        kind: fc.constant('hand' as const),
        positions: fc
          .uniqueArray(position, { minLength: 1 })
          .map((list) => list.sort((a, b) => a - b)),
      }),
    ),
  ),
  face: fc.constantFrom(...FACES),
  window: fc.constantFrom(null, [1.5, 12.5] as const),
});

describe('the link of a view', () => {
  it('brings every view back', () => {
    fc.assert(
      fc.property(view, (before) => {
        expect(readView(writeView(before), N)).toEqual(before);
      }),
    );
  });

  it('is empty for the plain view and counts arrivals from 1', () => {
    expect(writeView(PLAIN_VIEW)).toEqual({});
    expect(
      writeView({
        ...PLAIN_VIEW,
        form: 'square',
        measure: 'distance',
        lower: 'distance',
        pair: { p: 2, q: 20 },
      }),
    ).toEqual({
      form: 'square',
      measure: 'distance',
      pair: '3-21',
    });
  });

  it.each([
    [{ pair: '3-3' }],
    [{ pair: '0-4' }],
    [{ pair: '2-31' }],
    [{ pair: 'a-b' }],
    [{ pair: ['1-2'] }],
    [{ form: 'pie', measure: '__proto__', order: '', face: null }],
    [{ dimension: '9', threshold: '-1', node: '31', window: '9-2' }],
  ])('falls back where it does not fit this network: %o', (query) => {
    expect(readView(query, N)).toEqual(PLAIN_VIEW);
  });

  it('counts picked nodes of another network out', () => {
    expect(readView({ group: 'nodes-1.30.31.1' }, N).group).toEqual({
      kind: 'hand',
      positions: [0, 29],
    });
  });
});
