import { boundaryReading } from '../src/reading/boundaryReading.ts';
import { nearAmplitudes } from '../src/reading/nearAmplitudes.ts';
import type { Placement } from '../src/reading/placement.ts';
import { flightPoints } from '../src/reading/positions.ts';
import { buildRadialTable } from '../src/reading/radialTable.ts';
import { SEARCH_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import type { Task } from '../src/score/task.ts';
import { lobedRing, median, presetBrief } from './sampleTask.ts';

const VERTICES = 512;
const ROUNDS = 5;
/** Tables built in one round. */
const TABLES = 20;
const TABLE_RADIUS_M = 5.5e-4;

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
  { effect: 'crossing', change: (task) => placed(task, { crossing: { spanM: 1e-4, headingRad: 0.5 } }) },
];

/**
 * What each effect costs: milliseconds to build one radial table to 0.55 mm, and readings per second of a 512-vertex
 * outline from it, a flight counting as one reading. Medians of several rounds, the first of them not counted.
 */
export async function benchEffects() {
  const { task } = await presetBrief('nominal-sphere');
  return EFFECTS.map(({ effect, change, exact }) => ({
    effect,
    ...timeEffect(change(task), exact ?? false),
  }));
}

function timeEffect(task: Task, isExact: boolean): { tableMs: number; readingsPerSecond: number } {
  const judge = new Judge(task, SEARCH_FINENESS);
  const [distanceM] = task.detector.distanceM;
  const [scenario] = judge.scenarios;
  const build = () => {
    const colours = isExact
      ? scenario.colours.map(({ weight, sphere }) => ({ weight, sphere: nearAmplitudes(sphere, distanceM) }))
      : scenario.colours;
    return buildRadialTable({ ...scenario, colours }, distanceM, TABLE_RADIUS_M, task.placement.spreadM);
  };
  const tableMs = medianOf(() => Array.from({ length: TABLES }, build)).ms / TABLES;
  const table = build();
  const radiusM = Math.sqrt(25 / judge.kappa(distanceM));
  const nodes = edgeMiddles(lobedRing(VERTICES, radiusM));
  const points = flightPoints(task.placement.crossing, 2 * judge.kappa(distanceM) * radiusM).length / 2;
  const batch = Math.ceil(4000 / points);
  const { ms, value } = medianOf(() => {
    let sum = 0;
    for (let i = 0; i < batch * points; i++) {
      sum += boundaryReading(table, nodes, ((i % 97) - 48) * 2e-7, ((i % 89) - 44) * 2e-7);
    }
    return sum;
  });
  // A sum that is looked at cannot be compiled away.
  if (!Number.isFinite(value)) throw new Error('a reading is not finite');
  return { tableMs, readingsPerSecond: Math.round((1000 * batch) / ms) };
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
