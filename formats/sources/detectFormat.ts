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
  const start = head.replace(/^(?:\s|<\?xml[^>]*>|<!--[\s\S]*?-->|<!DOCTYPE[^>]*>)+/i, '');
  if (/^<(?:\w+:)?graphml[\s>]/i.test(start)) return 'graphml';
  if (/^<(?:\w+:)?gexf[\s>]/i.test(start)) return 'gexf';
  if (/^[{[]/.test(start)) return 'node_link';
  if (/^\*\s*(?:network|vertices|matrix|edges|arcs|partition)/im.test(withoutComments(start, '%')))
    return 'pajek';
  if (
    /^(?:creator\b[^\n\r]*|version\b[^\n\r]*|comment\b[^\n\r]*|\s)*graph\s*\[/i.test(
      withoutComments(start, '#'),
    )
  )
    return 'gml';
  const ending = ENDINGS.find(([pattern]) => pattern.test(name));
  if (ending) return ending[1];
  return start.startsWith('<') ? 'graphml' : null;
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
