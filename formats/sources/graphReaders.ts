import type { GraphFormat, GraphReader } from './types';

/** The readers of graph formats; the readers of tables and matrices stand beside. */
export const GRAPH_READERS: Readonly<Partial<Record<GraphFormat, GraphReader>>> = {};
