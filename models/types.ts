/** Seeded numbers: the same seed gives the same sequence on every machine. */
export interface Draw {
  /** Uniform in [0, 1). */
  real(): number;
  /** Uniform integer in [from, to], both included. */
  integer(from: number, to: number): number;
}

export type ModelName =
  | 'constant_probability'
  | 'rising_probability'
  | 'oscillating_probability'
  | 'preferential_attachment'
  | 'random_geometric'
  | 'distance_decay';

/** A number that somebody chooses. */
export interface Parameter {
  readonly name: string;
  readonly label: string;
  /** What it does, in a sentence. */
  readonly meaning: string;
  /** Smallest and largest value, both allowed. */
  readonly least: number;
  readonly most: number;
  readonly whole: boolean;
  readonly standard: number;
}

export type Parameters = Readonly<Record<string, number>>;

/** Receives an edge between two nodes 0..n-1, the earlier one first. */
export type Join = (earlier: number, later: number) => void;

export interface GrowthModel {
  readonly name: ModelName;
  readonly title: string;
  /** The rule by which node i = 1..n is joined to earlier ones. */
  readonly rule: string;
  /** Author, year, where published. */
  readonly source: string;
  readonly parameters: readonly Parameter[];
  /** What is wrong with parameters that are each within their range; null if nothing. */
  conflict(nodeCount: number, values: Parameters): Refusal | null;
  grow(nodeCount: number, values: Parameters, draw: Draw, join: Join): void;
}

/** What is wrong with a request, at which field. */
export interface Refusal {
  /** Name of the parameter, or `model`, `nodeCount`, `seed`. */
  readonly field: string;
  readonly message: string;
}

export interface GrowthRequest {
  readonly model: string;
  readonly nodeCount: number;
  /** A parameter that is left out takes its standard value. */
  readonly parameters: Parameters;
  /** 0 .. 2³¹ − 1. */
  readonly seed: number;
}

/** A grown network as the two tables that an upload has. */
export interface GrownNetwork {
  readonly nodesCsv: string;
  readonly edgesCsv: string;
  readonly nodeCount: number;
  readonly edgeCount: number;
  /** Begins with “Invented data.” and names model, source, parameters, generator and seed. */
  readonly description: string;
}
