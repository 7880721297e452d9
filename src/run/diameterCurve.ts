import type { DiameterCurve } from '../metrology/equivalentDiameter.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { expectedExtinctions, expectedReadings } from './expectedReadings.ts';
import type { BuiltInstrument } from './instrument.ts';
import type { SphereKind } from './sphereLike.ts';

/** How far the curve goes beyond the brief's own diameters: noise may carry a reading there. */
const BEYOND = 1.25;
/** Steps of the size parameter: narrower resonances are rarely met. */
const STEP = 0.01;
const COUNTS = [60, 3000] as const;
/** Diameters for each that is read, and those in the light of a source of finite angle, where a reading takes seconds. */
const PER_READ = { plain: 5, source: 40 };

/**
 * What the instrument shows of spheres of one kind over the brief's diameters, and a little beyond. Readings
 * are slow beside extinctions, so only some are made, and reading/extinction is interpolated between them: it goes smoothly where
 * extinction ripples.
 */
export function diameterCurve(
  { task, given, fields, distanceM, scores }: BuiltInstrument,
  kind: SphereKind,
  perRead = (task.light.sourceAngleRad ?? 0) > 0 ? PER_READ.source : PER_READ.plain,
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
  const isRead = (i: number) => i % perRead === 0 || i === spheres.length - 1;
  const read = spheres.filter((_, i) => isRead(i));
  const ratios = expectedReadings(task, given, distanceM, read, fields).map(
    ({ meanM2, extinctionM2 }) => meanM2 / extinctionM2,
  );
  const extinctions = expectedExtinctions(task, given, distanceM, spheres);
  const shownM2 = Float64Array.from(extinctions, (extinctionM2, i) => {
    const before = Math.floor(i / perRead);
    const after = Math.min(before + 1, ratios.length - 1);
    const span = Math.min(perRead, spheres.length - 1 - before * perRead);
    const share = span === 0 ? 0 : (i - before * perRead) / span;
    // The last one that is read may stand nearer than the others.
    const ratio =
      i === spheres.length - 1
        ? ratios[ratios.length - 1]
        : ratios[before] + share * (ratios[after] - ratios[before]);
    return (ratio * extinctionM2) / scores.gain;
  });
  return { material: kind.material, diametersM, shownM2, rangeM };
}
