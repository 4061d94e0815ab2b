/** The simplices of a cycle as lists of arrival positions. */
export type CycleSimplices = readonly (readonly number[])[];

/** Positions of a cycle, each once, ascending. */
export const positionsOf = (simplices: CycleSimplices): number[] =>
  [...new Set(simplices.flat())].sort((a, b) => a - b);

/**
 * A closed chain of edges as closed walks (Hierholzer 1873): every edge in one of them, each walk
 * begun at its earliest node and ended there.
 */
export function closedWalks(edges: CycleSimplices): number[][] {
  const next = new Map<number, Set<number>>();
  const join = (from: number, to: number): void => {
    next.set(from, (next.get(from) ?? new Set()).add(to));
  };
  for (const [u = 0, v = 0] of edges) {
    join(u, v);
    join(v, u);
  }
  const walks: number[][] = [];
  for (const start of [...next.keys()].sort((a, b) => a - b)) {
    while ((next.get(start)?.size ?? 0) > 0) walks.push(walkFrom(start, next));
  }
  return walks;
}

/** Takes the edges of one closed walk away; it ends where it comes back to its start. */
function walkFrom(start: number, next: ReadonlyMap<number, Set<number>>): number[] {
  const walk = [start];
  for (let at = start; walk.length === 1 || at !== start;) {
    const to = Math.min(...(next.get(at) ?? []));
    if (!Number.isFinite(to)) break;
    next.get(at)?.delete(to);
    next.get(to)?.delete(at);
    walk.push(to);
    at = to;
  }
  return walk;
}

const LISTED = 14;

/** A cycle by node names: a walk for edges, otherwise its nodes; in dimension 0 who joins whom. */
export function cycleWords(
  dimension: number,
  simplices: CycleSimplices,
  label: (position: number) => string,
): string {
  if (dimension === 0) {
    const [born, joined] = simplices.map(([position = 0]) => label(position));
    return joined === undefined
      ? `${born}, which stays apart`
      : `${born}, until it joins ${joined}`;
  }
  if (dimension === 1) {
    return closedWalks(simplices)
      .map((walk) => listed(walk.map(label), ' – '))
      .join('; and ');
  }
  const noun = dimension === 2 ? 'triangles' : 'tetrahedra';
  return `${simplices.length} ${noun} on ${listed(positionsOf(simplices).map(label), ', ')}`;
}

function listed(names: readonly string[], separator: string): string {
  if (names.length <= LISTED) return names.join(separator);
  const more = names.length - LISTED;
  return `${names.slice(0, LISTED).join(separator)}${separator}… ${more} more`;
}
