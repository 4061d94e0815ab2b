import { parseArgs } from 'node:util';
import { z } from 'zod';

/** Parts of the benchmark; `product` is measured alone, with servers of its own. */
export const SECTIONS = ['matrix', 'first-form', 'growth', 'product'] as const;
export type Section = (typeof SECTIONS)[number];

const whole = (least: number, most: number) => z.coerce.number().int().min(least).max(most);
const list = z.string().transform((text) => text.split(',').filter((one) => one !== ''));

/** Every option with its meaning and default. */
const schema = z.object({
  /** Sections to run. */
  sections: list.pipe(z.array(z.enum(SECTIONS))).default(['matrix', 'first-form', 'growth']),
  /** Only graphs whose names begin with one of these. */
  graphs: list.default([]),
  /** Highest dimension D. */
  dimension: whole(0, 3).default(3),
  /** Repetitions of our own times; a matrix over a minute in all is not repeated. */
  repeats: whole(1, 100).default(3),
  /** Swaps of the sample that outside programs compute. */
  swaps: whole(0, 10_000).default(9),
  /** Seconds within which an outside program must begin a swap of a graph's sample. */
  'outside-seconds': z.coerce.number().min(0).default(60),
  /** Graphs with more cliques than this, in thousands, are not given to the outside programs. */
  outside: z.coerce.number().min(0).default(2000),
  /** Rows of the first form: a whole matrix that would take longer than so many seconds is sampled. */
  'first-form-seconds': z.coerce.number().min(0).default(300),
  /** Rows of such a sample. */
  'first-form-rows': whole(2, 10_000).default(48),
  /** A size that would take longer than so many seconds ends a growth curve. */
  'growth-seconds': z.coerce.number().min(0).default(120),
  /** Runs of each kind through the product. */
  runs: whole(1, 100).default(5),
});
export type Options = z.infer<typeof schema>;

/** @throws Error with a plain sentence naming the option that is wrong */
export function readOptions(args: readonly string[]): Options {
  const strings = Object.keys(schema.shape).map((name) => [name, { type: 'string' }] as const);
  const { values } = parseArgs({
    args: [...args],
    options: { ...Object.fromEntries(strings), product: { type: 'boolean' } },
  });
  const { product, ...given } = values;
  const parsed = schema.safeParse(product === true ? { ...given, sections: 'product' } : given);
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  throw new Error(`--${String(issue?.path[0])} is wrong: ${issue?.message ?? 'it is not valid'}.`);
}
