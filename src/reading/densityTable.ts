import type { RadialTable } from './radialTable.ts';

/** A flux density over s = ρ², ready to be asked for at millions of places: value only, where `tableDensity` gives slopes too. */
export interface DensityTable {
  cellsPerM2: number;
  /** Cubic pieces of the density, four numbers a cell, 1/m² for an extinction of 1 m². */
  mean: Float64Array;
  /** Cubic pieces of what ρ² cos 2φ is multiplied by; null for unpolarised light. */
  twofold: Float64Array | null;
  /** The field's angle, as cos 2φ and sin 2φ. */
  axis: readonly [cos2: number, sin2: number];
}

/**
 * The flux density that a radial table was made of: with G = s^p v the density 2 (p v + s v′) is cubic in each cell where v is.
 * Good to about 1e-5 of its size; its integrals are the table's own.
 */
export function densityTable({ mean, twofold, axis, cellsPerM2 }: RadialTable): DensityTable {
  return {
    cellsPerM2,
    mean: densityPieces(mean, 1),
    twofold: twofold && densityPieces(twofold, 2),
    axis,
  };
}

/** The density at (x, y) from the particle's axis, metres; NaN beyond the table. */
export function densityAt({ cellsPerM2, mean, twofold, axis }: DensityTable, x: number, y: number): number {
  const position = (x * x + y * y) * cellsPerM2;
  const cell = Math.floor(position);
  const t = position - cell;
  const c = 4 * cell;
  const even = mean[c] + t * (mean[c + 1] + t * (mean[c + 2] + t * mean[c + 3]));
  if (twofold === null) return even;
  const odd = twofold[c] + t * (twofold[c + 1] + t * (twofold[c + 2] + t * twofold[c + 3]));
  return even + odd * ((x * x - y * y) * axis[0] + 2 * x * y * axis[1]);
}

/** With s v′ = (cell + t)(b + 2ct + 3dt²) for the piece a + bt + ct² + dt³. */
function densityPieces(pieces: Float64Array, power: 1 | 2): Float64Array {
  const out = new Float64Array(pieces.length);
  for (let i = 0; i < pieces.length; i += 4) {
    const cell = i / 4;
    const [a, b, c, d] = pieces.subarray(i, i + 4);
    out[i] = 2 * (power * a + cell * b);
    out[i + 1] = 2 * ((power + 1) * b + 2 * cell * c);
    out[i + 2] = 2 * ((power + 2) * c + 3 * cell * d);
    out[i + 3] = 2 * (power + 3) * d;
  }
  return out;
}
