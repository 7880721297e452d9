import type { RandomSource } from '../../base/random.ts';
import { ringLoop, THINNEST_M } from '../ring.ts';
import type { Segment } from '../segment.ts';
import type { Loop, Shape, ShapeElement } from '../shape.ts';
import type { Misdrawn, PhaseLimits, Variant } from './family.ts';

/** Elements lie at least so far apart whatever the brief says: on the files' grid of 1 nm nearer ones could touch. */
const LEAST_GAP_M = 1e-7;

/** Inner and outer radius of an annulus, metres; a disc from 0. */
type Annulus = readonly [innerM: number, outerM: number];

/**
 * Concentric elements with a weight each. `rings-weighted-n`: a disc and annuli that follow each other with the least gap, as
 * Fresnel zones do. `rings-weighted-apart-n`: annuli anywhere. `rings-weighted-sectors-f-fold`: a disc, and two annuli of which each is
 * cut into two elements of f sectors.
 */
export function weightedRingsVariants(limits: PhaseLimits): Variant[] {
  return [
    ...[2, 4].map((count) => zonesVariant(count, limits)),
    apartVariant(3, limits),
    sectorsVariant(3, limits),
  ];
}

function zonesVariant(count: number, limits: PhaseLimits): Variant {
  return {
    family: 'rings',
    id: `rings-weighted-${count}`,
    weighted: true,
    parameters: rims(count, limits),
    draw(values, unitM) {
      const radii = [0, ...radiiOf(values, unitM)];
      const annuli = radii.slice(1).map((outer, i): Annulus => [radii[i], outer]);
      return round(keptApart(annuli, limits.gapM).map((one) => ({ weight: 1, loops: annulusLoops(one) })));
    },
    start: (random) => startZones(random, count, limits),
  };
}

function apartVariant(count: number, limits: PhaseLimits): Variant {
  return {
    family: 'rings',
    id: `rings-weighted-apart-${count}`,
    weighted: true,
    parameters: rims(2 * count, limits),
    draw(values, unitM) {
      const radii = radiiOf(values, unitM);
      const annuli = Array.from({ length: count }, (_, i): Annulus => [radii[2 * i], radii[2 * i + 1]]);
      return round(keptApart(annuli, limits.gapM).map((one) => ({ weight: 1, loops: annulusLoops(one) })));
    },
    start(random) {
      // Half waves that take out and that add come in turn, at η = π/2 + kπ.
      const first = Math.floor(2 * random.uniform());
      const values = Array.from({ length: count }, (_, i) => {
        const middle = Math.PI * (0.5 + first + i) + 0.3 * random.normal();
        const half = 0.3 + 0.8 * random.uniform();
        return [middle - half, middle + half];
      }).flat();
      return started(values, limits);
    },
  };
}

function sectorsVariant(folds: number, limits: PhaseLimits): Variant {
  return {
    family: 'rings',
    id: `rings-weighted-sectors-${folds}-fold`,
    weighted: true,
    parameters: [...rims(3, limits), { name: 'share', low: 0.1, high: 0.9 }],
    draw(values, unitM) {
      const radii = [0, ...radiiOf(Array.from(values).slice(0, 3), unitM)];
      const annuli = radii.slice(1).map((outer, i): Annulus => [radii[i], outer]);
      const gapM = Math.max(LEAST_GAP_M, limits.gapM ?? 0);
      const elements = keptApart(annuli, limits.gapM).flatMap((one) => {
        if (one[0] === 0) return [{ weight: 1, loops: annulusLoops(one) }];
        return sectorsOf(one, folds, values[3], gapM).map((loops) => ({ weight: 1, loops }));
      });
      const drawn = round(elements);
      return 'elements' in drawn ? { ...drawn, folds } : drawn;
    },
    start(random) {
      const { values, spreads } = startZones(random, 3, limits);
      return { values: [...values, 0.35 + 0.3 * random.uniform()], spreads: [...spreads, 0.1] };
    },
  };
}

function rims(count: number, limits: PhaseLimits) {
  return Array.from({ length: count }, (_, i) => ({ name: `rim ${i + 1}`, low: 1e-3, high: limits.high }));
}

function startZones(random: RandomSource, count: number, limits: PhaseLimits) {
  // Zones of half a wave, all a little wider or narrower, and each by itself.
  const zone = Math.PI * (0.8 + 0.4 * random.uniform());
  return started(
    Array.from({ length: count }, (_, i) => zone * (i + 1) + 0.3 * random.normal()),
    limits,
  );
}

function started(values: readonly number[], { high }: PhaseLimits) {
  return {
    values: values.map((value) => Math.min(Math.max(value, 2e-3), high)),
    spreads: values.map(() => 0.25),
  };
}

/** Ascending radii of rims in any order. */
function radiiOf(values: ArrayLike<number>, unitM: number): number[] {
  return Array.from(values, (value) => Math.sqrt(value) * unitM).sort((a, b) => a - b);
}

/** Neighbours nearer than the gap draw back from the middle between them; what is too thin after that is left out. */
function keptApart(annuli: readonly Annulus[], gapM = 0): Annulus[] {
  const half = Math.max(LEAST_GAP_M, gapM) / 2;
  return annuli
    .map(([inner, outer], i): Annulus => {
      const before = annuli[i - 1]?.[1];
      const after = annuli[i + 1]?.[0];
      return [
        before === undefined ? inner : Math.max(inner, (before + inner) / 2 + half),
        after === undefined ? outer : Math.min(outer, (outer + after) / 2 - half),
      ];
    })
    .filter(([inner, outer]) => outer - inner >= THINNEST_M);
}

function annulusLoops([innerM, outerM]: Annulus): Loop[] {
  return innerM > 0 ? [ringLoop(outerM, 1), ringLoop(innerM, -1)] : [ringLoop(outerM, 1)];
}

function round(elements: ShapeElement[]): Shape | Misdrawn {
  if (elements.length === 0) return { misdrawnBy: 1 };
  return { elements, folds: Number.POSITIVE_INFINITY, mirror: true, freeWeights: true };
}

/** An annulus cut into sectors about the azimuths 2πn/folds that span `share` of it, and those between; gaps of even width. */
function sectorsOf([innerM, outerM]: Annulus, folds: number, share: number, gapM: number): Loop[][] {
  const fold = (2 * Math.PI) / folds;
  const half = (share * fold) / 2;
  const spans = [
    [-half, half],
    [half, fold - half],
  ];
  return spans.flatMap(([from, to]) => {
    const back = (radius: number) => Math.asin(Math.min(1, gapM / 2 / radius));
    const [inner, outer] = [back(innerM), back(outerM)];
    if (to - from - 2 * inner < 2 * outer) return [];
    return [
      Array.from({ length: folds }, (_, n): Segment[] => {
        const at = n * fold;
        const [start, end] = [at + from, at + to];
        return [
          arc(outerM, start + outer, end - outer),
          line(outerM, end - outer, innerM, end - inner),
          arc(innerM, end - inner, start + inner),
          line(innerM, start + inner, outerM, start + outer),
        ];
      }),
    ];
  });
}

function arc(radius: number, from: number, to: number): Segment {
  return { kind: 'arc', centre: [0, 0], radius, from, to };
}

function line(fromM: number, fromAngle: number, toM: number, toAngle: number): Segment {
  return {
    kind: 'line',
    from: [fromM * Math.cos(fromAngle), fromM * Math.sin(fromAngle)],
    to: [toM * Math.cos(toAngle), toM * Math.sin(toAngle)],
  };
}
