import { describe, expect, it } from 'vitest';
import { MatrixComputation } from '../../jobs/engine/fast/compute';
import { EngineLimitError, EngineStopped } from '../../jobs/engine/types';
import { constantProbability, networkOf, withEntries } from '../support/graphs';
import { AMPLE, fastMatrix, foundationOf, QUIET } from './fastMatrix';

const allRows = (nodeCount: number) => Uint32Array.from({ length: nodeCount }, (_, p) => p);

describe('limits', () => {
  it('too many cliques are refused with the number allowed', () => {
    const network = constantProbability(30, 0.9, 1);
    const limits = { ...AMPLE, simplices: 1000 };
    expect(() => foundationOf(network, { limits })).toThrow(EngineLimitError);
    expect(() => foundationOf(network, { limits })).toThrow(/1001 cliques.*1000 are allowed/);
  });

  it('too many bytes are refused with the number needed', () => {
    const network = constantProbability(40, 0.5, 1);
    const { peak } = foundationOf(network).tables.budget;
    expect(() => foundationOf(network, { limits: { ...AMPLE, bytes: peak - 1 } })).toThrow(
      EngineLimitError,
    );
    expect(() => foundationOf(network, { limits: { ...AMPLE, bytes: peak } })).not.toThrow();
  });

  it('computations made one after the other do not add up their bytes', () => {
    const foundation = foundationOf(constantProbability(30, 0.4, 1));
    const once = (() => {
      new MatrixComputation(foundation).rows(allRows(30), QUIET);
      return foundation.tables.budget.used;
    })();
    for (let i = 0; i < 5; i++) new MatrixComputation(foundation).rows(allRows(30), QUIET);
    expect(foundation.tables.budget.used).toBe(once);
  });
});

describe('control', () => {
  it('a stop is obeyed while tables are built and while rows are computed', () => {
    const stop = { shouldStop: () => true, onProgress: () => undefined };
    const network = constantProbability(60, 0.6, 1);
    expect(() => foundationOf(network, { control: stop })).toThrow(EngineStopped);
    const foundation = foundationOf(network);
    expect(() => new MatrixComputation(foundation).rows(allRows(60), stop)).toThrow(EngineStopped);
  });

  it('between two looks lies less than a million units of work, about 10 ms', () => {
    const network = constantProbability(90, 0.3, 1);
    const foundation = foundationOf(network);
    let most = 0;
    let last = foundation.pulse.work;
    const seen: number[] = [];
    const look = () => {
      most = Math.max(most, foundation.pulse.work - last);
      last = foundation.pulse.work;
      return false;
    };
    const control = { shouldStop: look, onProgress: (done: number) => void seen.push(done) };
    new MatrixComputation(foundation).rows(allRows(90), control);
    expect(most).toBeLessThan(1_000_000);
    expect(seen.length).toBeGreaterThan(10);
    expect(seen.at(-1)).toBe((90 * 89) / 2);
    expect(seen.every((done, i) => i === 0 || done >= seen[i - 1]!)).toBe(true);
  });
});

describe('small and odd networks', () => {
  it.each([0, 1, 2])('%i nodes without edges', (nodeCount) => {
    const { recorded, results } = fastMatrix(networkOf(nodeCount, []));
    expect(recorded[0]!.births.length).toBe(nodeCount);
    expect(results.pairCount).toBe([0, 0, 1][nodeCount]);
    expect([...results.distances]).toEqual(new Array(4 * results.pairCount).fill(0));
  });

  it('swapping equal entries changes nothing', () => {
    const network = { ...constantProbability(12, 0.4, 3), values: new Float64Array(12).fill(-4.5) };
    const { results } = fastMatrix(network);
    expect(results.distances.every((distance) => distance === 0)).toBe(true);
    expect(results.bettiGaps.every((gap) => gap === 0)).toBe(true);
  });

  it.each([0, 1, 2, 3])('D = %i gives the first rows of D = 3', (maxDimension) => {
    const network = withEntries(constantProbability(14, 0.6, 9), 'tied', 2);
    const full = fastMatrix(network, { maxDimension: 3 }).results;
    const part = fastMatrix(network, { maxDimension }).results;
    const length = (maxDimension + 1) * full.pairCount;
    expect(part.distances).toEqual(full.distances.slice(0, length));
    expect(part.bettiGaps).toEqual(full.bettiGaps.slice(0, length));
  });

  it('rows may be asked for in any order and in parts', () => {
    const foundation = foundationOf(constantProbability(16, 0.5, 4));
    const computation = new MatrixComputation(foundation);
    const whole = computation.rows(allRows(16), QUIET);
    const late = computation.rows(Uint32Array.of(9, 2), QUIET);
    expect(late.pairCount).toBe(6 + 13);
    const start = (p: number) => p * 15 - (p * (p - 1)) / 2;
    for (let k = 0; k < 4; k++) {
      const at = k * whole.pairCount;
      const wanted = [
        ...whole.distances.slice(at + start(9), at + start(10)),
        ...whole.distances.slice(at + start(2), at + start(3)),
      ];
      expect([...late.distances.slice(k * 19, (k + 1) * 19)]).toEqual(wanted);
    }
  });
});
