import { createHash } from 'node:crypto';
import type { ReadNetwork } from './types';

/** Names the canonical form below; a change of the form is a change of this line. */
const FORM = 'heddle network 1';

type Content = Omit<ReadNetwork, 'report' | 'weights'>;

/** Edges written in one piece. */
const EDGES_AT_ONCE = 20_000;

/**
 * SHA-256, hexadecimal, of a network's canonical form: the unit, every node in row order (id, label,
 * raw and understood times) and every edge by node rows, one JSON array a line. Two files that mean
 * the same network in the same node order give the same hash, whatever the order and direction of
 * their edges.
 */
export function contentHash(content: Content): string {
  const hash = createHash('sha256');
  for (const piece of canonicalPieces(content)) hash.update(piece);
  return hash.digest('hex');
}

/** The same, with other work let in between the pieces: two million edges take a while. */
export async function contentHashInTurns(content: Content): Promise<string> {
  const hash = createHash('sha256');
  for (const piece of canonicalPieces(content)) {
    hash.update(piece);
    await new Promise((resolve) => setImmediate(resolve));
  }
  return hash.digest('hex');
}

function* canonicalPieces({ nodes, edges, entryUnit }: Content): Generator<string> {
  yield `${JSON.stringify([FORM, entryUnit, nodes.length, edges.length / 2])}\n`;
  let lines = '';
  for (const node of nodes) {
    const { id, label, entryRaw, entry, earliestRaw, earliest, latestRaw, latest } = node;
    lines += `${JSON.stringify([id, label, entryRaw, entry, earliestRaw, earliest, latestRaw, latest])}\n`;
  }
  yield lines;
  for (let from = 0; from < edges.length; from += 2 * EDGES_AT_ONCE) {
    const end = Math.min(edges.length, from + 2 * EDGES_AT_ONCE);
    let piece = '';
    for (let at = from; at < end; at += 2) piece += `${edges[at]},${edges[at + 1]}\n`;
    yield piece;
  }
}
