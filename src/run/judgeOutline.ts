import { inputError } from '../base/errors.ts';
import { formatQuantity } from '../base/quantity.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { ringsRadius } from '../outline/area.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { REPORT_FINENESS } from '../score/fineness.ts';
import { Judge } from '../score/judge.ts';
import type { Task } from '../score/task.ts';
import type { GivenDesign } from './givenDesign.ts';

const LARGEST_HALF_ANGLE = (80 * Math.PI) / 180;

/** Numbers that all radial tables together may take: half a gigabyte. */
const MOST_TABLE_NUMBERS = 6e7;
/** Readings that one judgement may hold: a quarter of a gigabyte. */
const MOST_READINGS = 3e7;

/** An outline at a distance, with a judge made for it. */
export interface OutlineJudge {
  judge: Judge;
  fields: Fields;
  distanceM: number;
  /** Largest distance of any vertex from the axis, metres. */
  radiusM: number;
}

/**
 * A judge for an outline from outside, whose radius and distance need not be those that the brief allows.
 *
 * @param distanceM in place of the outline's own or the brief's
 * @param place the one place of the particle that will be asked for, metres; null for all that the brief allows
 * @param fields of the sphere: the far zone's, or the exact ones
 * @throws RimwrightError `input` where no distance is given, or the geometry is out of reach of the far-zone form or of
 *   this machine's memory
 */
export function judgeOutline(
  task: Task,
  given: GivenDesign,
  distanceM: number | null,
  place: readonly [x: number, y: number] | null = null,
  fields: Fields = 'far',
): OutlineJudge {
  const distance = chooseDistance(task, given, distanceM);
  const radiusM = ringsRadius(given.elements.flatMap(({ rings }) => rings));
  // The sums of several planes are no harder than the nearest of them.
  const distances = given.elements.map(({ distanceM: own }) => own ?? distance);
  const around: Task = {
    ...task,
    placement: { ...task.placement, offsetM: place === null ? task.placement.offsetM : Math.hypot(...place) },
    detector: {
      ...task.detector,
      distanceM: [Math.min(...distances), Math.max(...distances)],
      radiusM: [radiusM, radiusM],
    },
  };
  checkGeometry(around, given.file);
  checkEffort(around, place === null, given.file);
  return { judge: new Judge(around, REPORT_FINENESS, fields), fields, distanceM: distance, radiusM };
}

function chooseDistance({ detector }: Task, given: GivenDesign, chosen: number | null): number {
  const [least, most] = detector.distanceM;
  const distance = chosen ?? given.distanceM ?? (least === most ? least : null);
  if (distance !== null) return distance;
  const range = `${formatQuantity(least, 'length')} to ${formatQuantity(most, 'length')}`;
  const expected = `a distance, such as --distance "${formatQuantity(least, 'length')}"`;
  throw inputError([{ file: given.file, found: `no distance, and a brief that allows ${range}`, expected }]);
}

function checkGeometry({ detector, placement, particles }: Task, file: string): void {
  const [distanceM] = detector.distanceM;
  const nearestM = distanceM - placement.depthM;
  const found = `a distance of ${formatQuantity(distanceM, 'length')}`;
  if (placement.depthM > distanceM / 2) {
    const least = formatQuantity(2 * placement.depthM, 'length');
    throw inputError([{ file, found, expected: `at least twice the brief's depth, ${least}` }]);
  }
  const largestM = Math.max(...particles.map(({ diameterM }) => diameterM));
  if (nearestM <= largestM) {
    const least = formatQuantity(largestM, 'length');
    throw inputError([{ file, found, expected: `more than the largest particle's diameter, ${least}` }]);
  }
  const [radiusM] = detector.radiusM;
  const mostM = nearestM * Math.tan(LARGEST_HALF_ANGLE);
  if (radiusM + placement.offsetM < mostM) return;
  const place = `${formatQuantity(nearestM, 'length')} behind the particle`;
  const expected = `less than ${formatQuantity(mostM, 'length')}, a half-angle of 80 deg at ${place}`;
  const radius = `a radius of ${formatQuantity(radiusM, 'length')}`;
  const offset =
    placement.offsetM === 0
      ? ''
      : ` with a particle ${formatQuantity(placement.offsetM, 'length')} off the axis`;
  throw inputError([{ file, found: radius + offset, expected }]);
}

/** Tables grow with the phase at the rim, samplings with the phase that the offset adds: both must fit into memory. */
function checkEffort(
  { light, medium, particles, placement, detector }: Task,
  samplesOffset: boolean,
  file: string,
): void {
  const [radiusM] = detector.radiusM;
  const nearestM = detector.distanceM[0] - placement.depthM;
  const index = refractiveIndex(medium, light.wavelengthM)[0];
  const kappa = (Math.PI * index) / (light.wavelengthM * nearestM);
  const scenarios = particles.length * (light.driftM === 0 ? 1 : REPORT_FINENESS.drifts);
  const depths = placement.depthM === 0 ? 1 : REPORT_FINENESS.depths;
  const reachM = radiusM + placement.offsetM + (placement.crossing?.spanM ?? 0) / 2;
  // Eight cells a radian, four numbers a cell, and a reach of 1.3 times what is asked for (see TableShelf).
  const numbers = 8 * 4 * kappa * (1.3 * reachM) ** 2 * scenarios * (light.polarizationRad === null ? 1 : 2);
  const circles = (2 * kappa * radiusM * placement.offsetM) / REPORT_FINENESS.spacing;
  const readings = samplesOffset ? Math.PI * circles ** 2 * scenarios * depths : scenarios;
  const excess = Math.max(numbers / MOST_TABLE_NUMBERS, readings / MOST_READINGS);
  if (excess <= 1) return;
  const found = `a radius of ${formatQuantity(radiusM, 'length')} at ${formatQuantity(nearestM, 'length')}`;
  const expected =
    `an outline, offset, or number of particles that takes less memory: ` +
    `this one needs ${excess.toPrecision(2)} times what is allowed`;
  throw inputError([{ file, found, expected }]);
}
