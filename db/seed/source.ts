import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';

/** Seeded numbers: the same seed gives the same demo data on every machine. */
export interface Source {
  /** Uniform in [0, 1). */
  real(): number;
  /** Uniform whole number in [from, to], both included. */
  integer(from: number, to: number): number;
}

export function sourceOf(seed: number): Source {
  const generator = xoroshiro128plus(seed);
  return {
    real: () => uniformFloat64(generator),
    integer: (from, to) => uniformInt(generator, from, to),
  };
}

/** Cells joined to the text of a table; none of the demo data needs quotes. */
export function tableText(header: string, rows: readonly (readonly (string | number)[])[]): string {
  return `${[header, ...rows.map((row) => row.join(','))].join('\n')}\n`;
}

/** A network of the demo workspace, as the two files that a person would upload. */
export interface DemoNetwork {
  readonly name: string;
  readonly description: string;
  /** Whether it is made up; worked cases are not, they come from the source that they name. */
  readonly invented: boolean;
  readonly nodesCsv: string;
  readonly edgesCsv: string;
}
