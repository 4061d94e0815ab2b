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

/** A text as a file of a form. */
export const csvFile = (name: string, text: string) => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(text, 'utf8'),
});
