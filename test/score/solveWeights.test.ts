import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { leastDistance } from '../../src/numeric/leastDistance.ts';
import { noiseOf, noisePower, noiseQuadratic } from '../../src/score/noisePower.ts';
import type { WeightQuestion } from '../../src/score/solveWeights.ts';
import { solveWeights } from '../../src/score/solveWeights.ts';

const random = randomStream(5);
const uniform = (low: number, high: number) => low + (high - low) * random.uniform();

/** Readings of elements as those of rings go: a mean of its own each, and swings from sample to sample that they share in part. */
function question(n: number, samples: number, changes: Partial<WeightQuestion> = {}): WeightQuestion {
  const means = Array.from({ length: n }, (_, j) => (j % 2 === 0 ? 1 : -1) * uniform(0.5, 2));
  const swings = means.map(() => uniform(0.02, 0.3));
  const ratios = Float64Array.from({ length: n * samples }, (_, at) => {
    const [s, j] = [Math.floor(at / n), at % n];
    return means[j] + swings[j] * Math.sin(0.9 * s + 2 * j) + 0.02 * random.normal();
  });
  const areas = means.map(() => uniform(1e-8, 5e-8));
  const noise = noiseOf(areas, {
    responsivityAW: 0.4,
    irradianceWm2: 5e4,
    noiseCurrentA: 2e-12,
    intensityNoisePerHz: 1e-13,
  });
  return { ratios, noise, correction: 0.1, largest: 2, balanced: false, ...changes };
}

const worst = ({ ratios }: WeightQuestion, weights: ArrayLike<number>) => {
  const n = weights.length;
  let most = 0;
  for (let at = 0; at < ratios.length; at += n) {
    let reading = -1;
    for (let j = 0; j < n; j++) reading += weights[j] * ratios[at + j];
    most = Math.max(most, Math.abs(reading));
  }
  return most;
};

describe('leastDistance', () => {
  it('keeps all limits and is the combination of those that hold, each on its own side (Karush, Kuhn and Tucker)', () => {
    let held = 0;
    for (let turn = 0; turn < 200; turn++) {
      const n = 1 + (turn % 6);
      const rows = 3 + Math.floor(uniform(0, 60));
      const a = Float64Array.from({ length: rows * n }, () => random.normal());
      const inside = Array.from({ length: n }, () => 2 * random.normal());
      const at = (x: ArrayLike<number>, row: number) => {
        let value = 0;
        for (let j = 0; j < n; j++) value += a[row * n + j] * x[j];
        return value;
      };
      const low = Float64Array.from({ length: rows }, (_, i) => at(inside, i) - uniform(0, 2));
      const high = Float64Array.from({ length: rows }, (_, i) =>
        i % 5 === 0 ? Number.POSITIVE_INFINITY : at(inside, i) + uniform(0, 2),
      );
      const found = leastDistance(n, { a, low, high });
      if (found === null) throw new Error('there is a point inside');
      const { x, prices } = found;
      held += prices.length;
      for (let i = 0; i < rows; i++) {
        expect(at(x, i)).toBeGreaterThan(low[i] - 1e-8);
        expect(at(x, i)).toBeLessThan(high[i] + 1e-8);
      }
      const sum = new Float64Array(n);
      for (const { row, price } of prices) {
        expect(Math.abs(at(x, row) - (price > 0 ? low[row] : high[row]))).toBeLessThan(1e-8);
        for (let j = 0; j < n; j++) sum[j] += price * a[row * n + j];
      }
      for (let j = 0; j < n; j++) expect(Math.abs(sum[j] - x[j])).toBeLessThan(1e-8);
    }
    expect(held).toBeGreaterThan(200);
  });

  it('tells limits that contradict each other', () => {
    const limits = { a: Float64Array.of(1, 1), low: Float64Array.of(1, -9), high: Float64Array.of(2, 0.999) };
    expect(leastDistance(1, limits)).toBeNull();
    expect(leastDistance(1, { ...limits, high: Float64Array.of(2, 1.001) })?.x[0]).toBeCloseTo(1, 12);
  });
});

describe('noisePower', () => {
  it('is its quadratic form for weights of those signs, and nowhere below it', () => {
    const noise = { ...question(4, 1).noise, leak: 0.3 };
    const form = (weights: readonly number[], signs: readonly number[]) => {
      const q = noiseQuadratic(noise, signs);
      return weights.reduce(
        (sum, p, i) => sum + weights.reduce((row, w, j) => row + p * w * q[4 * i + j], 0),
        0,
      );
    };
    for (let turn = 0; turn < 50; turn++) {
      const weights = Array.from({ length: 4 }, () => random.normal());
      const power = noisePower(noise, weights);
      expect(form(weights, weights.map(Math.sign)) / power).toBeCloseTo(1, 12);
      const others = weights.map(() => (random.uniform() < 0.5 ? 1 : -1));
      expect(form(weights, others)).toBeLessThan(power * (1 + 1e-12));
    }
  });

  it('leaves of a balanced pair the part that the rejection lets through, and of one element all', () => {
    // 60 dB: a thousandth of a common current of 1 µA, at 1e-13 per hertz.
    const noise = {
      separate: new Float64Array(2),
      currents: Float64Array.of(1e-6, 1e-6),
      commonPerHz: 1e-13,
      leak: 1e-3,
    };
    expect(noisePower(noise, [1, -1]) / (1e-13 * 1e-18)).toBeCloseTo(1, 9);
    expect(noisePower(noise, [1, 1]) / (1e-13 * 4e-12)).toBeCloseTo(1, 12);
    expect(noisePower({ ...noise, leak: 0 }, [1, -1])).toBe(0);
  });
});

