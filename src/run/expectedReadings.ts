import type { Particle } from '../optics/particle.ts';
import { ringsRadius } from '../outline/area.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { SEARCH_FINENESS } from '../score/fineness.ts';
import { Judge } from '../score/judge.ts';
import type { Task } from '../score/task.ts';
import type { GivenDesign } from './givenDesign.ts';

/** What a design reads of one particle over the brief's places and wavelengths, m². */
export interface ExpectedReading {
  /** In the brief's light at its nominal wavelength. */
  extinctionM2: number;
  meanM2: number;
  leastM2: number;
  mostM2: number;
}

/** Particles judged at a time: their tables share the memory. */
const AT_A_TIME = 32;

/** Expected readings of particles, sampled as a search does. The design and its distance must have passed `judgeOutline`. */
export function expectedReadings(
  task: Task,
  { elements }: GivenDesign,
  distanceM: number,
  particles: readonly Particle[],
  fields: Fields,
): ExpectedReading[] {
  return inGroups(particles).flatMap((some) => {
    const judge = new Judge(taskOf(task, elements, distanceM, some), SEARCH_FINENESS, fields);
    const { ratios } = judge.outlineRatios(elements, distanceM);
    const perParticle = ratios.length / some.length;
    return nominalExtinctions(judge, some.length).map((extinctionM2, p) =>
      summarised(ratios.slice(p * perParticle, (p + 1) * perParticle), extinctionM2),
    );
  });
}

/** The extinction of particles in the brief's light at its nominal wavelength, m²: quick, for nothing is read. */
export function expectedExtinctions(
  task: Task,
  { elements }: GivenDesign,
  distanceM: number,
  particles: readonly Particle[],
): number[] {
  return inGroups(particles).flatMap((some) =>
    nominalExtinctions(new Judge(taskOf(task, elements, distanceM, some), SEARCH_FINENESS), some.length),
  );
}

function inGroups(particles: readonly Particle[]): Particle[][] {
  const groups: Particle[][] = [];
  for (let first = 0; first < particles.length; first += AT_A_TIME)
    groups.push(particles.slice(first, first + AT_A_TIME));
  return groups;
}

function taskOf(
  task: Task,
  elements: GivenDesign['elements'],
  distanceM: number,
  particles: Particle[],
): Task {
  const radiusM = ringsRadius(elements.flatMap(({ rings }) => rings));
  return {
    ...task,
    particles,
    detector: { ...task.detector, distanceM: [distanceM, distanceM], radiusM: [radiusM, radiusM] },
  };
}

/** The nominal wavelength stands in the middle of the drift. */
function nominalExtinctions({ scenarios }: Judge, particles: number): number[] {
  const perParticle = scenarios.length / particles;
  return Array.from(
    { length: particles },
    (_, p) => scenarios[p * perParticle + Math.floor(perParticle / 2)].extinctionM2,
  );
}

function summarised(rows: readonly Float64Array[], extinctionM2: number): ExpectedReading {
  let [least, most, sum, count] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, 0, 0];
  for (const row of rows) {
    for (const ratio of row) {
      least = Math.min(least, ratio);
      most = Math.max(most, ratio);
      sum += ratio;
    }
    count += row.length;
  }
  const [meanM2, leastM2, mostM2] = [sum / count, least, most].map((ratio) => ratio * extinctionM2);
  return { extinctionM2, meanM2, leastM2, mostM2 };
}
