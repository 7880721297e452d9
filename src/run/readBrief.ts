import { basename, dirname, extname } from 'node:path';
import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import { loadUnits } from '../base/quantity.ts';
import { parseYaml } from '../base/yamlFile.ts';
import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import type { Particle } from '../optics/particle.ts';
import type { Brief } from './brief.ts';
import type { BriefValues } from './briefChecks.ts';
import { checkTogether } from './briefChecks.ts';
import type { Report } from './briefReport.ts';
import { openReport } from './briefReport.ts';
import { briefSchema } from './briefSchema.ts';
import { checkReach } from './checkTables.ts';
import { readMapping } from './readMapping.ts';
import { readSpread } from './readSpread.ts';
import { fillTolerances } from './readTolerances.ts';

/**
 * Reads a brief and checks it as a whole. Keys, limits and defaults are those of `briefSchema`.
 *
 * @param text YAML, at most 1 MB
 * @param file its name, for messages and for a brief without a title
 * @param presets the folder of the shelf
 * @param folder where files that the brief names are looked for
 * @throws RimwrightError `input` with one problem for each mistake, in the order of the lines (at most 50); `machine`
 *   where the shelf cannot be read
 */
export async function readBrief(
  text: string,
  file: string,
  presets = presetsFolder(),
  folder = dirname(file),
): Promise<Brief> {
  const source = parseYaml(text, file);
  const report = openReport(source);
  const schema = briefSchema(await loadUnits(), presets, basename(file, extname(file)));
  const values = readMapping(source.value, [], schema, report);
  const entries = checkTogether(values, report, folder);
  throwMistakes(report, source.file);
  const brief = fillBrief(values, entries.flat(), report.defaults);
  checkReach(brief.task, entries, report);
  throwMistakes(report, source.file);
  return brief;
}

/** Those of files that the brief names come after its own. */
function throwMistakes({ problems }: Report, file: string): void {
  if (problems.length === 0) return;
  const place = (problem: Problem) => (problem.file === file ? 0 : 1e9) + (problem.line ?? 0);
  throw inputError(problems.toSorted((a, b) => place(a) - place(b)));
}

/** Turns the values of a brief without mistakes, in which every key has its value, into what the program works with. */
function fillBrief(values: BriefValues, particles: Particle[], defaults: readonly string[]): Brief {
  const { title, medium, shop, families, ...sections } = filled(values);
  const light = filled(sections.light);
  const placement = filled(sections.placement);
  const detector = filled(sections.detector);
  const target = filled(sections.target);
  const known = filled(sections.uncertainties);
  const isOfUncertainties = (line: string) => line.startsWith('uncertainties.');
  const isOfTolerances = (line: string) => line.startsWith('tolerances.');
  const crossing = placement.crossing === null ? null : filled(placement.crossing);
  return {
    title,
    task: {
      light: {
        wavelengthM: light.wavelength,
        linewidthM: light.linewidth,
        shape: light.shape,
        also: (light.also ?? []).map(filled).map(({ wavelength, linewidth, share }) => ({
          wavelengthM: wavelength,
          linewidthM: linewidth,
          share,
        })),
        driftM: light.drift,
        polarizationRad: light.polarization,
        sourceAngleRad: light.sourceAngle,
        ...(typeof light.beam !== 'string' && { beam: beamOf(filled(light.beam)) }),
        irradianceWm2: light.irradiance,
        intensityNoisePerHz: light.intensityNoise === null ? 0 : 10 ** (light.intensityNoise / 10),
      },
      medium: medium.item,
      particles,
      placement: {
        offsetM: placement.offset,
        depthM: placement.depth,
        ...readSpread(placement.spread, medium.name),
        crossing: crossing && { spanM: crossing.span, headingRad: crossing.heading },
      },
      detector: {
        distanceM: detector.distance,
        radiusM: detector.radius,
        responsivityAW: detector.responsivity,
        noiseCurrentA: detector.noiseCurrent,
        elements: detector.elements,
        gapM: detector.gap,
        balanced: detector.balanced,
        commonModeLeak: leakOf(detector.commonModeRejection),
      },
      target: {
        correction: target.correction,
        gain: target.gain,
        lobe: target.lobe,
        timeS: target.time,
      },
      shop: shop === null ? null : shop.item,
    },
    families,
    tolerances: fillTolerances(filled(sections.tolerances)),
    search: filled(sections.search),
    mediumName: medium.name,
    shopName: shop === null ? 'none' : shop.name,
    uncertainties: {
      averagingS: known.averaging,
      irradiance: known.irradiance,
      responsivity: known.responsivity,
      gain: known.gain,
      lightDrift: known.lightDrift,
      nonlinearity: known.nonlinearity,
      distanceM: known.distance,
      wavelengthM: known.wavelength,
    },
    uncertaintyDefaults: defaults.filter(isOfUncertainties),
    // Searches and readings do not ask for the built instrument's, nor for tolerances.
    defaults: defaults.filter((line) => !isOfUncertainties(line) && !isOfTolerances(line)),
    toleranceDefaults: defaults.filter(isOfTolerances),
  };
}

/** The part of a current that differences keep, from the rejection of common ones in dB. */
function leakOf(rejectionDb: number | null): number {
  return rejectionDb === null ? 0 : 10 ** (-rejectionDb / 20);
}

function beamOf({ waist, focus }: { waist: number; focus: number }): GaussianBeam {
  return { waistM: waist, focusM: focus };
}

function filled<T>(section: T): Required<T> {
  return section as Required<T>;
}
