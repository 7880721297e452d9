import { formatQuantity } from '../base/quantity.ts';
import type { DiffusionMedium } from '../optics/diffusion.ts';
import { DIFFUSING_DIAMETERS_M, DIFFUSION_TEMPERATURES_K } from '../optics/diffusion.ts';
import type { Particle } from '../optics/particle.ts';
import type { Placement } from '../reading/placement.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Report } from './briefReport.ts';

/** The keys of a `placement.spread` that is Brownian motion, as far as they were read. */
interface DiffusingEntry {
  'diffusing for'?: number;
  temperature?: number;
  viscosity?: number;
}

/** Fluids of the shelf whose viscosity is known. */
const FLUIDS = new Map<string, 'air' | 'water'>([
  ['air', 'air'],
  ['dry-air', 'air'],
  ['water', 'water'],
  ['water-25C', 'water'],
]);
/** As far as a plain spread may go. */
const LARGEST_SPREAD_M = 0.01;
const PATH = ['placement', 'spread'] as const;

/** The spread of a placement, from an entry without mistakes: metres, or Brownian motion. */
export function readSpread(
  entry: number | DiffusingEntry,
  mediumName: string,
): Pick<Placement, 'spreadM' | 'diffusion'> {
  if (typeof entry === 'number') return { spreadM: entry };
  const { 'diffusing for': durationS, temperature: temperatureK } = entry as Required<DiffusingEntry>;
  const medium = fluidOf(entry, mediumName) as DiffusionMedium;
  return { spreadM: 0, diffusion: { durationS, temperatureK, medium } };
}

/** Checks what Brownian motion asks of the medium and of the particles. */
export function checkSpread(
  entry: number | DiffusingEntry | undefined,
  mediumName: string | undefined,
  particles: readonly Particle[],
  report: Report,
): void {
  if (entry === undefined || typeof entry === 'number' || report.hasMistake(PATH)) return;
  if (mediumName === undefined) return;
  if (mediumName === 'vacuum') {
    report.refuse(PATH, 'a length such as 5 um, for nothing diffuses in a vacuum');
    return;
  }
  const medium = fluidOf(entry, mediumName);
  if (medium === null) {
    const known = [...FLUIDS.keys()].join(', ');
    const expected = `the viscosity of ${mediumName}, such as 1.2 mPa s (known here: ${known})`;
    report.refuse([...PATH, 'viscosity'], expected);
  } else if (entry.viscosity !== undefined && FLUIDS.has(mediumName)) {
    report.refuse([...PATH, 'viscosity'], `no viscosity for ${mediumName}, whose own is known`);
  } else if (isTemperatureKnown(entry, medium, mediumName, report)) {
    checkParticles(entry, mediumName, particles, report);
  }
}

function isTemperatureKnown(
  { temperature = 0 }: DiffusingEntry,
  medium: DiffusionMedium,
  mediumName: string,
  report: Report,
): boolean {
  const [coldest, hottest] = DIFFUSION_TEMPERATURES_K[typeof medium === 'string' ? medium : 'liquid'];
  if (temperature >= coldest && temperature <= hottest) return true;
  const range = `a temperature from ${coldest} K to ${hottest} K, where the viscosity of ${mediumName} is known`;
  report.refuse([...PATH, 'temperature'], range);
  return false;
}

function checkParticles(
  entry: DiffusingEntry,
  mediumName: string,
  particles: readonly Particle[],
  report: Report,
): void {
  if (particles.length === 0) return;
  const smallest = Math.min(...particles.map(({ diameterM }) => diameterM));
  const largest = Math.max(...particles.map(({ diameterM }) => diameterM));
  const inLength = (metres: number) => formatQuantity(metres, 'length', 3);
  const [least, most] = DIFFUSING_DIAMETERS_M;
  if (smallest < least || largest > most) {
    const found = `a particle of ${inLength(smallest < least ? smallest : largest)} that diffuses`;
    report.refuse(PATH, `diameters from ${inLength(least)} to ${inLength(most)} for that`, found);
    return;
  }
  const placement = { offsetM: 0, depthM: 0, crossing: null, ...readSpread(entry, mediumName) };
  const farthest = spreadOf(placement, smallest);
  if (farthest <= LARGEST_SPREAD_M) return;
  const found = `a spread of ${inLength(farthest)} for particles of ${inLength(smallest)}`;
  report.refuse(PATH, `a spread of at most ${inLength(LARGEST_SPREAD_M)}: a shorter time`, found);
}

/** What the particles diffuse in, null where its viscosity is neither known nor given. */
function fluidOf({ viscosity }: DiffusingEntry, mediumName: string): DiffusionMedium | null {
  return FLUIDS.get(mediumName) ?? (viscosity === undefined ? null : { viscosityPaS: viscosity });
}
