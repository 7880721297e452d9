import { constantIndex } from '../src/optics/indexModel.ts';
import { isTabled } from '../src/optics/particle.ts';
import { beamReading } from '../src/reading/beamReading.ts';
import { buildBeamTable } from '../src/reading/beamTable.ts';
import { boundaryReading } from '../src/reading/boundaryReading.ts';
import { FlightGrid } from '../src/reading/flightGrid.ts';
import { plainFlights } from '../src/reading/flightMeans.ts';
import { flightMirrors } from '../src/reading/flightMirrors.ts';
import { nearAmplitudes } from '../src/reading/nearAmplitudes.ts';
import type { Placement } from '../src/reading/placement.ts';
import { NO_FLIGHT, samplePositions } from '../src/reading/positions.ts';
import { buildRadialTable } from '../src/reading/radialTable.ts';
import type { Reader } from '../src/reading/readers.ts';
import type { Scenario } from '../src/reading/scenario.ts';
import { SEARCH_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import { NO_SYMMETRY } from '../src/score/sampling.ts';
import type { Task } from '../src/score/task.ts';
import { taskScenarios } from '../src/score/taskScenarios.ts';
import { lobedRing, median, presetBrief } from './sampleTask.ts';

const VERTICES = 512;
const ROUNDS = 5;
/** Tables built in one round. */
const TABLES = 20;
const TABLE_RADIUS_M = 5.5e-4;
/** The particle's places, which a search takes flights through, lie within this of the axis. */
const OFFSET_M = 1e-5;

/** One row: a task with one effect more than the plain one, and whether the sphere's exact fields are read. */
interface Effect {
  effect: string;
  change: (task: Task) => Task;
  exact?: true;
}

const placed = (task: Task, placement: Partial<Placement>): Task => ({
  ...task,
  placement: { ...task.placement, ...placement },
});

const EFFECTS: readonly Effect[] = [
  { effect: 'none', change: (task) => task },
  { effect: 'spread', change: (task) => placed(task, { spreadM: 5e-6 }) },
  { effect: 'linewidth', change: (task) => ({ ...task, light: { ...task.light, linewidthM: 1e-9 } }) },
  { effect: 'polarisation', change: (task) => ({ ...task, light: { ...task.light, polarizationRad: 0.3 } }) },
  { effect: 'exact fields', change: (task) => task, exact: true },
  {
    effect: 'layered particle',
    change: (task) => ({
      ...task,
      particles: task.particles.map((one) =>
        isTabled(one) ? one : { ...one, core: { share: 0.6, index: constantIndex(1.7, 0.1) } },
      ),
    }),
  },
  {
    effect: 'focused beam',
    change: (task) => ({ ...task, light: { ...task.light, beam: { waistM: 200e-6, focusM: 0 } } }),
  },
  {
    effect: 'tightly focused beam',
    change: (task) => ({ ...task, light: { ...task.light, beam: { waistM: 20e-6, focusM: 0 } } }),
  },
  { effect: 'crossing', change: (task) => placed(task, { crossing: { spanM: 1e-4, headingRad: 0.5 } }) },
];

/**
 * What each effect costs: milliseconds to solve the particle, to build one radial table to 0.55 mm (of a beam: the table that stands for it), and readings per second of a 512-vertex
 * outline from it at the places of a search, a flight through one of them counting as one reading. Medians of several rounds,
 * the first of them not counted.
 */
export async function benchEffects() {
  const { task } = await presetBrief('nominal-sphere');
  return EFFECTS.map(({ effect, change, exact }) => ({
    effect,
    ...timeEffect(change(task), exact ?? false),
  }));
}

interface EffectTimes {
  solveMs: number;
  tableMs: number;
  readingsPerSecond: number;
}

function timeEffect(task: Task, isExact: boolean): EffectTimes {
  const judge = new Judge(task, SEARCH_FINENESS);
  const [distanceM] = task.detector.distanceM;
  const solveMs = medianOf(() => Array.from({ length: TABLES }, () => taskScenarios(task, 1))).ms / TABLES;
  const build = () => readerOf(task, judge.scenarios[0], distanceM, isExact);
  const tableMs = medianOf(() => Array.from({ length: TABLES }, build)).ms / TABLES;
  const read = build();
  // The flat wave's κ, so that every row reads the same outline.
  const kappa = Math.PI / (judge.wavelengthM * distanceM);
  const radiusM = Math.sqrt(25 / kappa);
  const nodes = edgeMiddles(lobedRing(VERTICES, radiusM));
  const middles = samplePositions(OFFSET_M, 2 * kappa * radiusM, 0.5, NO_SYMMETRY);
  const { crossing } = task.placement;
  const flights =
    crossing === null
      ? plainFlights(middles, NO_FLIGHT)
      : new FlightGrid(middles, crossing, {
          phasePerMetre: 2 * kappa * (radiusM + OFFSET_M + crossing.spanM),
          mirrors: flightMirrors(NO_SYMMETRY, crossing.headingRad, false),
          tail: SEARCH_FINENESS.tail,
        });
  const batch = Math.ceil(4000 / flights.count);
  const means = new Float64Array(flights.count);
  const { ms, value } = medianOf(() => {
    let sum = 0;
    for (let i = 0; i < batch; i++) {
      flights.means((x, y) => read(nodes, x, y), means);
      sum += means[i % means.length];
    }
    return sum;
  });
  // A sum that is looked at cannot be compiled away.
  if (!Number.isFinite(value)) throw new Error('a reading is not finite');
  return { solveMs, tableMs, readingsPerSecond: Math.round((1000 * batch * flights.count) / ms) };
}

function readerOf(task: Task, scenario: Scenario, distanceM: number, isExact: boolean): Reader {
  const { spreadM } = task.placement;
  const { beam } = task.light;
  if (beam !== undefined) {
    const place = { placeM: 0, distanceM, spreadM, offsetM: 2e-5, radiusM: TABLE_RADIUS_M };
    const table = buildBeamTable(scenario, beam, place);
    return (nodes, x, y) => beamReading(table, nodes, x, y);
  }
  const colours = isExact
    ? scenario.colours.map(({ weight, sphere }) => ({ weight, sphere: nearAmplitudes(sphere, distanceM) }))
    : scenario.colours;
  const table = buildRadialTable({ ...scenario, colours }, distanceM, TABLE_RADIUS_M, spreadM);
  return (nodes, x, y) => boundaryReading(table, nodes, x, y);
}

function medianOf<Result>(work: () => Result): { ms: number; value: Result } {
  const times: number[] = [];
  let value = work();
  for (let round = 0; round < ROUNDS; round++) {
    const from = performance.now();
    value = work();
    times.push(performance.now() - from);
  }
  return { ms: median(times), value };
}

/** One node an edge, at its middle: x, y, dx, dy. */
function edgeMiddles(ring: Float64Array): Float64Array {
  const nodes: number[] = [];
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    const [x, y, dx, dy] = [ring[i], ring[i + 1], ring[j] - ring[i], ring[j + 1] - ring[i + 1]];
    nodes.push(x + dx / 2, y + dy / 2, dx, dy);
  }
  return Float64Array.from(nodes);
}
