import { inputError } from '../base/errors.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Particle } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import type { OutlineElement } from '../outline/shape.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Judge } from '../score/judge.ts';

/** A particle as readings name it. */
export interface ReadParticle {
  diameter_m: number;
  /** Relative to vacuum, of the shell where there is a core; null where amplitudes were given in its place. */
  index: [n: number, k: number] | null;
  core?: { diameter_m: number; index: [n: number, k: number] };
  material: string;
}

/** What an outline reads of one particle, in one light, at one place. */
export interface Reading {
  particle: ReadParticle;
  /** In vacuum. */
  wavelength_m: number;
  distance_m: number;
  /** Of the particle, relative to the axis and to its nominal place along the beam. */
  position_m: [x: number, y: number, z: number];
  spread_m: number;
  /** In a focused beam: irradiance at the particle over that on the axis at the nominal place, which readings are relative to. */
  local_irradiance?: number;
  extinction_m2: number;
  reading_m2: number;
  /** reading/extinction − 1, without any gain. */
  correction: number;
}

/** What an outline reads of one particle, in one light, over all places. */
export interface ReadingSummary {
  /** At the first place: the axis, or the one place asked for. */
  first: Reading;
  /** reading/extinction over all places. */
  leastRatio: number;
  mostRatio: number;
  places: number;
}

/** Readings that are listed one by one: more fill the memory. */
const MOST_LISTED = 500_000;

/**
 * Every reading of an outline: particle by particle, for each its wavelengths, for each the depths (the nominal one
 * first), for each the positions (the axis first).
 *
 * @param positions flat [x0, y0, x1, y1, …], metres; without it the places that scores are taken over
 * @throws RimwrightError `input` where there are more than 500 000
 */
export function listReadings(
  judge: Judge,
  elements: readonly OutlineElement[],
  distanceM: number,
  positions?: Float64Array,
): Reading[] {
  const { positions: places, depths, ratios } = judge.outlineRatios(elements, distanceM, positions);
  const total = ratios.reduce((sum, { length }) => sum + length, 0);
  if (total > MOST_LISTED) {
    const expected = `at most ${MOST_LISTED}: ask for one place with --position`;
    throw inputError([{ key: 'readings', found: String(total), expected }]);
  }
  return ratios.flatMap((row, s) =>
    Array.from(row, (ratio, i) => readingAt(judge, s, ratio, distanceM, placeOf(places, depths, i))),
  );
}

/** As `listReadings`, summed up over all places: one summary for each particle and wavelength. */
export function summariseReadings(
  judge: Judge,
  elements: readonly OutlineElement[],
  distanceM: number,
  positions?: Float64Array,
): ReadingSummary[] {
  const { positions: places, depths, ratios } = judge.outlineRatios(elements, distanceM, positions);
  return ratios.map((row, s) => ({
    first: readingAt(judge, s, row[0], distanceM, placeOf(places, depths, 0)),
    leastRatio: row.reduce((least, ratio) => Math.min(least, ratio)),
    mostRatio: row.reduce((most, ratio) => Math.max(most, ratio)),
    places: row.length,
  }));
}

function placeOf(
  places: Float64Array,
  depths: readonly number[],
  i: number,
): [x: number, y: number, z: number] {
  const count = places.length / 2;
  const p = i % count;
  return [places[2 * p], places[2 * p + 1], depths[Math.floor(i / count)]];
}

function readingAt(
  judge: Judge,
  scenario: number,
  ratio: number,
  distanceM: number,
  place: [x: number, y: number, z: number],
): Reading {
  const { particle, wavelengthM, extinctionM2 } = judge.scenarios[scenario];
  return {
    particle: nameParticle(particle, wavelengthM),
    wavelength_m: wavelengthM,
    distance_m: distanceM,
    position_m: place,
    spread_m: spreadOf(judge.task.placement, particle.diameterM),
    ...(judge.task.light.beam && {
      local_irradiance: judge.localIrradiance(scenario, distanceM, place),
    }),
    extinction_m2: extinctionM2,
    reading_m2: ratio * extinctionM2,
    correction: ratio - 1,
  };
}

export function nameParticle(particle: Particle, wavelengthM: number): ReadParticle {
  const { diameterM, material } = particle;
  if (isTabled(particle)) return { diameter_m: diameterM, index: null, material };
  const { core } = particle;
  return {
    diameter_m: diameterM,
    index: refractiveIndex(particle.index, wavelengthM),
    ...(core && {
      core: { diameter_m: core.share * diameterM, index: refractiveIndex(core.index, wavelengthM) },
    }),
    material,
  };
}
