import { EngineInputError, type PairChoice } from './types';

/** Every pair (p, q), q > p, of whole rows, in the order of the rows given. */
export function wholeRows(rows: Uint32Array, nodeCount: number): PairChoice {
  const starts = new Uint32Array(rows.length + 1);
  rows.forEach((p, i) => (starts[i + 1] = starts[i]! + nodeCount - 1 - p));
  const partners = new Uint32Array(starts[rows.length]!);
  rows.forEach((p, i) => {
    for (let q = p + 1; q < nodeCount; q++) partners[starts[i]! + q - p - 1] = q;
  });
  return { rows, starts, partners };
}

/** @throws EngineInputError unless every row's partners are later positions in ascending order. */
export function validateChoice({ rows, starts, partners }: PairChoice, nodeCount: number): void {
  if (starts.length !== rows.length + 1 || starts[0] !== 0) {
    throw new EngineInputError(
      'A choice of pairs needs one start per row and one for the end, from 0.',
    );
  }
  if (starts[rows.length] !== partners.length) {
    throw new EngineInputError('The last start of a choice of pairs is the number of its pairs.');
  }
  rows.forEach((p, i) => {
    let before = p;
    if (p >= nodeCount) throw missingPosition(p, nodeCount);
    if (starts[i + 1]! < starts[i]!) {
      throw new EngineInputError('The starts of a choice of pairs must not fall.');
    }
    for (const q of partners.subarray(starts[i], starts[i + 1])) {
      if (q >= nodeCount) throw missingPosition(q, nodeCount);
      if (q <= before) {
        throw new EngineInputError(
          `Partners of arrival position ${p} must be later and ascend; ${q} stands after ${before}.`,
        );
      }
      before = q;
    }
  });
}

export function missingPosition(position: number, nodeCount: number): EngineInputError {
  return new EngineInputError(
    `There is no arrival position ${position}: the network has ${nodeCount} nodes.`,
  );
}
