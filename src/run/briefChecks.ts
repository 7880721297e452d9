import { formatQuantity } from '../base/quantity.ts';
import { beamProblems } from '../optics/gaussianBeam.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { coversWavelength, refractiveIndex } from '../optics/indexModel.ts';
import { LINE_REACH } from '../optics/light.ts';
import type { Particle, Sphere } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import type { FamilyName } from '../outline/families/family.ts';
import { LEAST_SPLIT } from '../outline/families/splitter.ts';
import type { Path, Report } from './briefReport.ts';
import type { briefSchema } from './briefSchema.ts';
import { checkTable } from './checkTables.ts';
import type { Values } from './readMapping.ts';
import type { ParticleEntry } from './readParticles.ts';
import { readParticles } from './readParticles.ts';
import { checkSpread } from './readSpread.ts';

/** A brief as far as it could be read. */
export type BriefValues = Values<ReturnType<typeof briefSchema>>;

/** Size parameters for which spheres can be computed. */
const SIZE_PARAMETERS = [0.001, 20_000] as const;
const LEAST_CONTRAST = 1e-6;
const LARGEST_HALF_ANGLE = (80 * Math.PI) / 180;
/** A line's colours must stay within this part of its wavelength on either side. */
const LINE_WITHIN = 0.4;

const inLength = (metres: number) => formatQuantity(metres, 'length');

/** Checks that involve more than one key; they pass over what has a mistake already. Gives the particles of each entry. */
export function checkTogether(brief: BriefValues, report: Report, folder: string): Particle[][] {
  const entries = (brief.particles ?? []).map((entry, i) =>
    readParticles(entry, ['particles', i], report, folder),
  );
  checkLight(brief, report);
  checkFocus(brief, entries.flat(), report);
  checkGeometry(brief, Math.max(0, ...entries.flat().map(({ diameterM }) => diameterM)), report);
  checkIndices(brief, entries, report);
  checkLayouts(brief, report);
  checkSpread(brief.placement?.spread, brief.medium?.name, entries.flat(), report);
  return entries;
}

function checkLight({ light }: BriefValues, report: Report): void {
  if (light?.wavelength === undefined) return;
  const { shape = 'gaussian', drift = 0, also } = light;
  const parts = LINE_REACH[shape] / LINE_WITHIN;
  const part = shape === 'gaussian' ? 'a fifth of the wavelength' : `1/${parts} of the wavelength`;
  const lines = [{ line: light, path: ['light'] as Path }];
  also?.forEach((line, i) => {
    lines.push({ line, path: ['light', 'also', i] });
  });
  for (const { line, path } of lines) {
    const { wavelength, linewidth = 0 } = line;
    if (wavelength === undefined) continue;
    const limit = wavelength / parts;
    if (linewidth >= limit) report.refuse([...path, 'linewidth'], `less than ${part}, ${inLength(limit)}`);
  }
  const shortest = Math.min(...lines.map(({ line }) => line.wavelength ?? Infinity));
  if (drift >= shortest / 5) {
    const expected = `less than a fifth of the wavelength, ${inLength(shortest / 5)}`;
    report.refuse(['light', 'drift'], expected);
  }
  const shares = also?.reduce((sum, { share = 0 }) => sum + share, 0) ?? 0;
  if (shares > 1 - 1e-5) {
    const found = `shares of ${Number((100 * shares).toPrecision(7))} % together`;
    report.refuse(['light', 'also'], 'shares that leave at least 0.001 % to the main line', found);
  }
}

/** Families that draw several weighted elements, and those that draw nothing else. */
const LAYOUTS: readonly FamilyName[] = ['rings', 'grid', 'splitter'];
const LAYOUTS_ALONE: readonly FamilyName[] = ['grid', 'splitter'];

/** A search must have something to draw. */
function checkLayouts({ detector, families }: BriefValues, report: Report): void {
  if (detector === undefined || families === undefined) return;
  const { elements, balanced, distance } = detector;
  if (balanced && elements === 'one') {
    report.refuse(['detector', 'elements'], 'several, which balanced: true needs');
  } else if (balanced && !families.some((family) => LAYOUTS.includes(family))) {
    report.refuse(['families'], `at least one of ${LAYOUTS.join(', ')}, which balanced: true needs`);
  } else if (elements === 'one' && families.every((family) => LAYOUTS_ALONE.includes(family))) {
    report.refuse(
      ['families'],
      `one that draws single elements: ${LAYOUTS_ALONE.join(' and ')} draw several`,
    );
  } else if (
    distance !== undefined &&
    families.every((family) => family === 'splitter') &&
    distance[1] < LEAST_SPLIT * distance[0]
  ) {
    report.refuse(['families'], `more than splitter, or distances that are ${LEAST_SPLIT} times apart`);
  }
}

/** What a focused beam asks of the light and of the particles. */
function checkFocus({ light, medium }: BriefValues, particles: Particle[], report: Report): void {
  if (light?.beam === undefined || typeof light.beam === 'string') return;
  const { waist, focus = 0 } = light.beam;
  if (waist === undefined || light.wavelength === undefined || medium === undefined) return;
  const lines = [light, ...(light.also ?? [])].flatMap(({ wavelength }) => wavelength ?? []);
  if (!lines.every((line) => coversWavelength(medium.item, line))) return;
  const wavelength = Math.max(...lines.map((line) => line / refractiveIndex(medium.item, line)[0]));
  const radius = Math.max(0, ...particles.map(({ diameterM }) => diameterM / 2));
  for (const { key, expected } of beamProblems({ waistM: waist, focusM: focus }, wavelength, radius)) {
    report.refuse((key ?? '').split('.'), expected);
  }
}

