import type { RandomSource } from '../../src/base/random.ts';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { boundaryNodes } from '../../src/outline/boundaryNodes.ts';
import { allVariants } from '../../src/outline/families/allVariants.ts';
import { FAMILY_NAMES, isDrawn, type Variant } from '../../src/outline/families/family.ts';
import { polygonise } from '../../src/outline/polygonise.ts';
import type { Loop, Shape, ShapeElement } from '../../src/outline/shape.ts';

/** The phases of the brief `offset-range`: 635 nm, 20 mm, radii up to 0.4 mm. */
export const LIMITS = { low: 0.1, high: 39.6, gapM: 1e-6, distanceSpan: 3 };
export const KAPPA = Math.PI / (635e-9 * 0.02);
export const UNIT_M = 1 / Math.sqrt(KAPPA);

export const VARIANTS = allVariants(FAMILY_NAMES, LIMITS);

export function variantNamed(id: string): Variant {
  const variant = VARIANTS.find((one) => one.id === id);
  if (!variant) throw new Error(`no variant ${id}`);
  return variant;
}

/** Draws what must come out. */
export function drawn(variant: Variant, values: ArrayLike<number>, unitM = UNIT_M): Shape {
  const shape = variant.draw(values, unitM);
  if (!isDrawn(shape)) throw new Error(`${variant.id} misdrawn by ${shape.misdrawnBy}`);
  return shape;
}

/** Values anywhere within the ranges: evenly, crowded at the lower ends, and around starts, in turn. */
export function someValues(variant: Variant, random: RandomSource, turn: number): number[] {
  const within = (value: number, i: number) => {
    const { low, high } = variant.parameters[i];
    return Math.min(Math.max(value, low), high);
  };
  if (turn % 3 === 0) {
    const { values, spreads } = variant.start(random);
    return values.map((value, i) => within(value + spreads[i] * random.normal(), i));
  }
  // Of Fourier coefficients anywhere within their ranges next to none draw anything: all but the mean are made smaller.
  const shrunk = variant.family === 'fourier' ? random.uniform() ** 2 : 1;
  return variant.parameters.map(({ low, high }, i) => {
    const share = turn % 3 === 1 ? random.uniform() : random.uniform() ** 8;
    return low < 0 ? within(shrunk * (low + (high - low) * share), i) : low + (high - low) * share;
  });
}

export function ringsOf({ elements }: Shape, verticesPerTurn: number): Float64Array[] {
  return elements.flatMap(({ loops }) => loops.map((loop) => polygonise(loop, verticesPerTurn)));
}

export function loopsOf({ elements }: Shape): Loop[] {
  return elements.flatMap(({ loops }) => loops);
}

/** Nodes as dense as for what is reported. */
export function nodesOf({ loops }: Pick<ShapeElement, 'loops'>, perRadian = 0.9): Float64Array {
  return boundaryNodes(loops, { kappa: KAPPA, offsetM: 0, perRadian, least: 6 }, new LegendreRules());
}

/** The same points turned about the axis. */
export function turned(ring: Float64Array, angle: number): Float64Array {
  const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
  return ring.map((value, i) =>
    i % 2 === 0 ? cos * value - sin * ring[i + 1] : sin * ring[i - 1] + cos * value,
  );
}

/** The same points mirrored at the x axis, run through backwards so that the opening stays on the left. */
export function mirrored(ring: Float64Array): Float64Array {
  const n = ring.length;
  return ring.map((_, i) => (i % 2 === 0 ? ring[n - 2 - i] : -ring[n - i]));
}
