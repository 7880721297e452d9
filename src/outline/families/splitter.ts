import type { RandomSource } from '../../base/random.ts';
import { ringLoop, THINNEST_M } from '../ring.ts';
import type { ShapeElement } from '../shape.ts';
import type { PhaseLimits, Variant } from './family.ts';

/** How much farther the second detector is, for each variant. */
const RATIOS = [1.5, 2] as const;

/** Least ratio of the brief's distances that such detectors need. */
export const LEAST_SPLIT = RATIOS[0];

/**
 * Two detectors behind a beam splitter that gives each half of the light, the second one farther away: discs or annuli of a weight each.
 * Of the same outline they would have as much light, yet see other phases: a difference keeps the particle and loses the
 * light's own noise.
 */
export function splitterVariants(limits: PhaseLimits): Variant[] {
  return RATIOS.filter((ratio) => ratio <= (limits.distanceSpan ?? 1)).map((ratio) => ({
    family: 'splitter',
    id: `splitter-${ratio}`,
    weighted: true,
    parameters: ['near', 'far'].flatMap((which) =>
      ['inner', 'outer'].map((rim) => ({ name: `${which} ${rim}`, low: 0, high: limits.high })),
    ),
    draw(values, unitM) {
      const near = annulus(values[0], values[1], unitM);
      // A phase at the farther plane lies farther out.
      const far = annulus(values[2], values[3], unitM * Math.sqrt(ratio));
      const elements = [...(near ? [near] : []), ...(far ? [{ ...far, distanceRatio: ratio }] : [])];
      if (elements.length === 0) return { misdrawnBy: 1 };
      return { elements, folds: Number.POSITIVE_INFINITY, mirror: true, freeWeights: true };
    },
    start: (random) => startPair(random, limits),
  }));
}

function annulus(one: number, other: number, unitM: number): ShapeElement | null {
  const [inner, outer] = [Math.min(one, other), Math.max(one, other)].map(
    (phase) => Math.sqrt(phase) * unitM,
  );
  if (outer - inner < THINNEST_M) return null;
  const loops = inner < THINNEST_M ? [ringLoop(outer, 1)] : [ringLoop(outer, 1), ringLoop(inner, -1)];
  return { weight: 1, loops, share: 0.5 };
}

/** One over an odd zone, which takes light out, the other over two, which takes out none; often both are discs. */
function startPair(random: RandomSource, { high }: PhaseLimits) {
  const isFarOdd = random.uniform() < 0.5;
  const rims = [isFarOdd, !isFarOdd].flatMap((isEven) => {
    const inner = random.uniform() < 0.6 ? 0 : random.uniform();
    return [inner, inner + Math.PI * (isEven ? 2 : 1) + 0.3 * random.normal()];
  });
  return {
    values: rims.map((value) => Math.min(Math.max(value, 0), high)),
    spreads: rims.map(() => 0.25),
  };
}
