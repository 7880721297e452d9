import { gaussLegendre } from '../src/numeric/gaussLegendre.ts';
import { beamRadius } from '../src/optics/gaussianBeam.ts';
import { constantIndex } from '../src/optics/indexModel.ts';
import { scatteringAmplitudes } from '../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../src/optics/mieCoefficients.ts';
import { REPORT_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import type { Task } from '../src/score/task.ts';
import type { PlaneRule } from '../test/reading/beamQuadrature.ts';
import { annulusRule, polygonRule, quadratureReading } from '../test/reading/beamQuadrature.ts';
import { lobedRing } from './sampleTask.ts';

/** A sphere in a beam before a detector, metres. */
interface Arrangement {
  diameterM: number;
  index: readonly [n: number, k: number];
  waistM: number;
  focusM: number;
  distanceM: number;
  /** Of the largest outline. */
  radiusM: number;
  /** Largest distance of the particle from the axis. */
  offsetM: number;
  exact?: true;
}

const UM = 1e-6;
const BEAD = { diameterM: 2 * UM, index: [1.59, 0], focusM: 0, distanceM: 0.02 } as const;
const TIGHT: Arrangement = { ...BEAD, waistM: 20 * UM, radiusM: 300 * UM, offsetM: 20 * UM };
const WIDE: Arrangement = {
  ...BEAD,
  waistM: 100 * UM,
  focusM: -5e-3,
  radiusM: 300 * UM,
  offsetM: 100 * UM,
};
/** A waist of five wavelengths and five radii, and a cone that takes in the whole beam. */
const LIMIT: Arrangement = {
  ...{ diameterM: 1.27 * UM, index: [1.59, 0], waistM: 3.1755 * UM, focusM: 0 },
  ...{ distanceM: 0.005, radiusM: 1200 * UM, offsetM: 3 * UM },
};
const NEAR: Arrangement = {
  ...{ diameterM: 20 * UM, index: [1.5, 0.01], waistM: 100 * UM, focusM: 0 },
  ...{ distanceM: 0.003, radiusM: 150 * UM, offsetM: 50 * UM, exact: true },
};
const DARK: Arrangement = {
  ...{ diameterM: 0.2 * UM, index: [1.5, 0.5], waistM: 20 * UM, focusM: 0 },
  ...{ distanceM: 0.02, radiusM: 2000 * UM, offsetM: 14 * UM },
};

/** Readings in focused beams against quadrature over the plane, and of the whole beam against the removed power. */
export function beamAgreements(task: Task): [what: string, difference: number][] {
  const worst = (set: Arrangement, isRound: boolean, place: readonly [number, number]) =>
    Math.max(...[0.3, 0.5, 0.7, 1].map((part) => difference(task, set, isRound, part * set.radiusM, place)));
  const on = [0, 0] as const;
  const [reached, swing] = wholeBeam(task, DARK);
  return [
    ['beam of 20 µm on its axis, round, against quadrature', worst(TIGHT, true, on)],
    ['  five lobes', worst(TIGHT, false, on)],
    ['  a waist beside it, round', worst(TIGHT, true, [12 * UM, 16 * UM])],
    ['  a waist beside it, five lobes', worst(TIGHT, false, [12 * UM, 16 * UM])],
    ['beam of 100 µm, focus 5 mm before, on the axis, round', worst(WIDE, true, on)],
    ['  a waist beside it, round', worst(WIDE, true, [80 * UM, -60 * UM])],
    ['  a waist beside it, five lobes', worst(WIDE, false, [80 * UM, -60 * UM])],
    ['beam of five wavelengths and radii, on the axis, round', worst(LIMIT, true, on)],
    ['  beside it, round', worst(LIMIT, true, [2 * UM, 1 * UM])],
    ['  beside it, five lobes', worst(LIMIT, false, [2 * UM, 1 * UM])],
    ['exact fields in a beam of 100 µm, 20 µm sphere at 3 mm', worst(NEAR, true, [40 * UM, 30 * UM])],
    ['whole beam, 3.5 to 10 radii, against the removed power', reached],
    ['  largest less smallest reading, scattered light put back', swing],
  ];
}

function judgeOf(task: Task, set: Arrangement): Judge {
  const { diameterM, index, waistM, focusM, distanceM, radiusM, offsetM } = set;
  const light = { ...task.light, linewidthM: 0, driftM: 0, polarizationRad: null, beam: { waistM, focusM } };
  const asked: Task = {
    ...{ ...task, light, medium: constantIndex(1) },
    particles: [{ diameterM, index: constantIndex(...index), material: '' }],
    placement: { offsetM, depthM: 0, spreadM: 0, crossing: null },
    detector: { ...task.detector, distanceM: [distanceM, distanceM], radiusM: [radiusM / 10, radiusM] },
  };
  return new Judge(asked, REPORT_FINENESS, set.exact ? 'exact' : 'far');
}

function difference(
  task: Task,
  set: Arrangement,
  isRound: boolean,
  radiusM: number,
  place: readonly [number, number],
): number {
  const judge = judgeOf(task, set);
  const { distanceM, waistM, focusM, diameterM, index } = set;
  const ring = isRound ? circle(radiusM) : lobedRing(40, radiusM / Math.sqrt(1.5));
  const [row] = judge.outlineRatios(
    [{ weight: 1, rings: [ring] }],
    distanceM,
    Float64Array.from(place),
  ).ratios;
  const phase = judge.kappa(distanceM) * radiusM * (radiusM + 3 * Math.hypot(...place));
  const along = Math.ceil(20 + 0.5 * phase);
  const rule: PlaneRule = isRound
    ? annulusRule(0, radiusM, 2 * along, 4 * along)
    : polygonRule([...ring], along, Math.ceil(6 + along / 4));
  const wavenumber = (2 * Math.PI) / judge.wavelengthM;
  const sphere = mieCoefficients((wavenumber * diameterM) / 2, index);
  const arrangement = {
    ...{ wavenumber, waistM, focusM, sphere, planeM: distanceM },
    place: [...place, 0] as const,
    near: set.exact ?? false,
  };
  return Math.abs(row[0] - quadratureReading(arrangement, rule) / judge.scenarios[0].extinctionM2);
}

/** A disc that takes in the whole beam: what it misses of the removed power, over the extinction, and how far that swings. */
function wholeBeam(task: Task, set: Arrangement): [missed: number, swing: number] {
  const judge = judgeOf(task, set);
  const { distanceM, diameterM, index, waistM, focusM, offsetM } = set;
  const wavenumber = (2 * Math.PI) / judge.wavelengthM;
  const sphere = mieCoefficients((wavenumber * diameterM) / 2, index);
  const beamM = beamRadius({ waistM, focusM }, wavenumber, distanceM);
  const [onAxis, beside] = [0, offsetM].map((x) => {
    const local = judge.localIrradiance(0, distanceM, [x, 0, 0]);
    const shares = [3.5, 4, 4.5, 5, 5.5, 6, 7, 8, 9, 10].map((times) => {
      const radiusM = times * beamM;
      const rings = [circle(radiusM)];
      const [row] = judge.outlineRatios([{ weight: 1, rings }], distanceM, Float64Array.of(x, 0)).ratios;
      const caught = caughtLight(sphere, Math.atan(radiusM / distanceM)) / wavenumber ** 2;
      return row[0] / local + caught / judge.scenarios[0].extinctionM2;
    });
    const [least, most] = [Math.min(...shares), Math.max(...shares)];
    return [Math.max(Math.abs(least - 1), Math.abs(most - 1)), most - least];
  });
  return [Math.max(onAxis[0], beside[0]), Math.max(onAxis[1], beside[1])];
}

/** ∫ (|S1|² + |S2|²)/2 dΩ over a cone about the axis. */
function caughtLight(sphere: ReturnType<typeof mieCoefficients>, halfAngle: number): number {
  const { nodes, weights } = gaussLegendre(60);
  const out = new Float64Array(4);
  return nodes.reduce((sum, node, i) => {
    const theta = (halfAngle * (1 + node)) / 2;
    scatteringAmplitudes(sphere, Math.cos(theta), out);
    const power = out.reduce((all, part) => all + part * part, 0) / 2;
    return sum + weights[i] * power * Math.sin(theta) * Math.PI * halfAngle;
  }, 0);
}

function circle(radiusM: number): Float64Array {
  const count = 6000;
  return Float64Array.from({ length: 2 * count }, (_, i) => {
    const angle = (Math.PI * (i - (i % 2))) / count;
    return radiusM * (i % 2 === 0 ? Math.cos(angle) : Math.sin(angle));
  });
}
