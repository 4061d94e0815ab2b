import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  arrivalAxis,
  clampWindow,
  positionAt,
  positionOfEntry,
  xAt,
  xOfValue,
} from '../../src/drawings/arrivalAxis';
import { arcAtPoint, chooseArcs, MOST_ARCS } from '../../src/drawings/arcsGeometry';
import {
  arcDistance,
  cellCentre,
  clothGeometry,
  clothHeight,
  pairAtPoint,
} from '../../src/drawings/clothGeometry';
import { movePair } from '../../src/drawings/pairCursor';
import {
  squareCellAt,
  squareCells,
  squareGeometry,
  squarePair,
} from '../../src/drawings/squareGeometry';
import { pairIndex, pairsOf } from '../../src/graphs/swapMatrix';

const network = fc.record({
  n: fc.integer({ min: 2, max: 500 }),
  width: fc.integer({ min: 300, max: 2500 }),
  height: fc.integer({ min: 120, max: 600 }),
});

describe('the arrival axis', () => {
  it('places positions and finds them again', () => {
    const axis = arrivalAxis(40, 900, null);
    expect(positionAt(axis, xAt(axis, 17.25))).toBeCloseTo(17.25, 9);
    expect([xAt(axis, -0.5), xAt(axis, 39.5)]).toEqual([axis.left, axis.right]);
  });

  it('places a value at the first node that has it, and a bar that never dies at the end', () => {
    const axis = arrivalAxis(4, 400, null);
    const values = Float64Array.of(1, 2, 2, 5);
    expect(xOfValue(axis, values, 2)).toBe(xAt(axis, 1));
    expect(xOfValue(axis, values, 5)).toBe(xAt(axis, 3));
    expect(xOfValue(axis, values, Infinity)).toBe(axis.right);
  });

  it('places an entry between two arrivals in proportion', () => {
    const entries = Float64Array.of(0, 10, 10, 30);
    expect([-3, 0, 5, 10, 15, 40].map((entry) => positionOfEntry(entries, entry))).toEqual([
      -0.5, 0, 0.5, 1, 2.25, 3.5,
    ]);
  });

  it('keeps a window inside the axis and forgets one that shows everything', () => {
    expect(clampWindow(20, [-5, 5])).toEqual([-0.5, 9.5]);
    expect(clampWindow(20, [8, 9])).toEqual([8, 12]);
    expect(clampWindow(20, [-1, 30])).toBeNull();
  });
});

describe('the cloth', () => {
  it('has every cell inside the drawing, at the midpoint of its arrivals', () => {
    fc.assert(
      fc.property(network, ({ n, width, height }) => {
        const cloth = clothGeometry(arrivalAxis(n, width, null), height);
        const top = cellCentre(cloth, { p: 0, q: n - 1 });
        expect(top.y - cloth.rise).toBeGreaterThanOrEqual(0);
        expect(top.x).toBeCloseTo((xAt(cloth.axis, 0) + xAt(cloth.axis, n - 1)) / 2, 9);
      }),
    );
  });

  it('has heights in proportion to how far the arrivals are apart', () => {
    const cloth = clothGeometry(arrivalAxis(30, 800, null), 300);
    const heightOf = (p: number, q: number): number => cloth.base - cellCentre(cloth, { p, q }).y;
    expect(heightOf(3, 13)).toBeCloseTo(10 * heightOf(20, 21), 9);
  });

  it('is never steeper than a round arc', () => {
    const axis = arrivalAxis(8, 1000, null);
    const cloth = clothGeometry(axis, clothHeight(axis, 2000));
    expect(cloth.rise).toBeCloseTo(axis.step / 2, 9);
  });

  it('finds the pair of any point of its lozenge', () => {
    fc.assert(
      fc.property(
        network,
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: -0.49, max: 0.49, noNaN: true }),
        fc.double({ min: -0.49, max: 0.49, noNaN: true }),
        ({ n, width, height }, a, b, alongP, alongQ) => {
          const p = Math.floor(a * (n - 1.001));
          const q = p + 1 + Math.floor(b * (n - p - 1.001));
          const cloth = clothGeometry(arrivalAxis(n, width, null), height);
          const { x, y } = cellCentre(cloth, { p, q });
          const right = x + ((alongP + alongQ) / 2) * cloth.axis.step;
          const up = y - (alongQ - alongP) * cloth.rise;
          expect(pairAtPoint(cloth, right, up)).toEqual({ p, q });
        },
      ),
    );
  });

  it('finds nothing outside', () => {
    const cloth = clothGeometry(arrivalAxis(10, 500, null), 250);
    expect(pairAtPoint(cloth, 5, 10)).toBeNull();
    expect(pairAtPoint(cloth, 250, cloth.base + 20)).toBeNull();
  });

  it('has the apex of each arc in the centre of its cell', () => {
    const cloth = clothGeometry(arrivalAxis(46, 1000, null), 400);
    const { x, y } = cellCentre(cloth, { p: 4, q: 31 });
    expect(arcDistance(cloth, { p: 4, q: 31 }, x, y)).toBeCloseTo(0, 6);
    expect(arcDistance(cloth, { p: 4, q: 31 }, xAt(cloth.axis, 4), cloth.base)).toBeCloseTo(0, 6);
  });
});

