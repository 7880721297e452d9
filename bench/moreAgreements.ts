import { constantIndex } from '../src/optics/indexModel.ts';
import type { MieCoefficients } from '../src/optics/mieCoefficients.ts';
import { sphereCoefficients } from '../src/optics/sphereAmplitudes.ts';
import { boundaryReading } from '../src/reading/boundaryReading.ts';
import { polygonClosedForm, spreadCoefficient } from '../src/reading/polygonClosedForm.ts';
import { buildRadialTable } from '../src/reading/radialTable.ts';
import type { GivenDesign } from '../src/run/givenDesign.ts';
import { judgeOutline } from '../src/run/judgeOutline.ts';
import { responseOf } from '../src/run/response.ts';
import { roughReadings } from '../src/run/roughReadings.ts';
import { REPORT_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import type { Task } from '../src/score/task.ts';
import { constantScenario, discNodes, polygonNodes, ratioOf } from '../test/reading/setup.ts';
import { tiltedReading } from '../test/reading/tiltedWaves.ts';
import { lobedRing } from './sampleTask.ts';

export type AgreementRow = [what: string, value: number];

const DISTANCE_M = 0.02;
const WAVENUMBER = (2 * Math.PI) / 635e-9;
const KAPPA = WAVENUMBER / (2 * DISTANCE_M);
const SQUARE = Float64Array.of(-2e-4, -2e-4, 2e-4, -2e-4, 2e-4, 2e-4, -2e-4, 2e-4);
const given = (ring: Float64Array): GivenDesign => ({
  id: 'square',
  family: 'given',
  distanceM: DISTANCE_M,
  elements: [{ weight: 1, rings: [ring] }],
  file: 'square',
});

/** Rows beyond single effects of the light and of motion: closed forms, rough edges, response, wide bands and tilted waves. */
export function moreAgreements(task: Task): AgreementRow[] {
  return [
    ...closedFormRows(),
    ...roughRows(task),
    responseRow(task),
    bandRow(task),
    ...[2e-3, 1e-2].map((angle) => tiltRow(task, angle)),
  ];
}

/** Largest |Δf| between Owen's T and a table of a constant amplitude, over amplitudes of two phases. The table is not paraxial. */
function closedFormRows(): AgreementRow[] {
  const cases: [string, readonly [number, number], number][] = [
    ['centred', [0, 0], 0],
    ['offset of 36 µm', [3e-5, -2e-5], 0],
    ['spread of 20 µm', [3e-5, -2e-5], 2e-5],
  ];
  return cases.map(([name, [px, py], spreadM]) => {
    const rings = [SQUARE, lobedRing(64, 2e-4)];
    // 20 m behind with a square as many times √1000 larger: the same phases at small angles.
    const scale = Math.sqrt(1000);
    const far = rings.map((ring) => {
      const wide = ring.map((value) => value * scale);
      const { f } = polygonClosedForm(
        [wide],
        spreadCoefficient(KAPPA / 1000, spreadM * scale),
        px * scale,
        py * scale,
      );
      const nodes = polygonNodes([[...wide]], (2 * KAPPA) / 1000, 1e-4 * scale);
      const [re, im] = [[1, 0] as const, [1, 1] as const].map((forward) => {
        const scenario = constantScenario(WAVENUMBER, forward);
        return ratioOf(scenario, 1000 * DISTANCE_M, nodes, [px * scale, py * scale], spreadM * scale);
      });
      // ratio = 1 − Re[S f]/Re S: Re f from S = 1, Im f from S = 1 + i.
      return Math.hypot(1 - re - f[0], im - re - f[1]);
    });
    return [`polygons by Owen's T, ${name}: largest |Δf|, constant amplitude`, Math.max(...far)];
  });
}

/** A rough edge of 2 µm rms that forgets itself within 50 µm. */
function roughRows(task: Task): AgreementRow[] {
  const outlines = 400;
  const judged = judgeOutline(task, given(SQUARE), DISTANCE_M, [0, 0]);
  const read = (seed: number) =>
    roughReadings(
      judged,
      given(SQUARE).elements,
      { rmsM: 2e-6, correlationM: 5e-5, outlines, seed },
      1,
      [0, 0],
    ).readings[0].first;
  const [one, two] = [read(1), read(2)];
  const meanError = one.spread / Math.sqrt(outlines);
  const spreadError = one.spread / Math.sqrt(2 * outlines);
  return [
    [
      'rough edge 2 µm, 50 µm: mean by 400 outlines less closed estimate',
      Math.abs(one.mean - one.estimate.mean),
    ],
    ['… standard error of that mean', meanError],
    ['rough edge: spread by 400 outlines less closed estimate', Math.abs(one.spread - one.estimate.spread)],
    ['… standard error of that spread', spreadError],
    [
      'rough edge: means of two ensembles, in standard errors',
      Math.abs(one.mean - two.mean) / (Math.SQRT2 * meanError),
    ],
    [
      'rough edge: spreads of two ensembles, in standard errors',
      Math.abs(one.spread - two.spread) / (Math.SQRT2 * spreadError),
    ],
  ];
}

/** Ends of the diameters that hold 16 %, by 60 diameters and by 1200: in steps of the coarse ones (below 1 is as good as it can be). */
function responseRow(task: Task): AgreementRow {
  const loose = { ...task, target: { ...task.target, correction: 0.16 } };
  const holdsOf = (count: number) =>
    responseOf(
      loose,
      given(SQUARE),
      { fromM: 1e-6, toM: 4e-6, count, index: constantIndex(1.59), material: '1.59' },
      DISTANCE_M,
    ).points.map(({ holds }) => holds);
  const [coarse, fine] = [holdsOf(60), holdsOf(1181)];
  // 1181 − 1 is 20 times 60 − 1: every twentieth diameter is one of the coarse ones. What lies between two alike should be like them.
  const lost = fine.filter((holds, i) => {
    const [before, after] = [coarse[Math.floor(i / 20)], coarse[Math.min(59, Math.ceil(i / 20))]];
    return before === after && holds !== before;
  });
  return ['response: part of 1181 diameters that 60 place on the wrong side', lost.length / fine.length];
}

/** A lossless sphere of 4 µm in a band of 30 nm, against 12 000 colours. */
function bandRow(task: Task): AgreementRow {
  const particle = { diameterM: 4e-6, index: constantIndex(1.59), material: '1.59' };
  const light = { ...task.light, linewidthM: 30e-9 };
  const [scenario] = new Judge({ ...task, light, particles: [particle] }, REPORT_FINENESS).scenarios;
  const [one] = new Judge({ ...task, particles: [particle] }, REPORT_FINENESS).scenarios;
  const count = 12_000;
  const sigmaM = light.linewidthM / Math.sqrt(8 * Math.LN2);
  const offs = Array.from({ length: count }, (_, i) => 2 * light.linewidthM * ((2 * i + 1) / count - 1));
  const weights = offs.map((off) => Math.exp(-((off / sigmaM) ** 2) / 2));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const colours = offs.map((off, i) => {
    const shifted = {
      ...task,
      light: { ...task.light, wavelengthM: light.wavelengthM + off },
      particles: [particle],
    };
    return {
      weight: weights[i] / total,
      sphere: new Judge(shifted, REPORT_FINENESS).scenarios[0].colours[0].sphere,
    };
  });
  const extinctionM2 = colours.reduce((sum, { weight, sphere }) => sum + weight * sphere.extinctionM2, 0);
  const nodes = discNodes(2e-4, 2 * KAPPA, 0, 0, 1e-5);
  const [fast, slow] = [scenario, { ...one, colours, extinctionM2 }].map(
    (each) =>
      boundaryReading(buildRadialTable(each, DISTANCE_M, 2.2e-4, 0), nodes, 1e-5, 0) / each.extinctionM2,
  );
  return ['lossless 4 µm sphere in a band of 30 nm, against 12000 colours', Math.abs(fast - slow)];
}

/** Source of a finite angle, against exactly tilted vector waves: a disc of η = 30. */
function tiltRow(task: Task, angle: number): AgreementRow {
  const light = { ...task.light, sourceAngleRad: angle };
  const [scenario] = new Judge({ ...task, light }, REPORT_FINENESS).scenarios;
  const { wavenumber } = scenario.colours[0].sphere;
  const [particle] = task.particles;
  const coefficients = sphereCoefficients(
    particle as never,
    task.medium,
    task.light.wavelengthM,
  ) as MieCoefficients;
  const radiusM = Math.sqrt(30 / KAPPA);
  const slow = tiltedReading(coefficients, wavenumber, DISTANCE_M, radiusM, angle) / scenario.extinctionM2;
  const fast = ratioOf(scenario, DISTANCE_M, discNodes(radiusM, 2 * KAPPA));
  return [`source of ${1e3 * angle} mrad, against exactly tilted vector waves`, Math.abs(fast - slow)];
}
