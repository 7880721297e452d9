import { FACING_COSINE } from '../../src/shop/facing.ts';

/**
 * A second way to the narrowest opening (side 1) or web (side −1): rays upright from many points of every edge to the first
 * edge that they hit, counted where that edge faces back. Never less than the true width, and close to it on smooth curves.
 */
export function narrowestByRays(rings: readonly Float64Array[], side: 1 | -1): number {
  const edges = rings.flatMap((ring) =>
    Array.from({ length: ring.length / 2 }, (_, k) => {
      const next = (2 * k + 2) % ring.length;
      const [ax, ay, bx, by] = [ring[2 * k], ring[2 * k + 1], ring[next], ring[next + 1]];
      const length = Math.hypot(bx - ax, by - ay);
      return { ax, ay, bx, by, nx: (-side * (by - ay)) / length, ny: (side * (bx - ax)) / length };
    }),
  );
  let least = Infinity;
  for (const from of edges) {
    for (const share of [0.1, 0.3, 0.5, 0.7, 0.9]) {
      const px = from.ax + share * (from.bx - from.ax);
      const py = from.ay + share * (from.by - from.ay);
      let first = Infinity;
      let isFacing = false;
      for (const to of edges) {
        if (to === from) continue;
        const a = from.nx * (to.ay - py) - from.ny * (to.ax - px);
        const b = from.nx * (to.by - py) - from.ny * (to.bx - px);
        if (a < 0 === b < 0) continue;
        const cut = a / (a - b);
        const distance =
          from.nx * (to.ax + cut * (to.bx - to.ax) - px) + from.ny * (to.ay + cut * (to.by - to.ay) - py);
        if (distance <= 0 || distance >= first) continue;
        first = distance;
        isFacing = from.nx * to.nx + from.ny * to.ny <= -FACING_COSINE;
      }
      if (isFacing) least = Math.min(least, first);
    }
  }
  return least;
}