describe('arcs', () => {
  const n = 6;
  const values = new Float64Array(pairsOf(n));
  values[pairIndex(n, 0, 5)] = 0.9;
  values[pairIndex(n, 1, 2)] = 0.4;
  const field = { measure: 'change' as const, dimensions: [1], values, ceiling: 1 };

  it('are shown from a threshold on, the strongest drawn last', () => {
    const choose = (threshold: number) => [
      ...chooseArcs(field, n, { show: 'moved', threshold, ends: null }).indices,
    ];
    expect(choose(0.5)).toEqual([pairIndex(n, 0, 5)]);
    expect(choose(0.3)).toEqual([pairIndex(n, 1, 2), pairIndex(n, 0, 5)]);
  });

  it('are shown for the safe pairs of a node, or inside a group', () => {
    const safe = { show: 'safe' as const, threshold: 1 };
    const ofNode = chooseArcs(field, n, { ...safe, ends: { positions: [1], within: false } });
    const inside = chooseArcs(field, n, { ...safe, ends: { positions: [1, 2, 3], within: true } });
    expect(ofNode.found).toBe(4);
    expect([...inside.indices]).toEqual([pairIndex(n, 1, 3), pairIndex(n, 2, 3)]);
  });

  it('are cut to what can be told apart, and the cut is counted', () => {
    const many = { ...field, values: new Float64Array(pairsOf(100)).fill(0) };
    const { found, indices } = chooseArcs(many, 100, { show: 'safe', threshold: 1, ends: null });
    expect([found, indices.length]).toEqual([4950, MOST_ARCS]);
  });

  it('are found by a point near them only', () => {
    const cloth = clothGeometry(arrivalAxis(n, 600, null), 300);
    const arcs = chooseArcs(field, n, { show: 'moved', threshold: 0.3, ends: null });
    const { x, y } = cellCentre(cloth, { p: 0, q: 5 });
    expect(arcAtPoint(cloth, arcs, x, y + 3, 6)).toEqual({ p: 0, q: 5 });
    expect(arcAtPoint(cloth, arcs, x, y + 60, 6)).toBeNull();
  });
});

describe('the square', () => {
  const square = squareGeometry(Uint32Array.of(2, 0, 3, 1), 500, 400);

  it('shows each pair twice, once on each side of the diagonal', () => {
    for (const [row, column] of squareCells(square, { p: 1, q: 2 })) {
      expect(squarePair(square, row, column)).toEqual({ p: 1, q: 2 });
    }
    expect(squareCells(square, { p: 1, q: 2 })).toEqual([
      [0, 3],
      [3, 0],
    ]);
  });

  it('finds row and column of a point, and nothing on the diagonal or outside', () => {
    const at = (row: number, column: number) =>
      squareCellAt(
        square,
        square.left + (column + 0.5) * square.cell,
        square.top + (row + 0.5) * square.cell,
      );
    expect(at(1, 3)).toEqual({ row: 1, column: 3 });
    expect(at(2, 2)).toBeNull();
    expect(at(0, 4)).toBeNull();
  });
});

describe('the keyboard cursor', () => {
  it('moves the earlier arrival sideways, the later one up and down, and stays on the cloth', () => {
    const at = { p: 3, q: 5 };
    expect(movePair(at, 'ArrowRight', 1, 8)).toEqual({ p: 4, q: 5 });
    expect(movePair(at, 'ArrowRight', 10, 8)).toEqual({ p: 4, q: 5 });
    expect(movePair(at, 'ArrowLeft', 10, 8)).toEqual({ p: 0, q: 5 });
    expect(movePair(at, 'ArrowUp', 10, 8)).toEqual({ p: 3, q: 7 });
    expect(movePair(at, 'ArrowDown', 10, 8)).toEqual({ p: 3, q: 4 });
    expect(movePair(at, 'End', 1, 8)).toEqual({ p: 5, q: 7 });
    expect(movePair(at, 'Home', 1, 8)).toEqual({ p: 0, q: 2 });
  });

  it('starts at the first pair and leaves other keys alone', () => {
    expect(movePair(null, 'ArrowRight', 1, 8)).toEqual({ p: 0, q: 1 });
    expect(movePair({ p: 0, q: 1 }, 'Tab', 1, 8)).toBeNull();
    expect(movePair(null, 'ArrowRight', 1, 1)).toBeNull();
  });
});
