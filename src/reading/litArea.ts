import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { axialIrradiance, beamRadius } from '../optics/gaussianBeam.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import { linesOf } from '../optics/light.ts';
import type { BoundaryNodes } from './boundaryReading.ts';
import { sourceDirections } from './sourceDirections.ts';

/**
 * Power of a focused beam through an outline, over the irradiance on the axis at the particle's nominal place, m²: what the
 * outline's area is to a flat wave. Holes count negative.
 *
 * The irradiance e^{−2ρ²/w²} is the divergence of a field along ρ, so the power is ∮ (1 − e^{−2ρ²/w²}) w²/4 dφ.
 *
 * @param wavenumber k in the medium, 1/m
 * @param distanceM of the outline from the particle's nominal place, metres
 * @param axisX, axisY where the beam's axis meets the outline's plane, metres
 */
export function litArea(
  beam: GaussianBeam,
  wavenumber: number,
  distanceM: number,
  nodes: BoundaryNodes,
  axisX = 0,
  axisY = 0,
): number {
  const perM2 = 2 / beamRadius(beam, wavenumber, distanceM) ** 2;
  let sum = 0;
  for (let i = 0; i < nodes.length; i += 4) {
    const [x, y] = [nodes[i] - axisX, nodes[i + 1] - axisY];
    const u = (x * x + y * y) * perM2;
    // ρ² dφ = x dy − y dx, and (1 − e^{−u})/u goes to 1 on the axis.
    const share = u === 0 ? 1 : -Math.expm1(-u) / u;
    sum += share * (x * nodes[i + 3] - y * nodes[i + 2]);
  }
  return (axialIrradiance(beam, wavenumber, distanceM) * sum) / 2;
}

/** The same of all lines of a light, and of the beams from all over its source. */
export function lightThrough(
  light: Light & { beam: GaussianBeam },
  medium: IndexModel,
  distanceM: number,
  nodes: BoundaryNodes,
): number {
  const { tangents, weights } = sourceDirections(light.sourceAngleRad ?? 0, 6);
  let sum = 0;
  for (const { wavelengthM, share } of linesOf(light)) {
    const wavenumber = (2 * Math.PI * refractiveIndex(medium, wavelengthM)[0]) / wavelengthM;
    for (let i = 0; i < weights.length; i++) {
      const [axisX, axisY] = [distanceM * tangents[2 * i], distanceM * tangents[2 * i + 1]];
      sum += share * weights[i] * litArea(light.beam, wavenumber, distanceM, nodes, axisX, axisY);
    }
  }
  return sum;
}
