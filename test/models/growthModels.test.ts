import { describe, expect, it } from 'vitest';
import {
  GROWTH_MODELS,
  growNetwork,
  refusalsOf,
  TooManyEdges,
  type GrownNetwork,
  type GrowthRequest,
} from '../../models/index';

const request = (model: string, more: Partial<GrowthRequest> = {}): GrowthRequest => ({
  model,
  nodeCount: 60,
  parameters: {},
  seed: 1,
  ...more,
});

/** Pairs of arrivals 1..n, the earlier one first. */
function edgesOf({ edgesCsv }: GrownNetwork): [number, number][] {
  const [, ...rows] = edgesCsv.trimEnd().split('\n');
  return rows.map((row) => {
    const [a = '', b = ''] = row.split(',');
    return [Number(a.slice(1)), Number(b.slice(1))];
  });
}

const keys = (network: GrownNetwork) => new Set(edgesOf(network).map(String));

describe.each(GROWTH_MODELS.map(({ name }) => name))('the growth model %s', (name) => {
  it('gives the same bytes for the same seed and others for another', () => {
    expect(growNetwork(request(name))).toEqual(growNetwork(request(name)));
    expect(growNetwork(request(name, { seed: 2 })).edgesCsv).not.toBe(
      growNetwork(request(name)).edgesCsv,
    );
  });

  it('joins every node to earlier ones, each at most once', () => {
    const network = growNetwork(request(name));
    const edges = edgesOf(network);
    expect(network.edgeCount).toBe(edges.length);
    expect(edges.length).toBeGreaterThan(0);
    expect(edges.every(([earlier, later]) => 1 <= earlier && earlier < later && later <= 60)).toBe(
      true,
    );
    expect(keys(network).size).toBe(edges.length);
  });

  it('arrives one by one, entries 1..n', () => {
    const rows = growNetwork(request(name, { nodeCount: 9 }))
      .nodesCsv.trimEnd()
      .split('\n');
    expect(rows).toEqual([
      'id,label,entry',
      ...Array.from({ length: 9 }, (_, i) => `n${i + 1},n${i + 1},${i + 1}`),
    ]);
  });

  it('names itself, its source, its parameters and its seed, and says that it is invented', () => {
    const model = GROWTH_MODELS.find((one) => one.name === name)!;
    const { description } = growNetwork(request(name, { seed: 77 }));
    expect(description).toMatch(/^Invented data\. /);
    for (const part of [
      model.title,
      model.source,
      'seed 77',
      ...model.parameters.map((p) => `${p.name} = `),
    ]) {
      expect(description).toContain(part);
    }
  });

  it('has one node and none too few', () => {
    const parameters: Record<string, number> =
      name === 'preferential_attachment' ? { links: 1 } : {};
    expect(refusalsOf(request(name, { nodeCount: 0, parameters }))[0]!.field).toBe('nodeCount');
    const two = growNetwork(request(name, { nodeCount: 2, parameters }));
    expect(edgesOf(two).length).toBeLessThanOrEqual(1);
    if (name === 'preferential_attachment') return;
    expect(growNetwork(request(name, { nodeCount: 1 })).edgeCount).toBe(0);
  });

  it('refuses what lies outside its ranges, by field', () => {
    const model = GROWTH_MODELS.find((one) => one.name === name)!;
    for (const { name: field, least, most, whole } of model.parameters) {
      const wrong = [least - 1, most + 1, NaN, Infinity, ...(whole ? [least + 0.5] : [])];
      for (const value of wrong) {
        const refusals = refusalsOf(request(name, { parameters: { [field]: value } }));
        expect(refusals.map((refusal) => refusal.field)).toEqual([field]);
        expect(() => growNetwork(request(name, { parameters: { [field]: value } }))).toThrow(
          RangeError,
        );
      }
    }
    expect(refusalsOf(request(name, { parameters: { colour: 1 } }))[0]!.field).toBe('colour');
    expect(refusalsOf(request(name, { seed: -1 }))[0]!.field).toBe('seed');
    expect(refusalsOf(request(name, { seed: 1.5 }))[0]!.field).toBe('seed');
  });
});

