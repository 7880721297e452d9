/** Signed area of a closed ring, m²: positive when it runs counter-clockwise. */
export function ringArea(ring: Float64Array): number {
  let twice = 0;
  const n = ring.length;
  for (let i = 0, j = n - 2; i < n; j = i, i += 2) twice += ring[j] * ring[i + 1] - ring[i] * ring[j + 1];
  return twice / 2;
}

/** Area enclosed by quadrature nodes, m²: ∮ (x dy − y dx)/2. */
export function nodesArea(nodes: Float64Array): number {
  let twice = 0;
  for (let i = 0; i < nodes.length; i += 4) twice += nodes[i] * nodes[i + 3] - nodes[i + 1] * nodes[i + 2];
  return twice / 2;
}

/** Largest distance from the axis of any vertex, metres. */
export function ringsRadius(rings: readonly Float64Array[]): number {
  let squared = 0;
  for (const ring of rings) {
    for (let i = 0; i < ring.length; i += 2) squared = Math.max(squared, ring[i] ** 2 + ring[i + 1] ** 2);
  }
  return Math.sqrt(squared);
}