describe('solveWeights', () => {
  /** Plain slow form: every point of a grid, then finer grids around the best. */
  function byGrid(asked: WeightQuestion, isBetter: (weights: number[]) => number): number[] {
    const n = asked.noise.currents.length;
    let centre = new Array<number>(n).fill(0);
    let reach = asked.largest;
    for (let level = 0; level < 24; level++) {
      let best = Number.POSITIVE_INFINITY;
      let at = centre;
      const steps = 12;
      for (let k = 0; k < (2 * steps + 1) ** n; k++) {
        const weights = centre.map((value, j) => {
          const step = (Math.floor(k / (2 * steps + 1) ** j) % (2 * steps + 1)) - steps;
          return Math.min(asked.largest, Math.max(-asked.largest, value + (reach * step) / steps));
        });
        const value = isBetter(weights);
        if (value < best) {
          best = value;
          at = weights;
        }
      }
      centre = at;
      reach *= 0.6;
    }
    return centre;
  }

  it.each([0, 0.2])('finds the least noise that a search over a grid finds, with a leak of %f', (leak) => {
    for (let turn = 0; turn < 6; turn++) {
      const plain = question(2, 12, { correction: 0.35 });
      const asked = { ...plain, noise: { ...plain.noise, leak } };
      const solved = solveWeights(asked);
      if (solved === null) throw new Error('no weights');
      // A missed limit weighs as much as the noise of all weights at their largest.
      const most = noisePower(asked.noise, [2, 2]) + noisePower(asked.noise, [2, -2]);
      const value = (weights: number[]) =>
        noisePower(asked.noise, weights) +
        1e3 * most * Math.max(0, worst(asked, weights) - asked.correction - 1e-9);
      const grid = byGrid(asked, value);
      expect(solved.worst).toBeLessThan(asked.correction * (1 + 1e-8));
      expect(worst(asked, solved.weights)).toBeCloseTo(solved.worst, 12);
      expect(value(Array.from(solved.weights)) / value(grid)).toBeLessThan(1 + 1e-3);
      expect(value(Array.from(solved.weights)) / value(grid)).toBeGreaterThan(0.99);
    }
  });

  it('comes within a fiftieth of the least worst correction where the allowed one is out of reach', () => {
    let far = 0;
    for (let turn = 0; turn < 6; turn++) {
      const asked = question(2, 30, { correction: 1e-4 });
      const solved = solveWeights(asked);
      const grid = byGrid(asked, (weights) => worst(asked, weights));
      const least = worst(asked, grid);
      if (solved === null) throw new Error('no weights');
      expect(solved.worst / least).toBeLessThan(1.0201);
      expect(solved.worst / least).toBeGreaterThan(0.999);
      if (least > 1e-3) far++;
    }
    expect(far).toBeGreaterThan(3);
  });

  it('keeps the weighted areas at nothing where a balance is asked for, and has no intensity noise left', () => {
    for (let turn = 0; turn < 30; turn++) {
      const asked = question(2 + (turn % 5), 40, { balanced: true, correction: 0.3 });
      const solved = solveWeights(asked);
      if (solved === null) throw new Error('no weights');
      const { currents } = asked.noise;
      const sum = solved.weights.reduce((total, weight, j) => total + weight * currents[j], 0);
      const size = solved.weights.reduce((total, weight, j) => total + Math.abs(weight) * currents[j], 0);
      expect(Math.abs(sum) / size).toBeLessThan(1e-12);
      const quiet = noisePower({ ...asked.noise, commonPerHz: 0 }, solved.weights);
      expect(noisePower(asked.noise, solved.weights) / quiet).toBeCloseTo(1, 12);
      expect(Math.max(...solved.weights.map(Math.abs))).toBeLessThan(asked.largest * (1 + 1e-9));
    }
    expect(solveWeights(question(1, 5, { balanced: true }))).toBeNull();
  });

  it('needs no more noise than weights of one element alone, and takes none that reads nothing', () => {
    const asked = question(4, 25, { correction: 0.5 });
    const alone = solveWeights({
      ...asked,
      ratios: asked.ratios.filter((_, at) => at % 4 === 0),
      noise: {
        ...asked.noise,
        separate: asked.noise.separate.slice(0, 1),
        currents: asked.noise.currents.slice(0, 1),
      },
    });
    const all = solveWeights(asked);
    if (alone === null || all === null) throw new Error('no weights');
    expect(noisePower(asked.noise, all.weights)).toBeLessThan(
      noisePower(asked.noise, [alone.weights[0], 0, 0, 0]) * (1 + 1e-9),
    );
    const blind = { ...asked, ratios: Float64Array.of(1, 1, 1, 1, -1, -1, -1, -1) };
    const found = solveWeights(blind);
    expect(Math.max(...(found?.weights.map(Math.abs) ?? []))).toBeGreaterThan(1e-3);
  });
});
