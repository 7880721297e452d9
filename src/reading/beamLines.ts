import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { axialIrradiance } from '../optics/gaussianBeam.ts';
import { beamPath, particleIrradiance } from './beamPath.ts';
import type { Fading, Scenario } from './scenario.ts';
import { coherence } from './scenario.ts';
import { sourceDirections } from './sourceDirections.ts';

/** One line of a scenario's light, with the share of the irradiance that is on the axis at the particle's nominal place. */
export interface BeamLine {
  share: number;
  scenario: Scenario;
}

/**
 * The lines of a scenario, each as a scenario of its own: in a focused beam shadow and field at the particle are a line's own, so
 * that each needs its own table.
 */
export function beamLines(scenario: Scenario): BeamLine[] {
  const groups = new Map<Fading | undefined, Scenario['colours'][number][]>();
  for (const colour of scenario.colours) {
    groups.set(colour.fading, [...(groups.get(colour.fading) ?? []), colour]);
  }
  return [...groups.values()].map((group) => {
    const share = group.reduce((sum, { weight }) => sum + weight, 0);
    const colours = group.map((colour) => ({ ...colour, weight: colour.weight / share }));
    const extinctionM2 = colours.reduce((sum, { weight, sphere }) => sum + weight * sphere.extinctionM2, 0);
    return { share, scenario: { ...scenario, colours, extinctionM2 } };
  });
}

/** Where a particle is, metres: (x, y) off the axis, z towards the detector plane from its nominal place. */
export interface BeamPlace {
  x: number;
  y: number;
  z: number;
  /** From the nominal place to the detector plane. */
  distanceM: number;
  /** Rms random motion per axis. */
  spreadM: number;
}

/** Irradiance at the particle over that on the axis at its nominal place: the mean over its motion, all lines and the source. */
export function irradianceAt(scenario: Scenario, beam: GaussianBeam, place: BeamPlace): number {
  const { x, y, z, distanceM, spreadM } = place;
  // Beams of all directions cross at the nominal place.
  const { tangents, weights } = sourceDirections(z === 0 ? 0 : (scenario.sourceAngleRad ?? 0), 4);
  let sum = 0;
  for (const line of beamLines(scenario)) {
    const { wavenumber } = coherence(line.scenario);
    const path = beamPath(beam, wavenumber, z, distanceM - z, spreadM);
    const axial = line.share * axialIrradiance(beam, wavenumber, z);
    for (let i = 0; i < weights.length; i++) {
      const off2 = (x - z * tangents[2 * i]) ** 2 + (y - z * tangents[2 * i + 1]) ** 2;
      sum += axial * weights[i] * particleIrradiance(path, off2);
    }
  }
  return sum;
}
