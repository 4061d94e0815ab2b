import fc from 'fast-check';

/** Mutants of each parser: a few hundred in every run, as many as HEDDLE_FUZZ says in a long one. */
export const MUTANTS = Number(process.env['HEDDLE_FUZZ'] ?? 300);

/** The seed of the mutants; another in every long run that does not name one. */
export const MUTANT_SEED = Number(
  process.env['HEDDLE_FUZZ_SEED'] ??
    (process.env['HEDDLE_FUZZ'] === undefined ? 1 : Date.now() % 2 ** 31),
);

const TOKENS = [
  '\0',
  '\ufeff',
  '"',
  '""',
  '\r',
  '\n',
  '\r\n',
  ',',
  ';',
  '\t',
  '|',
  ' ',
  '  ',
  '#',
  '%',
  'sep=;\n',
  '<',
  '>',
  '&',
  '&#0;',
  '&lt;',
  ']]>',
  '<!--',
  '<!DOCTYPE x [<!ENTITY a "b">]>',
  '{',
  '}',
  '[',
  ']',
  ':',
  '\\u0000',
  '\\ud800',
  '__proto__',
  'constructor',
  'id',
  'source',
  'target',
  'entry',
  'weight',
  'NaN',
  'Infinity',
  '-0',
  '1e309',
  '1e-320',
  '9007199254740993',
  '0x10',
  '1,5',
  '1.5',
  '-1',
  '01/02/2024',
  '13/13/2024',
  '2024-02-30',
  '2024-01-01T24:00',
  '2024-01-01T10:00+99:00',
  '0000',
  '1987',
  '1987-03',
  'NA',
  '*Vertices 99999999999',
  '*Edges',
  'graph [',
  'node [ id 1 ]',
  '\u202e',
  'e\u0301',
  '\u00e9',
  '=HYPERLINK("x")',
  'a'.repeat(400),
  '['.repeat(300),
  '<g>'.repeat(300),
].map((token) => new TextEncoder().encode(token));

/** One change to the bytes of a file; places are shares of its length. */
type Change =
  | { readonly kind: 'insert'; readonly at: number; readonly token: Uint8Array }
  | { readonly kind: 'delete'; readonly at: number; readonly length: number }
  | {
      readonly kind: 'repeat';
      readonly at: number;
      readonly length: number;
      readonly times: number;
    }
  | { readonly kind: 'flip'; readonly at: number; readonly bit: number }
  | { readonly kind: 'cut'; readonly at: number }
  | { readonly kind: 'splice'; readonly at: number; readonly from: number };

const place = fc.double({ min: 0, max: 1, noNaN: true });
const change: fc.Arbitrary<Change> = fc.oneof(
  {
    weight: 4,
    arbitrary: fc.record({
      kind: fc.constant('insert' as const),
      at: place,
      token: fc.constantFrom(...TOKENS),
    }),
  },
  fc.record({
    kind: fc.constant('delete' as const),
    at: place,
    length: fc.integer({ min: 1, max: 30 }),
  }),
  fc.record({
    kind: fc.constant('repeat' as const),
    at: place,
    length: fc.integer({ min: 1, max: 60 }),
    times: fc.integer({ min: 1, max: 50 }),
  }),
  fc.record({ kind: fc.constant('flip' as const), at: place, bit: fc.nat({ max: 7 }) }),
  fc.record({ kind: fc.constant('cut' as const), at: place }),
  fc.record({ kind: fc.constant('splice' as const), at: place, from: place }),
);

/** A file with one to six changes; some of them bring in a stretch of another file. */
export const mutantOf = <File extends { readonly bytes: Uint8Array }>(
  files: readonly File[],
): fc.Arbitrary<File> =>
  fc
    .tuple(
      fc.constantFrom(...files),
      fc.constantFrom(...files),
      fc.array(change, { minLength: 1, maxLength: 6 }),
    )
    .map(([file, other, changes]) => ({
      ...file,
      bytes: changes.reduce((bytes, one) => changed(bytes, one, other.bytes), file.bytes),
    }));

function changed(bytes: Uint8Array, one: Change, other: Uint8Array): Uint8Array {
  const at = Math.floor(one.at * bytes.length);
  const [before, after] = [bytes.subarray(0, at), bytes.subarray(at)];
  switch (one.kind) {
    case 'insert':
      return joined(before, one.token, after);
    case 'delete':
      return joined(before, after.subarray(one.length));
    case 'repeat':
      return joined(
        before,
        ...Array.from({ length: one.times }, () => after.subarray(0, one.length)),
        after,
      );
    case 'flip': {
      const copy = bytes.slice();
      copy[at] = (copy[at] ?? 0) ^ (1 << one.bit);
      return copy;
    }
    case 'cut':
      return before;
    case 'splice':
      return joined(before, other.subarray(Math.floor(one.from * other.length)));
  }
}

const joined = (...pieces: readonly Uint8Array[]): Uint8Array =>
  new Uint8Array(Buffer.concat(pieces));
