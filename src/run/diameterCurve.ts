import type { DiameterCurve } from '../metrology/equivalentDiameter.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { expectedReadings } from './expectedReadings.ts';
import type { BuiltInstrument } from './instrument.ts';
import type { SphereKind } from './sphereLike.ts';

/** How far the curve goes beyond the brief's own diameters: noise may carry a reading there. */
const BEYOND = 1.25;
/** Steps of the size parameter: some dozen to each ripple. */
const STEP = 0.05;
const COUNTS = [60, 600] as const;

/** What the instrument shows of spheres of one kind over the brief's diameters, and a little beyond. */
export function diameterCurve(
  { task, given, fields, distanceM, scores }: BuiltInstrument,
  kind: SphereKind,
): DiameterCurve {
  const alike = task.particles.filter(({ material }) => material === kind.material);
  const particles = alike.length > 0 ? alike : task.particles;
  const rangeM: [number, number] = [
    Math.min(...particles.map(({ diameterM }) => diameterM)),
    Math.max(...particles.map(({ diameterM }) => diameterM)),
  ];
  const [leastM, mostM] = [rangeM[0] / BEYOND, rangeM[1] * BEYOND];
  const { light, medium } = task;
  const perMetre = (Math.PI * refractiveIndex(medium, light.wavelengthM)[0]) / light.wavelengthM;
  const steps = Math.ceil(((mostM - leastM) * perMetre) / STEP);
  const count = Math.min(COUNTS[1], Math.max(COUNTS[0], steps));
  const even = Array.from({ length: count }, (_, i) => leastM + ((mostM - leastM) * i) / (count - 1));
  const diametersM = Float64Array.from(new Set([...even, ...rangeM])).sort();
  const spheres = Array.from(diametersM, (diameterM) => ({ ...kind, diameterM }));
  const readings = expectedReadings(task, given, distanceM, spheres, fields);
  const shownM2 = Float64Array.from(readings, ({ meanM2 }) => meanM2 / scores.gain);
  return { material: kind.material, diametersM, shownM2, rangeM };
}
