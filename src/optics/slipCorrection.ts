/** A, B and C of `slipCorrection`. */
export type SlipConstants = readonly [a: number, b: number, c: number];

/** Kim, Mulholland, Kukuck & Pui (2005), J. Res. NIST 110, 31, adopted by ISO 15900; measured for Kn 0.5 to 83. */
export const KIM_2005: SlipConstants = [1.165, 0.483, 0.997];

/**
 * How much less drag a sphere feels in a gas than by Stokes' law, 1 or more: Cunningham (1910), Proc. R. Soc. A 83, 357,
 * 1 + Kn (A + B e^{−C/Kn}), the form of Knudsen & Weber (1911), Annalen der Physik 341, 981.
 *
 * @param knudsen 2 × mean free path / diameter, above 0
 */
export function slipCorrection(knudsen: number, [a, b, c]: SlipConstants = KIM_2005): number {
  return 1 + knudsen * (a + b * Math.exp(-c / knudsen));
}
