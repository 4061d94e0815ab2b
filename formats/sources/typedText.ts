import { quoted } from '../issues';

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const NO_NUMBER = /^(?:nan|[+-]?inf(?:inity)?)$/i;
const TRUTH = /^(?:true|false|0|1)$/i;

/**
 * Declared types of GraphML and GEXF whose values are checked. Whole numbers may have decimals: networkx
 * (2.8.8) declares an attribute by its first value, and the text is kept as it is written anyway.
 */
const CHECKS: ReadonlyMap<string, { readonly pattern: RegExp; readonly words: string }> = new Map([
  ...['int', 'integer', 'long', 'short', 'byte', 'float', 'double', 'bigdecimal'].map(
    (type) => [type, { pattern: NUMBER, words: 'no number' }] as const,
  ),
  ['boolean', { pattern: TRUTH, words: 'neither true nor false' }],
]);

/** Whether values of a declared type are numbers or truth values, whose surrounding spaces mean nothing. */
export const isChecked = (type: string): boolean => CHECKS.has(type.toLowerCase());

/**
 * What is wrong with a value of a declared type; null if nothing, or if it is empty. NaN and INF are
 * numbers to XML; whether they can order nodes is seen later.
 */
export function typeFault(text: string, type: string): string | null {
  const check = CHECKS.get(type.toLowerCase());
  if (!check || text === '' || check.pattern.test(text)) return null;
  if (check.pattern === NUMBER && NO_NUMBER.test(text)) return null;
  return `${quoted(text)} is ${check.words}, but the attribute is declared as ${type}. Correct the value or the declaration.`;
}
