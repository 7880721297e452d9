/**
 * Bounding boxes of consecutive edges, then of pairs of those, and so on: edges that follow each other lie close
 * together, so the order along a ring is a good enough order in space.
 */
export interface EdgeTree {
  /** Calls `visit` in order for the edges from number `from` on whose boxes meet that of `edge`; gives its first answer that is not null. */
  search<T>(edge: number, from: number, visit: (other: number) => T | null): T | null;
}

/**
 * @param edges [x0, y0, x1, y1] for each edge, finite, any length unit
 */
export function edgeTree(edges: Float64Array): EdgeTree {
  const count = edges.length / 4;
  let leaves = 1;
  while (leaves < count) leaves *= 2;
  // Node k has the children 2k and 2k + 1; the leaf of edge e is leaves + e. A box is [minX, minY, maxX, maxY].
  const boxes = new Float64Array(8 * leaves);
  for (let e = 0; e < leaves; e++) {
    const isEdge = e < count;
    const [x0, y0, x1, y1] = edges.subarray(4 * e, 4 * e + 4);
    boxes.set(
      isEdge
        ? [Math.min(x0, x1), Math.min(y0, y1), Math.max(x0, x1), Math.max(y0, y1)]
        : [Infinity, Infinity, -Infinity, -Infinity],
      4 * (leaves + e),
    );
  }
  for (let node = leaves - 1; node > 0; node--) {
    for (let side = 0; side < 4; side++) {
      const a = boxes[8 * node + side];
      const b = boxes[8 * node + 4 + side];
      boxes[4 * node + side] = side < 2 ? Math.min(a, b) : Math.max(a, b);
    }
  }

  function boxesMeet(a: number, b: number): boolean {
    return (
      boxes[4 * a] <= boxes[4 * b + 2] &&
      boxes[4 * b] <= boxes[4 * a + 2] &&
      boxes[4 * a + 1] <= boxes[4 * b + 3] &&
      boxes[4 * b + 1] <= boxes[4 * a + 3]
    );
  }

  return {
    search(edge, from, visit) {
      const descend = (node: number, firstEdge: number, span: number): ReturnType<typeof visit> => {
        if (firstEdge + span <= from || !boxesMeet(node, leaves + edge)) return null;
        if (span === 1) return visit(firstEdge);
        const half = span / 2;
        return descend(2 * node, firstEdge, half) ?? descend(2 * node + 1, firstEdge + half, half);
      };
      return descend(1, 0, leaves);
    },
  };
}
