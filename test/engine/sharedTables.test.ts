import { MessageChannel, receiveMessageOnPort } from 'node:worker_threads';
import { describe, expect, it } from 'vitest';
import {
  adoptPrepared,
  computeRows,
  prepare,
  preparedData,
  recordedBarcode,
  type PreparedData,
} from '../../jobs/engine/index';
import { EngineLimitError, type Control } from '../../jobs/engine/types';
import { constantProbability } from '../support/graphs';

const QUIET: Control = { shouldStop: () => false, onProgress: () => undefined };
const LIMITS = { simplices: 1e6, bytes: 2 ** 28 };
const NODES = 40;

/** What another thread would receive. */
function posted(data: PreparedData): PreparedData {
  const { port1, port2 } = new MessageChannel();
  port1.postMessage(data);
  const received = receiveMessageOnPort(port2)?.message as PreparedData;
  port1.close();
  return received;
}

describe('tables in shared memory', () => {
  const prepared = prepare(constantProbability(NODES, 0.4, 3), 3, LIMITS, QUIET, 'shared');
  const data = posted(preparedData(prepared));
  const rows = Uint32Array.from({ length: NODES }, (_, p) => p);

  it('give every reader the same barcode and the same matrix as the tables of its own', () => {
    const own = prepare(constantProbability(NODES, 0.4, 3), 3, LIMITS, QUIET);
    const [first, second] = [adoptPrepared(data, LIMITS), adoptPrepared(data, LIMITS)];
    expect(recordedBarcode(first)).toEqual(recordedBarcode(own));
    const expected = computeRows(own, rows, QUIET);
    // In turns, so that what one of them writes would show in the other.
    const even = computeRows(
      first,
      rows.filter((p) => p % 2 === 0),
      QUIET,
    );
    expect(computeRows(second, rows, QUIET)).toEqual(expected);
    expect(
      computeRows(
        first,
        rows.filter((p) => p % 2 === 0),
        QUIET,
      ),
    ).toEqual(even);
    expect(computeRows(first, rows, QUIET)).toEqual(expected);
  });

  it('are posted without a copy', () => {
    const { nodes } = data.foundation.tables.levels[3]!;
    expect(nodes.buffer).toBeInstanceOf(SharedArrayBuffer);
    const there = prepared.foundation.tables.levels[3]!.nodes;
    const before = there[0]!;
    there[0] = 12_345;
    expect(nodes[0]).toBe(12_345);
    there[0] = before;
  });

  it('count in the account of every reader', () => {
    expect(() => adoptPrepared(data, { ...LIMITS, bytes: 10_000 })).toThrow(EngineLimitError);
  });
});
