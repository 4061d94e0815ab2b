/** Characters that are gathered before they are given on. */
const ENOUGH = 65_536;

/** Joins many short pieces of text to fewer of some 64 KB. */
export function* batches(pieces: Iterable<string>): Generator<string> {
  let batch = '';
  for (const piece of pieces) {
    batch += piece;
    if (batch.length < ENOUGH) continue;
    yield batch;
    batch = '';
  }
  if (batch !== '') yield batch;
}
