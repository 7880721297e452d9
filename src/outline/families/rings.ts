import type { RandomSource } from '../../base/random.ts';
import { ringLoop, THINNEST_M } from '../ring.ts';
import type { Loop, Shape } from '../shape.ts';
import type { Misdrawn, PhaseLimits, Variant } from './family.ts';
import { weightedRingsVariants } from './weightedRings.ts';

/** Thinnest ring and gap that are drawn, in phase: thinner ones are merged with their neighbours. */
const THINNEST = 1e-3;

/** One to four concentric annuli, the innermost with a closed middle (`rings-n`) or an open one (`rings-n-open`); and weighted ones. */
export function ringsVariants(limits: PhaseLimits): Variant[] {
  const variants: Variant[] = [];
  for (let count = 1; count <= 4; count++) {
    variants.push(ringsVariant(count, false, limits));
    if (count > 1) variants.push(ringsVariant(count, true, limits));
  }
  return [...variants, ...weightedRingsVariants(limits)];
}

function ringsVariant(count: number, open: boolean, limits: PhaseLimits): Variant {
  const rims = 2 * count - (open ? 1 : 0);
  return {
    family: 'rings',
    id: `rings-${count}${open ? '-open' : ''}`,
    // The rims are sorted before they are drawn, so every choice is valid.
    parameters: Array.from({ length: rims }, (_, i) => ({
      name: `rim ${i + 1}`,
      low: 1e-3,
      high: limits.high,
    })),
    draw: (values, unitM) => drawRings(Array.from(values), open, unitM),
    start: (random) => startRings(random, count, open, limits.high),
  };
}

function drawRings(values: number[], open: boolean, unitM: number): Shape | Misdrawn {
  const rims = mergeThin(open ? [0, ...values] : values, unitM);
  if (rims.length === 0) return { misdrawnBy: 1 };
  const loops: Loop[] = [];
  for (let i = rims.length - 1; i >= 0; i--) {
    if (rims[i] > 0) loops.push(ringLoop(Math.sqrt(rims[i]) * unitM, i % 2 === 1 ? 1 : -1));
  }
  return { elements: [{ weight: 1, loops }], folds: Number.POSITIVE_INFINITY, mirror: true };
}

/** Sorted rims without the pairs that enclose next to nothing. */
function mergeThin(values: number[], unitM: number): number[] {
  const isThin = (inner: number, outer: number) =>
    outer - inner < THINNEST || (Math.sqrt(outer) - Math.sqrt(inner)) * unitM < THINNEST_M;
  const kept: number[] = [];
  for (const rim of values.sort((a, b) => a - b)) {
    if (kept.length > 0 && isThin(kept[kept.length - 1], rim)) kept.pop();
    else kept.push(rim);
  }
  return kept;
}

/**
 * Rings near η = π/2 + 2πk take out most for their area: ∫ sin η dη (design floor). `count` of them that share a gain of
 * about one each span ±asin(1/(2·count)).
 */
function startRings(random: RandomSource, count: number, open: boolean, high: number) {
  const places = Math.max(1, Math.floor((high - Math.PI / 2) / (2 * Math.PI)) + 1);
  const chosen = new Set<number>();
  while (chosen.size < Math.min(count, places)) chosen.add(Math.floor(places * random.uniform() ** 2));
  while (chosen.size < count) chosen.add(chosen.size + places);
  const halfWidth = Math.asin(0.5 / count);
  const values: number[] = [];
  for (const place of [...chosen].sort((a, b) => a - b)) {
    const centre = Math.PI / 2 + 2 * Math.PI * place + 0.3 * random.normal();
    const width = halfWidth * (0.5 + random.uniform());
    values.push(centre - width, centre + width);
  }
  if (open) values.shift();
  return {
    values: values.map((value) => Math.min(Math.max(value, 2e-3), high)),
    spreads: values.map(() => 0.25),
  };
}
