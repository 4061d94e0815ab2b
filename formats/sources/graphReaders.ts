import { readGexf } from './gexf';
import { readGml } from './gml';
import { readGraphml } from './graphml';
import { readNodeLink } from './nodeLink';
import { readPajek } from './pajek';
import type { GraphFormat, GraphReader } from './types';

/** The readers of graph formats; the readers of tables and matrices stand beside. */
export const GRAPH_READERS: Readonly<Record<GraphFormat, GraphReader>> = {
  graphml: readGraphml,
  gexf: readGexf,
  node_link: readNodeLink,
  gml: readGml,
  pajek: readPajek,
};
