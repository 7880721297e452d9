import type { IndexModel } from '../optics/indexModel.ts';
import type { Core, DiameterRange, Membership, Particle } from '../optics/particle.ts';
import { readAmplitudeCsv } from '../optics/readAmplitudeCsv.ts';
import { readCountsCsv } from '../optics/readCountsCsv.ts';
import type { SizeClass } from '../optics/sizeDistribution.ts';
import { logNormalSizes } from '../optics/sizeDistribution.ts';
import type { Path, Report } from './briefReport.ts';
import { readNamedFile } from './readNamedFile.ts';
import type { Named } from './shelfRules.ts';

/** One entry of the brief's `particles` as far as it was read. */
export interface ParticleEntry {
  /** Least and largest diameter, metres. */
  diameter?: [number, number];
  /** Log-normal by number, median in metres; or the name of a table of counts. */
  distribution?: { median?: number; gsd?: number } | string;
  count?: number;
  material?: Named<IndexModel>;
  index?: Named<IndexModel>;
  core?: { share?: number; material?: Named<IndexModel>; index?: Named<IndexModel> };
  /** The name of a table of amplitudes, and the extinction that its computation gave, m². */
  amplitudes?: string;
  extinction?: number;
}

/** What `count` is where it is left out: of a range of diameters, and of a distribution. */
export const COUNT_OF_RANGE = 3;
export const COUNT_OF_DISTRIBUTION = 9;

/**
 * The particles of one entry: as many as `count` says, evenly in the logarithm of the diameter, or those that stand for a
 * distribution. None where it has a mistake.
 *
 * @param folder where its files are looked for
 */
export function readParticles(entry: ParticleEntry, path: Path, report: Report, folder: string): Particle[] {
  if (report.hasMistake(path)) return [];
  if (entry.amplitudes !== undefined) return readTabled(entry, entry.amplitudes, path, report, folder);
  if (entry.extinction !== undefined) {
    report.refuse([...path, 'extinction'], 'the extinction of a table of amplitudes alone');
  }
  const named = readNamed(entry, path, report);
  const core = entry.core && readNamed(entry.core, [...path, 'core'], report);
  const sizes = readSizes(entry, path, report, folder);
  if (named === undefined || report.hasMistake(path)) return [];
  const inside: Core | undefined = core && { share: entry.core?.share ?? Number.NaN, index: core.item };
  const of = Number(path.at(-1));
  const range = rangeOf(sizes, of);
  return sizes.map(({ diameterM, share }) => ({
    diameterM,
    index: named.item,
    material: core === undefined ? named.name : `${core.name} in a shell of ${named.name}`,
    ...(inside && { core: inside }),
    ...(entry.distribution !== undefined && { population: { of, share } satisfies Membership }),
    ...(range && { range }),
  }));
}

/** What lies between the smallest and the largest; null for a single diameter. */
function rangeOf(sizes: readonly SizeClass[], of: number): DiameterRange | null {
  const diameters = sizes.map(({ diameterM }) => diameterM);
  const [leastM, largestM] = [Math.min(...diameters), Math.max(...diameters)];
  return leastM < largestM ? { of, leastM, largestM } : null;
}

/** The material or index, of which there must be one. */
function readNamed(
  { material, index }: Pick<ParticleEntry, 'material' | 'index'>,
  path: Path,
  report: Report,
): Named<IndexModel> | undefined {
  if (material !== undefined && index !== undefined) {
    report.refuse([...path, 'index'], 'one of the two', 'a material and an index');
  }
  if (material === undefined && index === undefined) {
    report.refuse(path, 'one of the two', 'neither a material nor an index');
  }
  return material ?? index;
}

function readSizes(entry: ParticleEntry, path: Path, report: Report, folder: string): SizeClass[] {
  const { diameter, distribution } = entry;
  if (diameter !== undefined && distribution !== undefined) {
    report.refuse([...path, 'distribution'], 'one of the two', 'a diameter and a distribution');
    return [];
  }
  if (typeof distribution === 'string') {
    if (entry.count !== undefined) {
      report.refuse([...path, 'count'], "no count: the table's rows are the diameters");
    }
    return readNamedFile(distribution, [...path, 'distribution'], report, folder, readCountsCsv) ?? [];
  }
  if (distribution !== undefined) {
    const { median, gsd } = distribution;
    if (entry.count === undefined) report.noteDefault([...path, 'count'], COUNT_OF_DISTRIBUTION);
    const count = entry.count ?? COUNT_OF_DISTRIBUTION;
    if (count < 2) report.refuse([...path, 'count'], '2 or more for a distribution');
    return median === undefined || gsd === undefined ? [] : logNormalSizes(median, gsd, count);
  }
  if (diameter === undefined) {
    report.refuse([...path, 'diameter'], 'a length with its unit, such as 1 um to 4 um, or a distribution');
    return [];
  }
  const count = countOf(entry.count, diameter, path, report);
  return logarithmicSteps(diameter, count).map((diameterM) => ({ diameterM, share: 1 / count }));
}

function readTabled(
  entry: ParticleEntry,
  name: string,
  path: Path,
  report: Report,
  folder: string,
): Particle[] {
  for (const key of ['material', 'index', 'core', 'distribution', 'count'] as const) {
    if (entry[key] !== undefined) {
      report.refuse([...path, key], `no ${key} beside amplitudes, which are those of one particle`);
    }
  }
  if (entry.extinction === undefined) {
    const expected = 'the extinction that the amplitudes were computed with, such as 12.3 um^2';
    report.refuse([...path, 'extinction'], expected);
  }
  const { diameter } = entry;
  if (diameter === undefined || diameter[0] < diameter[1]) {
    report.refuse([...path, 'diameter'], 'one diameter, that of a sphere as large as the particle');
    return [];
  }
  const table = readNamedFile(name, [...path, 'amplitudes'], report, folder, readAmplitudeCsv);
  if (table === undefined || report.hasMistake(path)) return [];
  return [{ diameterM: diameter[0], material: name, amplitudes: table }];
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
