import type { GraphFormat } from './types';

const ENDINGS: readonly (readonly [RegExp, GraphFormat])[] = [
  [/\.graphml$/i, 'graphml'],
  [/\.gexf$/i, 'gexf'],
  [/\.json$/i, 'node_link'],
  [/\.gml$/i, 'gml'],
  [/\.(?:net|paj)$/i, 'pajek'],
];

/**
 * Which graph format a file is in, by how it begins and only then by its name; null for a table.
 * @param head the first characters of the file
 */
export function detectFormat(head: string, name: string): GraphFormat | null {
  const start = head.trimStart();
  const byName = ENDINGS.find(([pattern]) => pattern.test(name))?.[1] ?? null;
  if (/^<[?!\w]/.test(start)) return xmlFormat(start) ?? byName ?? 'graphml';
  if (/^(?:\{\s*["}]|\[\s*[[{"\]])/.test(start)) return 'node_link';
  if (/^\*\s*(?:network|vertices|matrix|edges|arcs|partition)/i.test(withoutComments(start, '%')))
    return 'pajek';
  if (GML.test(withoutComments(start, '#'))) return 'gml';
  return byName;
}

/** Lines like `Creator "…"` may stand before the graph. */
const GML =
  /^(?:(?:creator|version|comment|directed)[ \t]+(?:"[^"]*"\s+|[\d.]+\s+|(?![\s\d"])[^\n\r"]*[\n\r]\s*)){0,20}graph\s*\[/i;

/** By the first element that is known, whatever stands before it. */
function xmlFormat(text: string): GraphFormat | null {
  const [, element = ''] = /<(?:\w+:)?(graphml|gexf)[\s>/]/i.exec(text) ?? [];
  switch (element.toLowerCase()) {
    case 'graphml':
      return 'graphml';
    case 'gexf':
      return 'gexf';
    default:
      return null;
  }
}

/** The text from its first line that is no comment. */
function withoutComments(text: string, mark: '%' | '#'): string {
  let rest = text;
  while (rest.startsWith(mark)) {
    const end = rest.search(/[\n\r]/);
    if (end < 0) return '';
    rest = rest.slice(end).trimStart();
  }
  return rest.slice(0, 4_000);
}
