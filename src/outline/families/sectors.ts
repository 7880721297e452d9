import type { RandomSource } from '../../base/random.ts';
import type { Segment } from '../segment.ts';
import type { Loop, Shape } from '../shape.ts';
import type { Misdrawn, PhaseLimits, Variant } from './family.ts';

/** Least closed share of a fold between two sectors, and least share of an open one. */
const LEAST_SHARE = 0.01;
const LEAST_PHASE = 0.01;

/**
 * Open sectors of azimuth, n-fold. `sectors-hub` joins sectors of different outer radii about a small open hub;
 * `sectors-arc` leaves each sector a piece of its own, between an inner and an outer radius.
 */
export function sectorsVariants(limits: PhaseLimits): Variant[] {
  return [
    ...[2, 3, 4, 6, 8].map((folds) => hubVariant(folds, 1, limits)),
    ...[3, 5, 8].map((folds) => hubVariant(folds, 2, limits)),
    ...[2, 3, 5].map((folds) => arcVariant(folds, 1, limits)),
    ...[2, 3, 5].map((folds) => arcVariant(folds, 2, limits)),
  ];
}

function hubVariant(folds: number, count: number, limits: PhaseLimits): Variant {
  const parameters = [{ name: 'hub', low: LEAST_PHASE, high: limits.high }];
  for (let i = 1; i <= count; i++) {
    parameters.push({ name: `share ${i}`, low: LEAST_SHARE, high: 1 });
    parameters.push({ name: `rim ${i}`, low: LEAST_PHASE, high: limits.high });
  }
  return {
    family: 'sectors',
    id: `sectors-hub-${folds}-fold-${count}`,
    parameters,
    draw: (values, unitM) => drawHub(Array.from(values), folds, count, unitM),
    margins: (values) => Float64Array.of(spareShare(Array.from(values).filter((_, i) => i % 2 === 1))),
    fromProfile: (profile) => sectorsOf(profile, count),
    start(random) {
      const values = [0.05 + 0.2 * random.uniform()];
      const spreads = [0.1];
      for (let i = 0; i < count; i++) {
        values.push((0.3 + 0.4 * random.uniform()) / count, oddZone(random, limits));
        spreads.push(0.1, 0.5);
      }
      return { values, spreads };
    },
  };
}

/** Azimuths at which a profile is sampled to cut it into sectors. */
const PROFILE_SAMPLES = 200;

/** A hub and sectors that open as much azimuth as a falling profile does, cut at its largest steps. */
function sectorsOf(profile: (share: number) => number, count: number): number[] {
  const phases = Array.from({ length: PROFILE_SAMPLES }, (_, i) => profile((i + 0.5) / PROFILE_SAMPLES));
  const cuts = phases
    .map((phase, i) => ({ at: i + 1, step: phase - (phases[i + 1] ?? 0) }))
    .sort((p, q) => q.step - p.step)
    .slice(0, count)
    .map(({ at }) => at)
    .sort((p, q) => p - q);
  const last = cuts[count - 1];
  const rest = phases.slice(last).reduce((sum, phase) => sum + phase, 0) / (PROFILE_SAMPLES - last || 1);
  const values = [Math.max(2 * LEAST_PHASE, rest)];
  const room = 1 - (count + 1) * LEAST_SHARE;
  cuts.forEach((at, i) => {
    const from = cuts[i - 1] ?? 0;
    const mean = phases.slice(from, at).reduce((sum, phase) => sum + phase, 0) / (at - from);
    values.push(
      Math.max(2 * LEAST_SHARE, (room * (at - from)) / PROFILE_SAMPLES),
      Math.max(mean, 2 * LEAST_PHASE),
    );
  });
  return values;
}

