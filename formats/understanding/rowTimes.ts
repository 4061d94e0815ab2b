import { NO_TIMES, type DraftNode, type TimedNodes } from './draft';

const NO_WINDOWS = { given: 0, years: 0, months: 0, edgesWithoutTime: 0, ambiguous: [] };

/**
 * Times that are the order of rows: 1, 2, … down the node table; without one, the number of the
 * edge row that first names the node, so that two nodes that one row brings in are tied.
 * @param byTable whether there is a node table; nodes without a row in it have the entry null
 */
export function timesByRow(nodes: readonly DraftNode[], byTable: { table: boolean }): TimedNodes {
  const steps = new Map<number, number>();
  const times = nodes.map(({ line, listed }, row) => {
    if (byTable.table && !listed) return NO_TIMES;
    if (!byTable.table && !steps.has(line)) steps.set(line, steps.size + 1);
    const entry = byTable.table ? row + 1 : (steps.get(line) ?? 0);
    return { ...NO_TIMES, entryRaw: String(entry), entry };
  });
  return { unit: 'number', times, ...NO_WINDOWS };
}
