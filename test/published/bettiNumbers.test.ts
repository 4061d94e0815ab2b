import { describe, expect, test } from 'vitest';
import {
  cell24,
  cell600,
  chessboardComplex,
  complement,
  complete,
  completeMultipartite,
  crossPolytope,
  cube,
  cuboctahedron,
  cycle,
  cyclePower,
  dodecahedron,
  generalisedPetersen,
  groetzsch,
  heawood,
  icosahedron,
  matchingComplex,
  path,
  tree,
  wheel,
} from './families';
import { bettiNumbers, barcodeOf, pairsOf, preparedOf } from './reading';
import { networkOf } from '../support/graphs';

/** (b0, b1, b2, b3) of a wedge of `count` spheres of dimension d; a point if there are none. */
function wedge(count: number, d: number): number[] {
  const betti = [1, 0, 0, 0];
  if (d < 4) betti[d]! += count;
  return betti;
}

describe('cross-polytopes are spheres', () => {
  // Hatcher, Algebraic Topology 2002, ch. 0 (join, suspension); Kahle, Discrete Math. 309 (2009)
  // 1658-1671 (from memory).
  test.each([
    [1, [2, 0, 0, 0]],
    [2, [1, 1, 0, 0]],
    [3, [1, 0, 1, 0]],
    [4, [1, 0, 0, 1]],
    [5, [1, 0, 0, 0]],
  ])('with %i pairs of antipodes', (m, expected) => {
    expect(bettiNumbers(completeMultipartite(new Array<number>(m).fill(2)))).toEqual(expected);
  });

  // Follows from the above: the stars of the antipodes are cones before the last one.
  test.each([2, 3, 4])(
    'all points, then their %i antipodes: one bar that opens at the last',
    (m) => {
      const barcode = barcodeOf(crossPolytope(m));
      expect(barcode.map(pairsOf)).toEqual(
        [0, 1, 2, 3].map((k) =>
          k === 0 ? [[0, Infinity]] : k === m - 1 ? [[2 * m - 1, Infinity]] : [],
        ),
      );
    },
  );
});

describe('cycles', () => {
  // Edelsbrunner, Harer, Computational Topology, AMS 2010, ch. IV (from memory).
  test.each([3, 4, 5, 6, 9, 30])('C_%i has one loop, but a triangle is filled', (n) => {
    expect(bettiNumbers(cycle(n))).toEqual(n === 3 ? [1, 0, 0, 0] : [1, 1, 0, 0]);
  });

  // Elder rule: Edelsbrunner, Harer 2010, ch. VII.1 (from memory).
  test('C_7 in cyclic order: the loop closes at the last node', () => {
    expect(barcodeOf(cycle(7), 1).map(pairsOf)).toEqual([[[0, Infinity]], [[6, Infinity]]]);
  });

  test('C_8 with entries 0,4,1,5,2,6,3,7: the younger component dies', () => {
    const edges = Array.from({ length: 8 }, (_, i) => [i, (i + 1) % 8] as const);
    const barcode = barcodeOf(networkOf(8, edges, [0, 4, 1, 5, 2, 6, 3, 7]), 1);
    expect(barcode.map(pairsOf)).toEqual([
      [
        [0, Infinity],
        [1, 4],
        [2, 5],
        [3, 6],
      ],
      [[7, Infinity]],
    ]);
  });
});

// Cones and trees are contractible (textbook).
test.each([
  ['K_12', complete(12)],
  ['P_10', path(10)],
  ['the wheel W_9', wheel(9)],
  ['a 3-ary tree of depth 2', tree(3, 13)],
])('%s is contractible', (_, graph) => {
  expect(bettiNumbers(graph)).toEqual([1, 0, 0, 0]);
});

describe('independence complexes of cycles and paths', () => {
  // Kozlov, Complexes of directed trees, J. Combin. Theory A 88 (1999) 112-122, Prop. 5.2 (from memory).
  test.each([4, 5, 6, 7, 8, 9, 10, 11, 12, 13])('complement of C_%i', (n) => {
    const k = Math.floor(n / 3);
    const expected = n % 3 === 0 ? wedge(2, k - 1) : n % 3 === 1 ? wedge(1, k - 1) : wedge(1, k);
    expect(bettiNumbers(complement(cycle(n)))).toEqual(expected);
  });

  // Kozlov 1999, Prop. 4.6 (from memory).
  test.each([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13])(
    'complement of the path on %i nodes',
    (n) => {
      const k = Math.floor(n / 3);
      const expected = n % 3 === 1 ? wedge(0, 0) : n % 3 === 0 ? wedge(1, k - 1) : wedge(1, k);
      expect(bettiNumbers(complement(path(n)))).toEqual(expected);
    },
  );
});

