import { inputError } from '../base/errors.ts';
import { formatQuantity } from '../base/quantity.ts';
import { LegendreRules } from '../numeric/gaussLegendre.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { isTabled } from '../optics/particle.ts';
import type { OutlineElement } from '../outline/shape.ts';
import { driftedWavelengths } from '../reading/scenario.ts';
import type { BuildPlan } from '../score/buildPlan.ts';
import { BUILD_FINENESS } from '../score/buildPlan.ts';
import { nearestPlane } from '../score/elementNodes.ts';
import { guardedTask } from '../score/guards.ts';
import { NO_SYMMETRY, Sampling } from '../score/sampling.ts';
import type { Scores } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { Deviations } from '../score/tolerances.ts';
import { WorstCases } from '../score/worstCases.ts';
import { measureOutline } from '../shop/measureOutline.ts';
import type { GivenDesign } from './givenDesign.ts';
import type { OutlineJudge } from './judgeOutline.ts';

/** What builds of a design are judged on, and the scores of its drawing. */
export interface PlannedBuilds {
  plan: Omit<BuildPlan, 'farthest'>;
  scores: Scores;
}

/**
 * Chooses the lights, depths and places that every build of a design is judged on: samples of the brief, the diameters that turn the
 * light's phase most and least, and the worst cases of the drawing.
 */
export function planBuilds(
  given: GivenDesign,
  { judge, distanceM, radiusM, fields }: OutlineJudge,
): PlannedBuilds {
  const { task } = judge;
  const { light } = task;
  const read = judge.readOutline(given.elements, distanceM);
  const { gain } = judge.judge(read).scores;
  const cases = new WorstCases(task, fields).find(read.elements, radiusM, distanceM, gain, NO_SYMMETRY);
  const scores = judge.judge(
    read,
    cases.map(({ ratio }) => ratio),
  ).scores;
  const certified = cases.map(({ ratio }) => Math.abs(ratio / scores.gain - 1));
  const worst = Math.max(scores.correction.worst, ...certified);

  const calibrating = task.particles.map((particle) => ({ particle, wavelengthM: light.wavelengthM }));
  const drifted = driftedWavelengths(light, BUILD_FINENESS.drifts);
  const sampled = guardedTask(task).particles.flatMap((particle) =>
    drifted
      .filter((one) => one !== light.wavelengthM || !task.particles.includes(particle))
      .map((wavelengthM) => ({ particle, wavelengthM })),
  );
  const found = cases.map(({ particle, wavelengthM }) => ({ particle, wavelengthM }));
  const wavenumber = (2 * Math.PI * refractiveIndex(task.medium, light.wavelengthM)[0]) / light.wavelengthM;
  const sampling = new Sampling(task, BUILD_FINENESS, wavenumber, new LegendreRules());
  const places = [
    ...sampling.positions(radiusM, nearestPlane(given.elements, distanceM), NO_SYMMETRY),
    ...cases.flatMap(({ positionM }) => positionM),
  ];
  const depthsM = [...new Set([...sampling.depths(), ...cases.map(({ depthM }) => depthM)])];
  return {
    plan: {
      ...{ task, elements: given.elements, distanceM, radiusM, fields, depthsM },
      lights: [...calibrating, ...sampled, ...found],
      calibrating: calibrating.length,
      places: Float64Array.from(places),
    },
    scores: { ...scores, correction: { ...scores.correction, certified: worst } },
  };
}

/** Parts of the nominal value that builds must stay within, for readings to mean anything. */
const MOST = { distance: 0.25, wavelength: 0.1, size: 0.5, tiltRad: 0.35 };

/**
 * @param farthest that builds differ from the drawing
 * @throws RimwrightError `input` for tolerances that leave no instrument
 */
export function checkTolerances(task: Task, distanceM: number, farthest: Deviations): void {
  const { light, medium, particles } = task;
  const refuse = (key: string, found: string, expected: string) => {
    const message = `a tolerance within which builds stay ${expected}`;
    throw inputError([{ key: `tolerances.${key}`, found: `builds up to ${found} off`, expected: message }]);
  };
  const inLength = (metres: number) => formatQuantity(metres, 'length', 3);
  const mostM = MOST.distance * (distanceM - task.placement.depthM);
  if (farthest.distanceM > mostM) {
    refuse('distance', inLength(farthest.distanceM), `within ${inLength(mostM)} of the distance`);
  }
  if (farthest.wavelengthM > MOST.wavelength * light.wavelengthM) {
    const most = inLength(MOST.wavelength * light.wavelengthM);
    refuse('wavelength', inLength(farthest.wavelengthM), `within ${most} of the wavelength`);
  }
  if (farthest.size > MOST.size) {
    refuse('size', formatQuantity(farthest.size, 'ratio', 3), 'within 50 % of every diameter');
  }
  if (farthest.tiltXRad > MOST.tiltRad) {
    refuse('tilt', formatQuantity(farthest.tiltXRad, 'angle', 3), 'within 20 deg');
  }
  const [nMedium] = refractiveIndex(medium, light.wavelengthM);
  for (const particle of particles) {
    if (isTabled(particle)) continue;
    const contrast = Math.abs(refractiveIndex(particle.index, light.wavelengthM)[0] - nMedium);
    if (farthest.index === 0 || farthest.index < contrast / 2) continue;
    const expected = `within half of what ${particle.material} differs from the medium by, ${(contrast / 2).toPrecision(3)}`;
    refuse('index', farthest.index.toPrecision(3), expected);
  }
}

/** Where edges that are moved as far as tolerances let them close an opening or a bar: what such builds read means little. */
export function edgeWarning(elements: readonly OutlineElement[], shiftM: number): string | null {
  const narrowest = elements.flatMap(({ rings }) => {
    const { smallestOpening, smallestWeb } = measureOutline(rings);
    return [smallestOpening?.widthM ?? Infinity, smallestWeb?.widthM ?? Infinity];
  });
  if (2 * shiftM < Math.min(...narrowest)) return null;
  const width = formatQuantity(Math.min(...narrowest), 'length', 3);
  return `Edges that move by ${formatQuantity(shiftM, 'length', 3)} close this outline's narrowest place, ${width}: what such builds read means little`;
}
