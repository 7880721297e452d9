import { readFileSync } from 'node:fs';
import { gaussHermite } from '../src/numeric/gaussHermite.ts';
import { gaussLegendre } from '../src/numeric/gaussLegendre.ts';
import { owenTComplex } from '../src/numeric/owenT.ts';
import { energyBalance } from '../src/optics/energyBalance.ts';
import { constantIndex } from '../src/optics/indexModel.ts';
import { layeredSphere } from '../src/optics/layeredSphere.ts';
import type { Light } from '../src/optics/light.ts';
import { mieCoefficients } from '../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../src/optics/mieEfficiencies.ts';
import type { Placement } from '../src/reading/placement.ts';
import { REPORT_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import type { Task } from '../src/score/task.ts';
import { balancedGain } from './balancedLayout.ts';
import { beamAgreements } from './beamAgreements.ts';
import { moreAgreements } from './moreAgreements.ts';
import { presetBrief } from './sampleTask.ts';

/** `npm run agreements`: each effect beside a brute-force form of it, as the largest difference over the extinction. */
const { task } = await presetBrief('nominal-sphere');
const DISTANCE_M = task.detector.distanceM[0];
const SQUARE = [{ weight: 1, rings: [Float64Array.of(-2e-4, -2e-4, 2e-4, -2e-4, 2e-4, 2e-4, -2e-4, 2e-4)] }];
const PLACE = [3e-5, -2e-5] as const;

type Place = readonly [x: number, y: number];

/** reading/extinction of the square for a particle at a place. */
function ratioAt(light: Partial<Light>, placement: Partial<Placement>, places: readonly Place[]): number[] {
  const asked: Task = {
    ...task,
    light: { ...task.light, ...light },
    placement: { ...task.placement, offsetM: 2e-4, ...placement },
  };
  const judge = new Judge(asked, REPORT_FINENESS);
  const [row] = judge.outlineRatios(SQUARE, DISTANCE_M, Float64Array.from(places.flat())).ratios;
  return Array.from(row);
}

const moved = (dx: number, dy: number): Place => [PLACE[0] + dx, PLACE[1] + dy];
const mean = (values: readonly number[], weights: readonly number[]) =>
  values.reduce((sum, value, i) => sum + value * weights[i], 0) /
  weights.reduce((sum, weight) => sum + weight, 0);

function spreadAgreement(): number {
  const spreadM = 2e-5;
  const { nodes, weights } = gaussHermite(40);
  const pairs = Array.from(nodes).flatMap((u, i) =>
    Array.from(nodes, (v, j) => ({ u, v, weight: weights[i] * weights[j] })),
  );
  const brute = mean(
    ratioAt(
      {},
      {},
      pairs.map(({ u, v }) => moved(spreadM * u, spreadM * v)),
    ),
    pairs.map(({ weight }) => weight),
  );
  return Math.abs(ratioAt({}, { spreadM }, [PLACE])[0] - brute);
}

function crossingAgreement(): number {
  const crossing = { spanM: 2e-4, headingRad: 0.4 };
  const { nodes, weights } = gaussLegendre(400);
  const along = Array.from(nodes, (t) => (t * crossing.spanM) / 2);
  const places = along.map((s) =>
    moved(s * Math.cos(crossing.headingRad), s * Math.sin(crossing.headingRad)),
  );
  return Math.abs(ratioAt({}, { crossing }, [PLACE])[0] - mean(ratioAt({}, {}, places), Array.from(weights)));
}

function sourceAgreement(): number {
  const sourceAngleRad = 2e-3;
  const radiusM = DISTANCE_M * Math.tan(sourceAngleRad);
  const { nodes, weights } = gaussLegendre(40);
  const places: Place[] = [];
  const shares: number[] = [];
  for (let i = 0; i < nodes.length; i++) {
    const rho = radiusM * Math.sqrt((1 + nodes[i]) / 2);
    for (let j = 0; j < 64; j++) {
      places.push(moved(rho * Math.cos((Math.PI * j) / 32), rho * Math.sin((Math.PI * j) / 32)));
      shares.push(weights[i]);
    }
  }
  return Math.abs(ratioAt({ sourceAngleRad }, {}, [PLACE])[0] - mean(ratioAt({}, {}, places), shares));
}

function lineAgreement(shape: 'gaussian' | 'lorentzian', linewidthM: number): number {
  const { wavelengthM } = task.light;
  const reach = shape === 'gaussian' ? 2.5 : 10;
  const { nodes, weights } = gaussLegendre(300);
  const colours = Array.from(nodes, (t, i) => {
    const off = reach * t;
    const plain = shape === 'gaussian' ? Math.exp(-4 * Math.LN2 * off * off) : 1 / (1 + 4 * off * off);
    // The program's Lorentzian fades as cos² beyond five full widths, to end at ten.
    const fade =
      shape === 'gaussian' || Math.abs(off) < 5 ? 1 : Math.cos((Math.PI / 10) * (Math.abs(off) - 5)) ** 2;
    return { wavelengthM: wavelengthM + off * linewidthM, weight: weights[i] * plain * fade };
  });
  let readings = 0;
  let extinctions = 0;
  for (const colour of colours) {
    const light = { ...task.light, wavelengthM: colour.wavelengthM };
    const judge = new Judge({ ...task, light }, REPORT_FINENESS);
    const [row] = judge.outlineRatios(SQUARE, DISTANCE_M, Float64Array.from(PLACE)).ratios;
    readings += colour.weight * row[0] * judge.scenarios[0].extinctionM2;
    extinctions += colour.weight * judge.scenarios[0].extinctionM2;
  }
  return Math.abs(ratioAt({ linewidthM, shape }, {}, [PLACE])[0] - readings / extinctions);
}

function owenAgreement(): number {
  const file = new URL('../test/reference/owen-complex.json', import.meta.url);
  const { values } = JSON.parse(readFileSync(file, 'utf8')) as {
    values: { hSquared: [number, number]; a: number; T: [string, string] }[];
  };
  return Math.max(
    ...values.map(({ hSquared, a, T }) => {
      const [re, im] = owenTComplex(hSquared, a);
      return Math.hypot(re - Number(T[0]), im - Number(T[1]));
    }),
  );
}

function layeredAgreement(): number {
  const file = new URL('../test/reference/layered.json', import.meta.url);
  const { spheres } = JSON.parse(readFileSync(file, 'utf8'));
  const [{ sizes, indices, recomputed }] = spheres;
  const found = mieEfficiencies(
    layeredSphere(sizes.map((x: number, i: number) => ({ x, m: indices[i] }))),
  ).extinction;
  return Math.abs(found / Number(recomputed.Qext) - 1);
}

function energyAgreement(): number {
  const errors = [1.1, 3, 60].map((factor) => {
    const { extinctionError, scatteringError } = energyBalance(mieCoefficients(250, [1.5, 0]), 250 * factor);
    return Math.max(Math.abs(extinctionError), Math.abs(scatteringError));
  });
  return Math.max(...errors);
}

function nearZoneDifference(): number {
  const particle = { diameterM: 50e-6, index: constantIndex(1.5), material: '1.5' };
  const near: Task = {
    ...task,
    particles: [particle],
    detector: { ...task.detector, distanceM: [0.005, 0.005] },
  };
  const [far, exact] = (['far', 'exact'] as const).map(
    (fields) =>
      new Judge(near, REPORT_FINENESS, fields).outlineRatios(SQUARE, 0.005, Float64Array.of(0, 0))
        .ratios[0][0],
  );
  return Math.abs(far - exact);
}

const rows: [string, number][] = [
  ['random spread of 20 µm, against a mean over 1600 places', spreadAgreement()],
  ['flight of 200 µm, against a mean over 400 places', crossingAgreement()],
  ['source of 2 mrad, directions less 2560 places (what the paraxial form leaves out)', sourceAgreement()],
  ['Gaussian line of 2 nm, against 300 colours', lineAgreement('gaussian', 2e-9)],
  ['Gaussian band of 30 nm, against 300 colours', lineAgreement('gaussian', 30e-9)],
  ['Lorentzian line of 2 nm, against 300 colours', lineAgreement('lorentzian', 2e-9)],
  [
    'beam with a waist of 5 m, against a flat wave',
    Math.abs(ratioAt({ beam: { waistM: 5, focusM: 0 } }, {}, [PLACE])[0] - ratioAt({}, {}, [PLACE])[0]),
  ],
  ...beamAgreements(task),
  ['energy balance near a sphere of x = 250, relative', energyAgreement()],
  ["Owen's T of complex h, against mpmath, absolute", owenAgreement()],
  ['coated sphere of Bohren & Huffman p. 489, Qext, relative', layeredAgreement()],
  ['exact less far-zone fields, 50 µm at 5 mm, 0.4 mm square', nearZoneDifference()],
  ...moreAgreements(task),
];
for (const [what, value] of rows) console.log(`${what.padEnd(82)}${value.toExponential(1).padStart(10)}`);
const { single, balanced, ratio } = await balancedGain();
console.log(
  `At -130 dB/Hz (noisy-laser) the best single element takes ${single.toExponential(3)} s, the best balanced layout ${balanced.toExponential(3)} s: ${ratio.toPrecision(3)} times less`,
);
