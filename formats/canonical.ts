import { createHash } from 'node:crypto';
import type { ReadNetwork } from './types';

/** Names the canonical form below; a change of the form is a change of this line. */
const FORM = 'heddle network 1';

/**
 * SHA-256, hexadecimal, of a network's canonical form: the unit, every node in row order (id, label,
 * raw and understood times) and every edge by node rows, one JSON array a line. Two files that mean
 * the same network in the same node order give the same hash, whatever the order and direction of
 * their edges.
 */
export function contentHash({
  nodes,
  edges,
  entryUnit,
}: Omit<ReadNetwork, 'report' | 'weights'>): string {
  const hash = createHash('sha256');
  hash.update(`${JSON.stringify([FORM, entryUnit, nodes.length, edges.length / 2])}\n`);
  for (const node of nodes) {
    const { id, label, entryRaw, entry, earliestRaw, earliest, latestRaw, latest } = node;
    hash.update(
      `${JSON.stringify([id, label, entryRaw, entry, earliestRaw, earliest, latestRaw, latest])}\n`,
    );
  }
  for (let at = 0; at < edges.length; at += 2) hash.update(`${edges[at]},${edges[at + 1]}\n`);
  return hash.digest('hex');
}
