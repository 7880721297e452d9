import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { axialIrradiance, beamRadius } from '../optics/gaussianBeam.ts';
import type { BoundaryNodes } from './boundaryReading.ts';

/**
 * Power of a focused beam through an outline, over the irradiance on the axis at the particle's nominal place, m²: what the
 * outline's area is to a flat wave. Holes count negative.
 *
 * The irradiance e^{−2ρ²/w²} is the divergence of a field along ρ, so the power is ∮ (1 − e^{−2ρ²/w²}) w²/4 dφ.
 *
 * @param wavenumber k in the medium, 1/m
 * @param distanceM of the outline from the particle's nominal place, metres
 */
export function litArea(
  beam: GaussianBeam,
  wavenumber: number,
  distanceM: number,
  nodes: BoundaryNodes,
): number {
  const perM2 = 2 / beamRadius(beam, wavenumber, distanceM) ** 2;
  let sum = 0;
  for (let i = 0; i < nodes.length; i += 4) {
    const u = (nodes[i] ** 2 + nodes[i + 1] ** 2) * perM2;
    // ρ² dφ = x dy − y dx, and (1 − e^{−u})/u goes to 1 on the axis.
    const share = u === 0 ? 1 : -Math.expm1(-u) / u;
    sum += share * (nodes[i] * nodes[i + 3] - nodes[i + 1] * nodes[i + 2]);
  }
  return (axialIrradiance(beam, wavenumber, distanceM) * sum) / 2;
}
