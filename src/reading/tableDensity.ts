import type { RadialTable } from './radialTable.ts';
import type { EdgeDensity } from './roughEdge.ts';

/**
 * The flux density that a radial table was made of, over the extinction: what a unit of detector area adds to
 * reading/extinction, 1/m², and its two derivatives.
 *
 * With v(s) = G/s and dG/ds = w/2, w = 2 (s v)′; for polarised light t(s) = (twofold G)/s² adds 2 (s² t)′ cos 2φ, which is
 * 2 (2t + s t′) ρ² cos 2φ. The pieces are cubic, so w is good to about 1e-5 of its size and its slope to 1e-3.
 *
 * @param points places of the particle, flat [x0, y0, …], metres: the density is their mean
 */
export function tableDensity(table: RadialTable, points: Float64Array, extinctionM2: number): EdgeDensity {
  const { mean, twofold, axis, cells, cellsPerM2 } = table;
  const perPoint = 4 / (extinctionM2 * points.length);
  return (x, y, out) => {
    out.fill(0, 0, 3);
    for (let p = 0; p < points.length; p += 2) {
      const dx = x - points[p];
      const dy = y - points[p + 1];
      const s = dx * dx + dy * dy;
      const position = s * cellsPerM2;
      const cell = Math.min(Math.floor(position), cells);
      const [v, v1, v2] = derivatives(mean, cell, position - cell, cellsPerM2);
      const slope = 2 * (2 * v1 + s * v2);
      out[0] += perPoint * (v + s * v1);
      out[1] += perPoint * slope * dx;
      out[2] += perPoint * slope * dy;
      if (twofold === null) continue;
      const [t, t1, t2] = derivatives(twofold, cell, position - cell, cellsPerM2);
      const turn = (dx * dx - dy * dy) * axis[0] + 2 * dx * dy * axis[1];
      const factor = 2 * t + s * t1;
      const turning = 2 * (3 * t1 + s * t2) * turn;
      out[0] += perPoint * factor * turn;
      out[1] += perPoint * (turning * dx + 2 * factor * (dx * axis[0] + dy * axis[1]));
      out[2] += perPoint * (turning * dy + 2 * factor * (dx * axis[1] - dy * axis[0]));
    }
  };
}

/** Value, first and second derivative over s of a cubic piece at t in [0, 1]. */
function derivatives(
  pieces: Float64Array,
  cell: number,
  t: number,
  cellsPerM2: number,
): [value: number, first: number, second: number] {
  const [a, b, c, d] = pieces.subarray(4 * cell, 4 * cell + 4);
  return [
    a + t * (b + t * (c + t * d)),
    (b + t * (2 * c + 3 * t * d)) * cellsPerM2,
    (2 * c + 6 * t * d) * cellsPerM2 * cellsPerM2,
  ];
}