/** Shortest, nominal and longest wavelength of a light without mistakes, metres. */
function wavelengthsOf(light: BriefValues['light'], report: Report): number[] | null {
  const wrong = ['linewidth', 'shape', 'also', 'drift'].some((name) => report.hasMistake(['light', name]));
  if (light?.wavelength === undefined || wrong) return null;
  const { shape = 'gaussian', drift = 0 } = light;
  const ends = [light, ...(light.also ?? [])].flatMap(({ wavelength = 0, linewidth = 0 }) => {
    const width = drift + LINE_REACH[shape] * linewidth;
    return [wavelength - width, wavelength + width];
  });
  return [Math.min(...ends), light.wavelength, Math.max(...ends)];
}

function checkGeometry({ detector, placement }: BriefValues, largestDiameterM: number, report: Report): void {
  if (detector?.distance === undefined) return;
  const depth = placement?.depth ?? 0;
  const [distance] = detector.distance;
  if (depth > distance / 2) {
    report.refuse(['placement', 'depth'], `at most half of the least distance, ${inLength(distance / 2)}`);
    return;
  }
  const nearest = distance - depth;
  if (nearest <= largestDiameterM) {
    const expected = `a distance that exceeds the largest particle's diameter, ${inLength(largestDiameterM)}`;
    report.refuse(['detector', 'distance'], expected);
    return;
  }
  const limit = nearest * Math.tan(LARGEST_HALF_ANGLE);
  if (detector.radius !== undefined && detector.radius[1] >= limit) {
    const place = `${inLength(nearest)} behind the particle`;
    const expected = `a radius below ${inLength(limit)}, a half-angle of 80 deg at ${place}`;
    report.refuse(['detector', 'radius'], expected);
  }
}

function checkIndices(
  { light, medium, particles }: BriefValues,
  entries: Particle[][],
  report: Report,
): void {
  const wavelengths = wavelengthsOf(light, report);
  if (medium === undefined || wavelengths === null) return;
  const isDefault = report.defaults.includes(`medium: ${medium.name}`);
  const mediumName = isDefault ? `${medium.name}, the default,` : medium.name;
  const isMediumKnown = checkCovered(mediumName, medium.item, wavelengths, ['medium'], report);
  entries.forEach(([particle], i) => {
    if (particle === undefined) return;
    const path = ['particles', i];
    if (isTabled(particle)) {
      const stated = particles?.[i].extinction;
      if (isMediumKnown && stated !== undefined) {
        checkTable(particle, stated, medium.item, wavelengths, path, report);
      }
      return;
    }
    const isKnown = checkKnown(particle, particles?.[i], wavelengths, path, report);
    if (!isKnown || !isMediumKnown) return;
    checkContrast(particle.index, medium.item, wavelengths, [...path, indexKey(particles?.[i])], report);
    const sizeKey = particles?.[i].distribution === undefined ? 'diameter' : 'distribution';
    checkSizes(entries[i], medium.item, wavelengths, [...path, sizeKey], report);
  });
}

const indexKey = (entry: Pick<ParticleEntry, 'material'> | undefined) =>
  entry?.material === undefined ? 'index' : 'material';

/** Whether the indices of a sphere and of its core are known in the brief's light. */
function checkKnown(
  { index, core }: Sphere,
  entry: ParticleEntry | undefined,
  wavelengths: number[],
  path: Path,
  report: Report,
): boolean {
  const check = (model: IndexModel, given: ParticleEntry | ParticleEntry['core'], inside: Path) => {
    const name = (given?.material ?? given?.index)?.name ?? '';
    return checkCovered(name, model, wavelengths, [...path, ...inside, indexKey(given)], report);
  };
  const isKnown = check(index, entry, []);
  return core === undefined ? isKnown : check(core.index, entry?.core, ['core']) && isKnown;
}

function checkCovered(
  name: string,
  model: IndexModel,
  wavelengths: number[],
  path: Path,
  report: Report,
): boolean {
  const [low, , high] = wavelengths;
  if (coversWavelength(model, low) && coversWavelength(model, high)) return true;
  const light = low === high ? inLength(low) : `${inLength(low)} to ${inLength(high)}`;
  const [least, largest] = model.rangeM.map(inLength);
  report.refuse(
    path,
    `light from ${least} to ${largest}, where its index is known`,
    `${name} in light of ${light}`,
  );
  return false;
}

function checkContrast(
  index: IndexModel,
  medium: IndexModel,
  wavelengths: number[],
  path: Path,
  report: Report,
): void {
  const isInvisible = wavelengths.some((wavelength) => {
    const [n, k] = refractiveIndex(index, wavelength);
    const [nMedium] = refractiveIndex(medium, wavelength);
    return Math.hypot(n / nMedium - 1, k / nMedium) <= LEAST_CONTRAST;
  });
  if (isInvisible) report.refuse(path, "an index that differs from the medium's by more than 1e-6");
}

function checkSizes(
  particles: Particle[],
  medium: IndexModel,
  wavelengths: number[],
  path: Path,
  report: Report,
): void {
  // Diameters whose size parameter is 1, at each wavelength.
  const units = wavelengths.map(
    (wavelength) => wavelength / (Math.PI * refractiveIndex(medium, wavelength)[0]),
  );
  const least = SIZE_PARAMETERS[0] * Math.max(...units);
  const largest = SIZE_PARAMETERS[1] * Math.min(...units);
  if (particles.every(({ diameterM }) => diameterM >= least && diameterM <= largest)) return;
  const range = `${inLength(least)} to ${inLength(largest)} in this light`;
  report.refuse(path, `diameters from ${range} (size parameter ${SIZE_PARAMETERS.join(' to ')})`);
}
