import { csvPieces } from '../csv';
import { batches } from './batches';
import { graphmlPieces } from './graphml';
import { edgeHeader, edgeRows, NODE_HEADER, nodeRows } from './networkTables';
import { nodeLinkPieces } from './nodeLink';
import type { WrittenNetwork } from './types';

export const EXPORT_KINDS = ['nodes_csv', 'edges_csv', 'graphml', 'node_link'] as const;
export type ExportKind = (typeof EXPORT_KINDS)[number];

/** Name and media type of each exported file. */
export const EXPORT_FILES: Readonly<
  Record<ExportKind, { readonly name: string; readonly mediaType: string }>
> = {
  nodes_csv: { name: 'nodes.csv', mediaType: 'text/csv; charset=utf-8' },
  edges_csv: { name: 'edges.csv', mediaType: 'text/csv; charset=utf-8' },
  graphml: { name: 'network.graphml', mediaType: 'application/xml; charset=utf-8' },
  node_link: { name: 'network.json', mediaType: 'application/json; charset=utf-8' },
};

/**
 * A network as the pieces of one file, in UTF-8 text. Read again (the two tables together, the
 * others alone) with the choices that are guessed, it has the same content hash: raw texts and
 * understood values stand side by side.
 * @throws UnwritableText, before any piece, where the format cannot hold a text of the network
 */
export function exportPieces(kind: ExportKind, network: WrittenNetwork): Iterable<string> {
  switch (kind) {
    case 'nodes_csv':
      return csvPieces(NODE_HEADER, nodeRows(network));
    case 'edges_csv':
      return csvPieces(edgeHeader(network), edgeRows(network));
    case 'graphml':
      return batches(graphmlPieces(network));
    case 'node_link':
      return batches(nodeLinkPieces(network));
  }
}
