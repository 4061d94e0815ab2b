import type { GrowthModel } from './types';

/**
 * Links go to nodes with probability proportional to their degree: an end is drawn evenly from all
 * ends of edges so far. A node that is drawn twice is drawn anew. The first `links` nodes have no
 * edges of their own; the next one joins all of them.
 */
export const preferentialAttachment: GrowthModel = {
  name: 'preferential_attachment',
  title: 'Preferential attachment',
  rule: 'Each node joins m different earlier nodes, chosen with probability proportional to their degree; the first m nodes have no edges among themselves.',
  source: 'Barabási and Albert, Emergence of scaling in random networks, Science 286 (1999)',
  parameters: [
    {
      name: 'links',
      label: 'Links m',
      meaning: 'Edges that every new node brings.',
      least: 1,
      most: 500,
      whole: true,
      standard: 4,
    },
  ],
  conflict: (nodeCount, { links = 1 }) =>
    links >= nodeCount
      ? {
          field: 'links',
          message: `A node cannot join ${links} earlier ones: there are ${nodeCount} nodes. Choose at most ${Math.max(1, nodeCount - 1)}.`,
        }
      : null,
  grow(nodeCount, { links = 1 }, draw, join) {
    const ends: number[] = [];
    for (let later = links; later < nodeCount; later++) {
      const chosen = new Set<number>();
      if (later === links) for (let i = 0; i < links; i++) chosen.add(i);
      while (chosen.size < links) {
        const end = ends[draw.integer(0, ends.length - 1)];
        if (end !== undefined) chosen.add(end);
      }
      for (const earlier of [...chosen].sort((a, b) => a - b)) {
        join(earlier, later);
        ends.push(earlier, later);
      }
    }
  },
};
