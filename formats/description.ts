/** How many nodes have their key in common with another node. */
export function sharing<Node>(
  nodes: readonly Node[],
  key: (node: Node) => string | number,
): number {
  const counts = new Map<string | number, number>();
  for (const node of nodes) counts.set(key(node), (counts.get(key(node)) ?? 0) + 1);
  return [...counts.values()].reduce((sum, count) => sum + (count > 1 ? count : 0), 0);
}

/** Components by union with path halving (Tarjan, van Leeuwen 1984). */
export function connectivity(
  nodeCount: number,
  edges: Uint32Array,
): { components: number; isolatedNodes: number } {
  const parent = Uint32Array.from({ length: nodeCount }, (_, row) => row);
  const touched = new Uint8Array(nodeCount);
  const root = (start: number): number => {
    let row = start;
    while (parent[row] !== row) {
      parent[row] = parent[parent[row] ?? 0] ?? 0;
      row = parent[row] ?? 0;
    }
    return row;
  };
  let components = nodeCount;
  for (let at = 0; at < edges.length; at += 2) {
    const [a, b] = [edges[at] ?? 0, edges[at + 1] ?? 0];
    touched[a] = touched[b] = 1;
    const [from, to] = [root(a), root(b)];
    if (from === to) continue;
    parent[from] = to;
    components--;
  }
  return { components, isolatedNodes: nodeCount - touched.reduce((sum, one) => sum + one, 0) };
}
