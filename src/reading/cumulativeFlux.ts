/**
 * The flux within a radius, tabled over s = ρ².
 *
 * With G(ρ) = ∫₀^ρ w ρ' dρ' the reading of an outline is ∮ G dφ. The table holds G over s (and for polarised light the
 * twofold part over s²), since G dφ = (G/s)(x dy − y dx): no division, and smooth where the outline passes the axis.
 */
export interface CumulativeFlux {
  /** Cells per m² of s. */
  cellsPerM2: number;
  cells: number;
  /** Cubic pieces of G/s, four numbers a cell (see `hermitePieces`). */
  mean: Float64Array;
  /** Cubic pieces of (twofold G)/s², 1/m²; null for unpolarised light. */
  twofold: Float64Array | null;
}
