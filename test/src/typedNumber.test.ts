import { describe, expect, it } from 'vitest';
import { typedNumber } from '../../src/components/import/figures';

describe('a number that is typed', () => {
  it('has a point or a comma', () => {
    expect(['3', ' 0,5 ', '.5', '1e-3', '-2.'].map(typedNumber)).toEqual([3, 0.5, 0.5, 0.001, -2]);
  });

  it('is nothing where nothing is typed, and no number where something else is', () => {
    expect(typedNumber('  ')).toBeNull();
    for (const text of ['soon', '1,2,3', '0x10', '3 days', 'Infinity']) {
      expect(typedNumber(text), text).toBeNaN();
    }
  });
});
