import type { YamlFields } from '../base/yamlFields.ts';
import { yamlFields } from '../base/yamlFields.ts';
import { parseYaml } from '../base/yamlFile.ts';
import type { IndexModel } from './indexModel.ts';

/** What a preset file of a medium or material says. */
export interface IndexPreset {
  title: string;
  /** Who measured it, or that a value is from memory. */
  source: string;
  /** What a user should know before trusting it. */
  notes: string;
  model: IndexModel;
}

const FORMULAS = ['constant', 'sellmeier', 'cauchy', 'ciddor', 'iapws-r9-97', 'tabulated'] as const;
const AIR_OR_VACUUM = ['vacuum', 'air'] as const;
const ZERO_CELSIUS_K = 273.15;

/**
 * Reads a preset: `title`, `source`, `notes`, `formula` and that formula's own keys, whose names carry their units.
 *
 * @param text the YAML file's content
 * @param file its name, for messages
 * @throws RimwrightError `input` with one problem for each key that is missing, unknown or impossible
 */
export function readIndexPreset(text: string, file: string): IndexPreset {
  const fields = yamlFields(parseYaml(text, file));
  const preset = {
    title: fields.text('title'),
    source: fields.text('source'),
    notes: fields.text('notes'),
    model: readModel(fields),
  };
  fields.finish();
  return preset;
}

function readModel(fields: YamlFields): IndexModel {
  const formula = fields.choice('formula', FORMULAS);
  switch (formula) {
    case 'constant':
      return {
        formula,
        rangeM: readRange(fields),
        n: fields.number('n', 0.01, 100),
        k: fields.number('k', 0, 100),
      };
    case 'sellmeier': {
      const b = fields.numbers('b', -1000, 1000);
      const cUm2 = fields.numbers('cUm2', 0, 1e6);
      expectLength(fields, 'cUm2', cUm2, b.length);
      return { formula, rangeM: readRange(fields), ...readConvention(fields), b, cUm2 };
    }
    case 'cauchy': {
      const a = fields.numbers('a', -1000, 1000);
      return { formula, rangeM: readRange(fields), ...readConvention(fields), a };
    }
    case 'ciddor':
      return {
        formula,
        rangeM: readRange(fields, 300, 1700),
        temperatureK: fields.number('temperatureC', -40, 100) + ZERO_CELSIUS_K,
        pressurePa: fields.number('pressurePa', 10e3, 140e3),
        relativeHumidity: fields.number('relativeHumidityPercent', 0, 100) / 100,
        co2Ppm: fields.number('co2Ppm', 0, 2000),
      };
    case 'iapws-r9-97':
      return {
        formula,
        rangeM: readRange(fields, 200, 1100),
        temperatureK: fields.number('temperatureC', -12, 500) + ZERO_CELSIUS_K,
        densityKgM3: fields.number('densityKgM3', 0, 1060),
      };
    case 'tabulated': {
      const nm = fields.numbers('wavelengthNm', 0.1, 1e9);
      const n = fields.numbers('n', 0.01, 100);
      const k = fields.numbers('k', 0, 100);
      if (nm.length < 2 || nm.some((w, i) => w <= nm[i - 1])) {
        fields.refuse('wavelengthNm', JSON.stringify(nm), 'two ascending wavelengths or more');
      }
      expectLength(fields, 'n', n, nm.length);
      expectLength(fields, 'k', k, nm.length);
      const wavelengthM = nm.map(inMetres);
      return { formula, rangeM: [wavelengthM[0], wavelengthM[nm.length - 1]], wavelengthM, n, k };
    }
  }
}

/** `rangeNm: [shortest, longest]`, vacuum wavelengths, within what the formula itself stands for. */
function readRange(fields: YamlFields, minNm = 0.1, maxNm = 1e9): [min: number, max: number] {
  const range = fields.numbers('rangeNm', minNm, maxNm);
  if (range.length !== 2 || range[0] >= range[1]) {
    fields.refuse('rangeNm', JSON.stringify(range), 'the shortest and the longest vacuum wavelength');
  }
  return [inMetres(range[0]), inMetres(range[1])];
}

function readConvention(fields: YamlFields) {
  return {
    wavelengthIn: fields.choice('wavelengthIn', AIR_OR_VACUUM),
    relativeTo: fields.choice('relativeTo', AIR_OR_VACUUM),
  };
}

function expectLength(fields: YamlFields, key: string, list: number[], length: number): void {
  // An empty list has been refused already.
  if (length > 0 && list.length !== length) fields.refuse(key, `${list.length} numbers`, `${length} numbers`);
}

/** Correctly rounded, so that 635 nm here is 6.35e-7 as everywhere else: a division by 1e9 is, a product with 1e-9 is not. */
function inMetres(nanometres: number): number {
  return nanometres / 1e9;
}
