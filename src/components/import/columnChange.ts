import type { ImportChoices } from '#contract/importChoices';
import type { TablePart } from './columnFields';

/**
 * The choices with another column. What was answered about the times of one column does not hold for
 * another: where the order comes from the changed one, it is asked anew.
 */
export function withColumn(
  choices: ImportChoices,
  part: TablePart,
  name: string,
  column: string | null,
): ImportChoices {
  const columns = { ...choices.columns, [part]: { ...choices.columns[part], [name]: column } };
  const changed = { ...choices, columns };
  const { nodes, edges } = choices.columns;
  // Rows gave the order only because no column did.
  const fromRows = choices.order.kind === 'rows' && nodes.entry === null && edges.time === null;
  const isEntry = part === 'nodes' && name === 'entry';
  if (isEntry && fromRows && column !== null)
    return { ...anew(changed), order: { kind: 'column' } };
  const isTimed =
    (isEntry && choices.order.kind === 'column') ||
    (part === 'edges' && name === 'time' && choices.order.kind === 'first_edge');
  return isTimed ? anew(changed) : changed;
}

const anew = (choices: ImportChoices): ImportChoices => ({
  ...choices,
  dayOrder: null,
  years: 'numbers',
  missing: 'refuse',
});
