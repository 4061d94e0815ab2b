import { expect, test } from 'vitest';
import { detectFormat } from '../../../formats/sources/detectFormat';

test.each([
  ['<?xml version="1.0"?>\n<!-- x --><graphml xmlns="x">', 'net.csv', 'graphml'],
  ['<!DOCTYPE g [<!ENTITY a "<b>">]><graphml>', 'net.xml', 'graphml'],
  ['<gexf version="1.3">', 'net.graphml', 'gexf'],
  ['<html>', 'page.xml', 'graphml'],
  ['<html>', 'page.gexf', 'gexf'],
  ['{"nodes": []', 'pasted text', 'node_link'],
  ['[{"id": 1}]', 'pasted text', 'node_link'],
  ['[id],[label]\n1,2\n', 'table.csv', null],
  ['Creator "x"\nVersion 1\ngraph\n[\n', 'pasted text', 'gml'],
  ['Version 1 Creator "x" directed 0 graph [', 'pasted text', 'gml'],
  ['comment one of "two"\n', 'pasted text', null],
  // Told at once, however often a word that may stand before a graph comes back.
  ['version="1.0"?xml '.repeat(3_000), 'x.gexf', 'gexf'],
  ['version 1 '.repeat(3_000), 'pasted text', null],
  ['comment a b\n'.repeat(3_000), 'pasted text', null],
  ['# a comment\ngraph [ directed 1', 'pasted text', 'gml'],
  ['graph,entry\na,1\n', 'table.csv', null],
  ['% comment\n*Vertices 3\n', 'pasted text', 'pajek'],
  ['*network of reeds\n', 'x.txt', 'pajek'],
  ['id,entry\na,1\n', 'x.csv', null],
  ['id,entry\na,1\n', 'x.net', 'pajek'],
  ['', 'x.gml', 'gml'],
  ['', 'x.csv', null],
])('%j called %s is %s', (head, name, format) => {
  expect(detectFormat(head, name)).toBe(format);
});
