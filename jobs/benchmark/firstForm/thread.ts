import { countCliques } from '../../engine/cliques';
import { adoptFoundation, foundationData } from '../../engine/fast/foundation';
import { arrivalOrder, orderGraph } from '../../engine/graph';
import type { PreparedData } from '../../engine/index';
import type { RowResults } from '../../engine/types';
import type { Outcome, Subject, Task } from '../../pool/tasks';
import { FirstForm, layFirstForm } from './firstForm';

/** The last network with this thread's own buffers. */
let kept: { readonly key: string; readonly form: FirstForm } | null = null;

/** Tables in shared memory, as the threads of the engine have them. */
function prepareShared({ network, maxDimension, limits }: Subject): PreparedData {
  const graph = orderGraph(network, arrivalOrder(network.values));
  const counts = countCliques(graph, maxDimension + 2, limits.simplices);
  const foundation = foundationData(layFirstForm(network, maxDimension, limits, 'shared'));
  const { nodeCount, values } = graph;
  return { subject: { nodeCount, maxDimension, values, counts }, foundation };
}

function formFor({ subject, tables }: Task): FirstForm {
  if (kept?.key === subject.key) return kept.form;
  if (tables === null) throw new Error('A task came without the tables of its run.');
  kept = null;
  const form = new FirstForm(adoptFoundation(tables.foundation, subject.limits));
  kept = { key: subject.key, form };
  return form;
}

/** One task of a pool whose threads compute by the first form; only rows are known here. */
export default function work(task: Task): Outcome<PreparedData | RowResults> {
  const from = performance.now();
  if (task.kind !== 'prepare' && task.kind !== 'rows') throw new Error(`No ${task.kind} here.`);
  const result =
    task.kind === 'prepare' ? prepareShared(task.subject) : formFor(task).rows(task.rows);
  return { kind: 'finished', result, seconds: (performance.now() - from) / 1000 };
}