describe('the numbers of edges', () => {
  const PAIRS = (200 * 199) / 2;
  const grow = (model: string, parameters: Record<string, number>) =>
    growNetwork(request(model, { nodeCount: 200, parameters, seed: 5 }));

  /** Six standard deviations of a sum of independent trials with mean chance p. */
  const near = (count: number, p: number) =>
    expect(Math.abs(count - p * PAIRS)).toBeLessThan(6 * Math.sqrt(PAIRS * p * (1 - p)));

  it('of constant probability are p of all pairs', () => {
    near(grow('constant_probability', { p: 0.3 }).edgeCount, 0.3);
    expect(grow('constant_probability', { p: 0 }).edgeCount).toBe(0);
    expect(grow('constant_probability', { p: 1 }).edgeCount).toBe(PAIRS);
  });

  it('of rising probability are the mean over all pairs of (i / n) ^ power', () => {
    let sum = 0;
    for (let i = 2; i <= 200; i++) sum += (i - 1) * (i / 200) ** 2;
    near(grow('rising_probability', { peak: 1, power: 2 }).edgeCount, sum / PAIRS);
  });

  it('of oscillating probability follow the sine', () => {
    const edges = edgesOf(
      grow('oscillating_probability', { mean: 0.5, amplitude: 0.5, period: 4 }),
    );
    // sin(2π i / 4) is 1 at i = 1, 5, 9 …: joined to all; −1 at i = 3, 7, 11 …: joined to none.
    const degree = (i: number) => edges.filter(([, later]) => later === i).length;
    for (const i of [5, 9, 101, 197]) expect(degree(i)).toBe(i - 1);
    for (const i of [3, 7, 103, 199]) expect(degree(i)).toBe(0);
  });

  it('of preferential attachment are m (n − m), m for every later node', () => {
    const network = grow('preferential_attachment', { links: 6 });
    expect(network.edgeCount).toBe(6 * (200 - 6));
    const edges = edgesOf(network);
    for (let i = 7; i <= 200; i++) expect(edges.filter(([, later]) => later === i)).toHaveLength(6);
    const degrees = Array.from(
      { length: 200 },
      (_, i) => edges.filter((edge) => edge.includes(i + 1)).length,
    );
    // Hubs: in a graph of equal density without preference the largest degree stays below 30.
    expect(Math.max(...degrees)).toBeGreaterThan(35);
  });

  it('of random geometric graphs only grow with the radius, and are all at the diagonal', () => {
    const small = keys(grow('random_geometric', { radius: 0.1 }));
    const large = keys(grow('random_geometric', { radius: 0.2 }));
    expect([...small].every((edge) => large.has(edge))).toBe(true);
    expect(large.size).toBeGreaterThan(small.size);
    expect(grow('random_geometric', { radius: Math.SQRT2 }).edgeCount).toBe(PAIRS);
    const torus = keys(grow('random_geometric', { radius: 0.2, wrap: 1 }));
    expect([...large].every((edge) => torus.has(edge))).toBe(true);
    // On a torus every node has the same chance, π r².
    near(torus.size, Math.PI * 0.2 ** 2);
  });

  it('of growth by distance approach constant probability as the scale grows', () => {
    near(grow('distance_decay', { near: 0.4, scale: 100 }).edgeCount, 0.4 * Math.exp(-0.0052));
    expect(grow('distance_decay', { near: 0.9, scale: 0.02 }).edgeCount).toBeLessThan(
      grow('distance_decay', { near: 0.9, scale: 0.2 }).edgeCount,
    );
  });

  it('past two million are refused in words', () => {
    const all = request('constant_probability', { nodeCount: 5_000, parameters: { p: 1 } });
    expect(() => growNetwork(all)).toThrow(TooManyEdges);
  });
});

it('an amplitude that leaves the range of a probability is refused at its field', () => {
  const parameters = { mean: 0.2, amplitude: 0.3, period: 10 };
  expect(refusalsOf(request('oscillating_probability', { parameters }))).toMatchObject([
    { field: 'amplitude' },
  ]);
});

it('more links than there are earlier nodes are refused at their field', () => {
  const refused = refusalsOf(
    request('preferential_attachment', { nodeCount: 4, parameters: { links: 4 } }),
  );
  expect(refused).toMatchObject([{ field: 'links' }]);
});

it('an unknown model is refused with the names of the known ones', () => {
  const [refusal] = refusalsOf(request('small_talk'));
  expect(refusal!.field).toBe('model');
  for (const { name } of GROWTH_MODELS) expect(refusal!.message).toContain(name);
});
