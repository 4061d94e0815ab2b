import { expect } from 'vitest';
import { contentHash } from '../../formats/canonical';
import type { ReadNetwork } from '../../formats/types';
import type { Brought } from './bring';

/** What holds of every import, whatever was in the file: a whole network, or why there is none. */
export function expectLaws({ network, issues, questions, found, sources }: Brought): void {
  expect(network !== null).toBe(issues.length === 0 && questions.length === 0);
  for (const { message, file } of issues) {
    expect(message).not.toBe('');
    expect(typeof file).toBe('string');
  }
  for (const table of sources.flatMap(({ nodes, edges }) => [nodes, edges])) {
    if (!table) continue;
    expect(new Set(table.columns.map((name) => name.normalize('NFC'))).size).toBe(
      table.columns.length,
    );
    let rows = 0;
    for (const { cells } of table.rows()) {
      rows++;
      if (cells.length !== table.columns.length) expect(cells).toHaveLength(table.columns.length);
    }
    expect(rows).toBe(table.rowCount);
  }
  if (network) expectNetwork(network);
  expect(JSON.parse(JSON.stringify(found))).toEqual(found);
}

function expectNetwork(network: ReadNetwork): void {
  const { nodes, edges, weights } = network;
  expect(nodes.length).toBeGreaterThan(0);
  expect(new Set(nodes.map(({ id }) => id.normalize('NFC'))).size).toBe(nodes.length);
  for (const { id, label, entry, entryRaw, earliest, latest } of nodes) {
    expect(id).not.toBe('');
    expect(/[\0\p{Surrogate}]/u.test(id + label + entryRaw)).toBe(false);
    expect(Number.isFinite(entry)).toBe(true);
    if (earliest !== null) expect(earliest).toBeLessThanOrEqual(entry);
    if (latest !== null) expect(latest).toBeGreaterThanOrEqual(entry);
  }
  if (weights) expect(weights.length).toBe(edges.length / 2);
  let previous = -1;
  for (let at = 0; at < edges.length; at += 2) {
    const [low = 0, high = 0] = [edges[at], edges[at + 1]];
    const key = low * nodes.length + high;
    expect(low < high && high < nodes.length && key > previous).toBe(true);
    previous = key;
  }
  expect(contentHash(network)).toMatch(/^[0-9a-f]{64}$/);
}