function drawHub(values: number[], folds: number, count: number, unitM: number): Shape | Misdrawn {
  const shares = values.filter((_, i) => i % 2 === 1);
  const spare = spareShare(shares);
  if (spare < 0) return { misdrawnBy: -spare };
  const hub = Math.sqrt(values[0]) * unitM;
  const closed = spare / count + LEAST_SHARE;
  const fold = (2 * Math.PI) / folds;
  const segments: Segment[] = [];
  for (let n = 0; n < folds; n++) {
    // Half an open sector lies on either side of each fold's first azimuth, so that one sector a fold keeps the mirror.
    let angle = (n - shares[0] / 2) * fold;
    for (let i = 0; i < count; i++) {
      const rim = Math.sqrt(values[2 + 2 * i]) * unitM;
      const after = angle + shares[i] * fold;
      const next = after + closed * fold;
      segments.push(
        radial(hub, rim, angle),
        arc(rim, angle, after),
        radial(rim, hub, after),
        arc(hub, after, next),
      );
      angle = next;
    }
  }
  return { elements: [{ weight: 1, loops: [segments] }], folds, mirror: true };
}

function arcVariant(folds: number, count: number, limits: PhaseLimits): Variant {
  const parameters = [];
  for (let i = 1; i <= count; i++) {
    parameters.push({ name: `share ${i}`, low: LEAST_SHARE, high: 1 });
    parameters.push({ name: `inner ${i}`, low: LEAST_PHASE, high: limits.high });
    parameters.push({ name: `outer ${i}`, low: LEAST_PHASE, high: limits.high });
  }
  return {
    family: 'sectors',
    id: `sectors-arc-${folds}-fold-${count}`,
    parameters,
    draw: (values, unitM) => drawArcs(Array.from(values), folds, count, unitM),
    margins: (values) => arcMargins(Array.from(values)),
    start(random) {
      const values: number[] = [];
      const spreads: number[] = [];
      for (let i = 0; i < count; i++) {
        const outer = oddZone(random, limits);
        values.push(
          (0.5 + 0.4 * random.uniform()) / count,
          Math.max(outer - 1 - 2 * random.uniform(), 0.1),
          outer,
        );
        spreads.push(0.1, 0.3, 0.3);
      }
      return { values, spreads };
    },
  };
}

function drawArcs(values: number[], folds: number, count: number, unitM: number): Shape | Misdrawn {
  const least = Math.min(...arcMargins(values));
  if (least < 0) return { misdrawnBy: -least };
  const shares = values.filter((_, i) => i % 3 === 0);
  const closed = spareShare(shares) / count + LEAST_SHARE;
  const fold = (2 * Math.PI) / folds;
  const loops: Loop[] = [];
  for (let n = 0; n < folds; n++) {
    let angle = (n - shares[0] / 2) * fold;
    for (let i = 0; i < count; i++) {
      const [low, high] = [values[3 * i + 1], values[3 * i + 2]].sort((a, b) => a - b);
      const inner = Math.sqrt(low) * unitM;
      const outer = Math.sqrt(high) * unitM;
      const after = angle + shares[i] * fold;
      loops.push([
        radial(inner, outer, angle),
        arc(outer, angle, after),
        radial(outer, inner, after),
        arc(inner, after, angle),
      ]);
      angle = after + closed * fold;
    }
  }
  return { elements: [{ weight: 1, loops }], folds, mirror: true };
}

/** What is left of a fold when every sector and the least gap beside it have their share. */
function spareShare(shares: readonly number[]): number {
  return shares.reduce((left, share) => left - share - LEAST_SHARE, 1);
}

/** The spare share, and for every sector what its rims lie apart beyond the least. */
function arcMargins(values: readonly number[]): Float64Array {
  const margins = [spareShare(values.filter((_, i) => i % 3 === 0))];
  for (let i = 0; i < values.length; i += 3)
    margins.push(Math.abs(values[i + 2] - values[i + 1]) - LEAST_PHASE);
  return Float64Array.from(margins);
}

/** A phase near an odd multiple of π, mostly the first, where a rim counts twice. */
function oddZone(random: RandomSource, limits: PhaseLimits): number {
  const zone = Math.PI * (1 + 2 * Math.floor(3 * random.uniform() ** 3)) + 0.4 * random.normal();
  return Math.min(Math.max(zone, 0.5), limits.high);
}

function radial(from: number, to: number, angle: number): Segment {
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  return { kind: 'line', from: [from * cos, from * sin], to: [to * cos, to * sin] };
}

function arc(radius: number, from: number, to: number): Segment {
  return { kind: 'arc', centre: [0, 0], radius, from, to };
}
