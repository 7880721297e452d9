import type { QuadratureRule } from '../src/numeric/gaussLegendre.ts';
import { gaussLegendre } from '../src/numeric/gaussLegendre.ts';
import { boundaryReading } from '../src/reading/boundaryReading.ts';
import { fluxDensity } from '../src/reading/fluxDensity.ts';
import { buildRadialTable } from '../src/reading/radialTable.ts';
import type { Scenario } from '../src/reading/scenario.ts';
import { SEARCH_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import { lobedRing, median, presetBrief } from './sampleTask.ts';

/** Vertices of the outline that is read. */
const VERTICES = 512;
/** Allowed error of the slow quadrature, over the extinction. */
const ACCURACY = 1e-4;
const ROUNDS = 7;

/**
 * Times the boundary integral of a 512-node outline, and two quadratures of the same outline over the plane, each brought
 * to 1e-4 of the extinction with as few points as that takes: the straightforward one, a polar grid of midpoints, and
 * the best that a plane quadrature can do, Gauss–Legendre along every spoke.
 */
export async function benchReadings() {
  const { task } = await presetBrief('nominal-sphere');
  const [scenario] = new Judge(task, SEARCH_FINENESS).scenarios;
  const distanceM = task.detector.distanceM[0];
  const kappa = scenario.colours[0].sphere.wavenumber / (2 * distanceM);
  const ring = lobedRing(VERTICES, Math.sqrt(25 / kappa));
  const started = performance.now();
  const table = buildRadialTable(scenario, distanceM, 4.5e-4, 0);
  const tableMs = performance.now() - started;
  const nodes = midpointNodes(ring);
  const fast = rate(20_000, (x, y) => boundaryReading(table, nodes, x, y));
  const onAxis = boundaryReading(table, nodes, 0, 0);
  const plane = (rule: (count: number) => QuadratureRule) => {
    const least = leastRule(
      rule,
      (tried) => areaReading(scenario, distanceM, ring, 0, 0, tried) - onAxis,
      scenario,
    );
    return {
      points: least.nodes.length * VERTICES,
      perSecond: rate(8, (x, y) => areaReading(scenario, distanceM, ring, x, y, least)),
    };
  };
  const grid = plane(midpoints);
  const gauss = plane(gaussLegendre);
  return {
    readingsPerSecond: Math.round(fast),
    ratioToQuadrature: Math.round(fast / grid.perSecond),
    quadrature: grid,
    ratioToGaussQuadrature: Math.round(fast / gauss.perSecond),
    gaussQuadrature: gauss,
    tableMs,
  };
}

/** Calls per second at places within 10 µm of the axis: the median of several rounds, the first of them not counted. */
function rate(batch: number, read: (x: number, y: number) => number): number {
  const perSecond: number[] = [];
  for (let round = 0; round <= ROUNDS; round++) {
    let sum = 0;
    const from = performance.now();
    for (let i = 0; i < batch; i++) sum += read(((i % 97) - 48) * 2e-7, ((i % 89) - 44) * 2e-7);
    // A sum that is looked at cannot be compiled away.
    if (!Number.isFinite(sum)) throw new Error('a reading is not finite');
    if (round > 0) perSecond.push((1000 * batch) / (performance.now() - from));
  }
  return median(perSecond);
}

/** `count` equal steps on [−1, 1], each weighed at its middle. */
function midpoints(count: number): QuadratureRule {
  return {
    nodes: Float64Array.from({ length: count }, (_, i) => (2 * i + 1) / count - 1),
    weights: new Float64Array(count).fill(2 / count),
  };
}

/** One node an edge, at its middle. */
function midpointNodes(ring: Float64Array): Float64Array {
  const n = ring.length;
  const nodes = new Float64Array(2 * n);
  for (let i = 0; i < n; i += 2) {
    const j = (i + 2) % n;
    nodes.set(
      [
        (ring[i] + ring[j]) / 2,
        (ring[i + 1] + ring[j + 1]) / 2,
        ring[j] - ring[i],
        ring[j + 1] - ring[i + 1],
      ],
      2 * i,
    );
  }
  return nodes;
}

/** ∬ w dA over the triangles between the outline's middle and its edges, with a rule along each triangle's spoke. */
function areaReading(
  scenario: Scenario,
  distanceM: number,
  ring: Float64Array,
  px: number,
  py: number,
  { nodes, weights }: QuadratureRule,
): number {
  const out = new Float64Array(4);
  const work = new Float64Array(4);
  const { sphere } = scenario.colours[0];
  const n = ring.length;
  let sum = 0;
  for (let i = 0; i < n; i += 2) {
    const j = (i + 2) % n;
    const x = (ring[i] + ring[j]) / 2;
    const y = (ring[i + 1] + ring[j + 1]) / 2;
    const twiceArea = ring[i] * ring[j + 1] - ring[i + 1] * ring[j];
    for (let k = 0; k < nodes.length; k++) {
      const t = (1 + nodes[k]) / 2;
      const dx = t * x - px;
      const dy = t * y - py;
      fluxDensity(sphere, distanceM, dx * dx + dy * dy, out, work);
      sum += (out[0] + out[2]) * (weights[k] / 2) * t * twiceArea;
    }
  }
  return sum;
}

/** The smallest rule, in steps of a twentieth, that holds the accuracy. */
function leastRule(
  rule: (count: number) => QuadratureRule,
  error: (rule: QuadratureRule) => number,
  scenario: Scenario,
): QuadratureRule {
  for (let count = 4; count < 10_000; count = Math.ceil(count * 1.05)) {
    const tried = rule(count);
    if (Math.abs(error(tried)) < ACCURACY * scenario.extinctionM2) return tried;
  }
  throw new Error('the two quadratures do not agree');
}
