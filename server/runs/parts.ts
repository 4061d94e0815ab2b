import type { RunFocus, RunPart } from '#contract/enums';
import type { RunFocusRequest } from '#contract/runs';
import { canonicalPart } from '../../db/repositories/runParts';
import { invalid, notFound } from '../http/parse';
import type { Arrivals } from './arrivals';

/**
 * The part in its canonical form.
 * @throws Failure `request.invalid` where it names a node or position that the revision has not, or
 *   no pair at all
 */
export function requirePart(part: RunPart, nodeCount: number): RunPart {
  if (part.kind !== 'chosen') return part;
  const { windows, nodes, pairs } = part;
  if (windows.length + nodes.length + pairs.length === 0) {
    throw invalid([
      { field: 'part', message: 'Choose at least one window, one node or one pair.' },
    ]);
  }
  const missing = [...windows, nodes, ...pairs].flat().find((place) => place >= nodeCount);
  if (missing !== undefined) {
    throw invalid([
      {
        field: 'part',
        message: `There is no node or position ${missing}: the revision has ${nodeCount} nodes, counted from 0.`,
      },
    ]);
  }
  return canonicalPart(part);
}

/** @throws Failure 404 where the network has no such node, pair or window */
export function focusOf(
  request: RunFocusRequest,
  { positionOf }: Pick<Arrivals, 'positionOf'>,
): RunFocus {
  const nodeCount = positionOf.length;
  switch (request.kind) {
    case 'node': {
      const p = positionOf[request.row];
      if (p === undefined) throw notFound('nodes');
      return { kind: 'node', p };
    }
    case 'pair': {
      const [a, b] = [positionOf[request.a], positionOf[request.b]];
      if (a === undefined || b === undefined || a === b) throw notFound('pairs');
      return { kind: 'pair', p: Math.min(a, b), q: Math.max(a, b) };
    }
    case 'window': {
      const { from, to } = request;
      if (from >= to || from >= nodeCount) throw notFound('windows');
      return { kind: 'window', from, to: Math.min(to, nodeCount - 1) };
    }
  }
}
