import type { IndexModel } from '../optics/indexModel.ts';
import type { Particle } from '../optics/particle.ts';
import type { Path, Report } from './briefReport.ts';
import type { Named } from './shelfRules.ts';

/** One entry of the brief's `particles` as far as it was read. */
export interface ParticleEntry {
  /** Least and largest diameter, metres. */
  diameter?: [number, number];
  count?: number;
  material?: Named<IndexModel>;
  index?: Named<IndexModel>;
}

const COUNT_OF_RANGE = 3;

/** The spheres of one entry: as many as `count` says, evenly in the logarithm of the diameter. None where it has a mistake. */
export function readParticles(entry: ParticleEntry, path: Path, report: Report): Particle[] {
  const { diameter, material, index } = entry;
  if (report.hasMistake(path) || diameter === undefined) return [];
  if (material !== undefined && index !== undefined) {
    report.refuse([...path, 'index'], 'one of the two', 'a material and an index');
  }
  const named = material ?? index;
  if (named === undefined) {
    report.refuse(path, 'one of the two', 'neither a material nor an index');
    return [];
  }
  const count = countOf(entry.count, diameter, path, report);
  return logarithmicSteps(diameter, count).map((diameterM) => ({
    diameterM,
    index: named.item,
    material: named.name,
  }));
}

function countOf(
  given: number | undefined,
  [least, largest]: [number, number],
  path: Path,
  report: Report,
): number {
  const isRange = least < largest;
  if (given === undefined) {
    const count = isRange ? COUNT_OF_RANGE : 1;
    report.noteDefault([...path, 'count'], count);
    return count;
  }
  if (isRange && given === 1) report.refuse([...path, 'count'], '2 or more for a range of diameters');
  if (!isRange && given > 1) report.refuse([...path, 'count'], '1 for a single diameter');
  return given;
}

/** `count` values from `least` to `largest`, each the same factor above the one before: 1, 2, 4. */
function logarithmicSteps([least, largest]: [number, number], count: number): number[] {
  return Array.from({ length: count }, (_, i) => {
    const share = count === 1 ? 0 : i / (count - 1);
    // Fifteen digits, so that the middle of 1 and 4 is 2 and not 2.0000000000000004.
    return Number((least * (largest / least) ** share).toPrecision(15));
  });
}
