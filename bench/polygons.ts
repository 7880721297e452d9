import { polygonClosedForm, spreadCoefficient } from '../src/reading/polygonClosedForm.ts';
import { lobedRing, median } from './sampleTask.ts';

const EDGES = 512;
const KAPPA = Math.PI / (635e-9 * 0.02);
const PASSES = 40;
const ROUNDS = 9;

/**
 * Times the closed form of a flat polygon of 512 edges about an offset particle, at a mean phase η of 10 and of 1e6: the cost
 * an edge should not grow with η. Nanoseconds an edge and their ratio.
 */
export function benchPolygons() {
  const low = edgeTime(10);
  const high = edgeTime(1e6);
  return { nsPerEdgeAt10: low, nsPerEdgeAt1e6: high, ratio: high / low };
}

/** Median of several rounds, the first of them not counted. */
function edgeTime(eta: number): number {
  const ring = lobedRing(EDGES, Math.sqrt(eta / KAPPA));
  const alpha = spreadCoefficient(KAPPA, 0);
  const times: number[] = [];
  let sum = 0;
  for (let round = 0; round <= ROUNDS; round++) {
    const started = performance.now();
    for (let pass = 0; pass < PASSES; pass++) {
      sum += polygonClosedForm([ring], alpha, (pass - 20) * 5e-7, (pass % 7) * 1e-6).f[0];
    }
    if (round > 0) times.push((1e6 * (performance.now() - started)) / (PASSES * EDGES));
  }
  // A sum that is looked at cannot be compiled away.
  if (!Number.isFinite(sum)) throw new Error('a closed form is not finite');
  return median(times);
}
