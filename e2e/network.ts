/**
 * A network made for these tests, small enough to follow by hand. Five posts form a ring (entries
 * 1 to 5); two flags hang on the first post only (6, 7); two ropes are tied to all five posts (8, 10).
 *
 * In the recorded order the ring closes at 5 and the first rope fills it at 8: one bar [5, 8) in
 * dimension 1. The second rope makes the ropes and the ring a sphere: one bar from 10 on in
 * dimension 2. The two ropes have the same neighbours, and so have the two flags: trading twins
 * changes nothing.
 */
export const NODES_CSV = `id,label,entry
p1,First post,1
p2,Second post,2
p3,Third post,3
p4,Fourth post,4
p5,Fifth post,5
f1,Red flag,6
f2,Blue flag,7
r1,Long rope,8
r2,Short rope,10
`;

export const EDGES_CSV = `source,target
p1,p2
p2,p3
p3,p4
p4,p5
p5,p1
p1,f1
p1,f2
p1,r1
p2,r1
p3,r1
p4,r1
p5,r1
p1,r2
p2,r2
p3,r2
p4,r2
p5,r2
p2,p1
p3,p3
`;

/** Pairs of 9 nodes. */
export const PAIR_COUNT = 36;

/** Three mistakes: a word for an entry (line 3), a repeated id (line 5); an unknown end (line 4). */
export const WRONG_NODES_CSV = `id,label,entry
p1,First post,1
p2,Second post,second
p3,Third post,3
p1,First post again,4
`;
export const WRONG_EDGES_CSV = `source,target
p1,p2
p2,p3
p3,p9
`;

/**
 * A network large enough that its run can be watched: `n` nodes arriving one after another, every
 * pair joined with chance `density` by a linear congruential generator (Lehmer 1951; multiplier
 * 48271 of Park, Miller and Stockmeyer 1993), so that it is the same every time.
 */
export function largeNetwork(n: number, density: number): { nodes: string; edges: string } {
  const nodes = ['id,label,entry'];
  const edges = ['source,target'];
  let state = 20_311;
  for (let i = 1; i <= n; i++) {
    nodes.push(`b${i},Buoy ${i},${i}`);
    for (let j = 1; j < i; j++) {
      state = (state * 48_271) % 2_147_483_647;
      if (state / 2_147_483_647 < density) edges.push(`b${j},b${i}`);
    }
  }
  return { nodes: `${nodes.join('\n')}\n`, edges: `${edges.join('\n')}\n` };
}

/** A text as a file of a form. */
export const csvFile = (name: string, text: string) => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(text, 'utf8'),
});
