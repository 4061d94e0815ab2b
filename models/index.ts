import { preferentialAttachment } from './attachment';
import { drawFrom, GENERATOR } from './draw';
import { distanceDecay, randomGeometric } from './places';
import { constantProbability, oscillatingProbability, risingProbability } from './probabilities';
import type { GrowthModel, GrowthRequest, GrownNetwork, Parameters, Refusal } from './types';

export type {
  GrowthModel,
  GrowthRequest,
  GrownNetwork,
  ModelName,
  Parameter,
  Refusal,
} from './types';

/** Models of growth, from the plainest on. */
export const GROWTH_MODELS: readonly GrowthModel[] = [
  constantProbability,
  risingProbability,
  oscillatingProbability,
  preferentialAttachment,
  randomGeometric,
  distanceDecay,
];

export const GROWTH_LIMITS = { nodes: 5_000, edges: 2_000_000, seed: 2 ** 31 - 1 } as const;

/** More edges than may be stored came out. */
export class TooManyEdges extends Error {
  override readonly name = 'TooManyEdges';
}

/** Everything that is wrong with a request; empty if it can be grown. */
export function refusalsOf({ model, nodeCount, parameters, seed }: GrowthRequest): Refusal[] {
  const found = GROWTH_MODELS.find(({ name }) => name === model);
  if (found === undefined) {
    const names = GROWTH_MODELS.map(({ name }) => name).join(', ');
    return [{ field: 'model', message: `There is no such model. Choose one of ${names}.` }];
  }
  const refusals = [
    ...outside('nodeCount', nodeCount, { least: 1, most: GROWTH_LIMITS.nodes, whole: true }),
    ...outside('seed', seed, { least: 0, most: GROWTH_LIMITS.seed, whole: true }),
    ...Object.keys(parameters)
      .filter((name) => !found.parameters.some((parameter) => parameter.name === name))
      .map((field) => ({ field, message: 'This model has no such parameter. Leave it out.' })),
    ...found.parameters.flatMap((parameter) =>
      outside(parameter.name, valueOf(parameters, parameter), parameter),
    ),
  ];
  if (refusals.length > 0) return refusals;
  const conflict = found.conflict(nodeCount, valuesOf(found, parameters));
  return conflict === null ? [] : [conflict];
}

/**
 * Grows a network node by node: node i arrives i-th, its entry is i (1..n). The same request gives
 * the same bytes on every machine.
 *
 * @throws RangeError for a request that `refusalsOf` refuses; TooManyEdges past 2,000,000 edges
 */
export function growNetwork(request: GrowthRequest): GrownNetwork {
  const [refusal] = refusalsOf(request);
  const model = GROWTH_MODELS.find(({ name }) => name === request.model);
  if (model === undefined || refusal !== undefined) {
    throw new RangeError(refusal ? `${refusal.field}: ${refusal.message}` : 'No such model.');
  }
  const { nodeCount, seed } = request;
  const values = valuesOf(model, request.parameters);
  const lines = ['source,target'];
  model.grow(nodeCount, values, drawFrom(seed), (earlier, later) => {
    if (lines.length > GROWTH_LIMITS.edges) {
      throw new TooManyEdges(
        `More than ${GROWTH_LIMITS.edges.toLocaleString('en')} edges come out. Choose fewer nodes or a sparser network.`,
      );
    }
    lines.push(`${idOf(earlier)},${idOf(later)}`);
  });
  const nodes = Array.from({ length: nodeCount }, (_, i) => `${idOf(i)},${idOf(i)},${i + 1}`);
  return {
    nodesCsv: `${['id,label,entry', ...nodes].join('\n')}\n`,
    edgesCsv: `${lines.join('\n')}\n`,
    nodeCount,
    edgeCount: lines.length - 1,
    description: describe(model, values, seed),
  };
}

const idOf = (i: number): string => `n${i + 1}`;

const valueOf = (parameters: Parameters, { name, standard }: { name: string; standard: number }) =>
  (Object.hasOwn(parameters, name) ? parameters[name] : undefined) ?? standard;

function valuesOf({ parameters }: GrowthModel, given: Parameters): Parameters {
  return Object.fromEntries(parameters.map((one) => [one.name, valueOf(given, one)]));
}

function outside(
  field: string,
  value: number,
  { least, most, whole }: { least: number; most: number; whole: boolean },
): Refusal[] {
  const fits = Number.isFinite(value) && value >= least && value <= most;
  if (fits && (!whole || Number.isInteger(value))) return [];
  return [{ field, message: `Give a ${whole ? 'whole ' : ''}number from ${least} to ${most}.` }];
}

function describe({ title, rule, source }: GrowthModel, values: Parameters, seed: number): string {
  const chosen = Object.entries(values).map(([name, value]) => `${name} = ${value}`);
  return (
    `Invented data. ${title}: ${rule} Parameters: ${chosen.join(', ')}. ` +
    `Drawn with ${GENERATOR}, seed ${seed}. Model: ${source}.`
  );
}