describe('matching and chessboard complexes over F_2', () => {
  // Bouc, J. Algebra 150 (1992) 158-186; Shareshian, Wachs, Adv. Math. 212 (2007) 525-570, Table 1;
  // Jonsson, arXiv 1203.5641 (tables from memory). M_7, M_9 and M_10 have 3-torsion: over F_3 the
  // numbers differ, (1,1,21,0), (1,0,50,78) and (1,0,1,1217).
  test.each([
    [5, [1, 6, 0, 0]],
    [6, [1, 16, 0, 0]],
    [7, [1, 0, 20, 0]],
    [8, [1, 0, 132, 0]],
    [9, [1, 0, 42, 70]],
    [10, [1, 0, 0, 1216]],
  ])('M_%i', (n, expected) => {
    expect(bettiNumbers(matchingComplex(n))).toEqual(expected);
  });

  // Bjorner, Lovasz, Vrecica, Zivaljevic, J. London Math. Soc. 49 (1994) 25-39; Shareshian, Wachs
  // 2007, Table 2 (from memory). M_5,5 has 3-torsion (Jonsson, Ann. Combin. 14 (2010) 487-505):
  // over F_3 it is (1,0,1,57).
  test.each([
    [2, 3, [1, 1, 0, 0]],
    [2, 4, [1, 5, 0, 0]],
    [3, 3, [1, 4, 0, 0]],
    [3, 4, [1, 2, 1, 0]],
    [3, 5, [1, 0, 14, 0]],
    [4, 4, [1, 0, 15, 0]],
    [4, 5, [1, 0, 20, 1]],
    [5, 5, [1, 0, 0, 56]],
  ])('M_%i,%i', (m, n, expected) => {
    expect(bettiNumbers(chessboardComplex(m, n))).toEqual(expected);
  });
});

describe('edge graphs of polytopes', () => {
  // Coxeter, Regular Polytopes, 3rd ed. 1973, Table I (counts, from memory); Betti numbers by Euler's formula.
  test.each([
    ['octahedron', completeMultipartite([2, 2, 2]), [1, 0, 1, 0]],
    ['icosahedron', icosahedron(), [1, 0, 1, 0]],
    ['cube', cube(), [1, 5, 0, 0]],
    ['dodecahedron', dodecahedron(), [1, 11, 0, 0]],
    ['cuboctahedron', cuboctahedron(), [1, 5, 0, 0]],
    ['24-cell', cell24(), [1, 0, 23, 0]],
    ['600-cell', cell600(), [1, 0, 0, 1]],
  ])('%s', (_, graph, expected) => {
    expect(bettiNumbers(graph)).toEqual(expected);
  });

  test('the 600-cell has 120, 720, 1200 and 600 simplices and none beyond', () => {
    expect([...preparedOf(cell600()).counts.bySize]).toEqual([120, 720, 1200, 600, 0]);
  });
});

describe('powers of cycles', () => {
  // Adamaszek, Clique complexes and graph powers, Israel J. Math. 196 (2013) 295-319, Cor. 6.7;
  // arXiv 1104.0433 (C_6^2 stands in the abstract, the formula from memory).
  test.each([
    [7, 2, wedge(1, 1)],
    [10, 3, wedge(1, 1)],
    [6, 2, wedge(1, 2)],
    [9, 3, wedge(2, 2)],
    [15, 5, wedge(4, 2)],
    [8, 3, wedge(1, 3)],
    [11, 4, wedge(1, 3)],
    [14, 5, wedge(1, 3)],
    [10, 4, wedge(1, 4)],
  ])('C_%i^%i', (n, r, expected) => {
    expect(bettiNumbers(cyclePower(n, r))).toEqual(expected);
  });
});

// Milnor, Ann. Math. 63 (1956) 430-436, join formula (from memory): a wedge of prod(a_i - 1) spheres.
test.each([
  [[3, 3]],
  [[2, 5]],
  [[3, 3, 3]],
  [[2, 3, 4]],
  [[2, 2, 3, 3]],
  [[3, 3, 3, 3]],
  [[1, 4, 4]],
])('the complete multipartite graph with parts %j', (sizes) => {
  const count = sizes.reduce((product, size) => product * (size - 1), 1);
  expect(bettiNumbers(completeMultipartite(sizes))).toEqual(wedge(count, sizes.length - 1));
});

// Euler: a connected triangle-free graph has b1 = m - n + 1.
test.each([
  ['Petersen', generalisedPetersen(5, 2), 6],
  ['Heawood', heawood(), 8],
  ['Groetzsch', groetzsch(), 10],
  ['Desargues', generalisedPetersen(10, 3), 11],
])('the %s graph', (_, graph, loops) => {
  expect(graph.edges.length / 2 - graph.nodeCount + 1).toBe(loops);
  expect(bettiNumbers(graph)).toEqual([1, loops, 0, 0]);
});
