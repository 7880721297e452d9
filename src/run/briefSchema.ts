import type { Units } from '../base/quantity.ts';
import { LINE_SHAPES } from '../optics/light.ts';
import { loadIndexModel } from '../optics/shelf.ts';
import { loadShop } from '../shop/shelf.ts';
import { FAMILY_NAMES } from './brief.ts';
import {
  listOf,
  noneOrListOf,
  noneOrSection,
  optional,
  required,
  section,
  valueOrSection,
  withDefault,
} from './keyMakers.ts';
import { particleKeys } from './particleKeys.ts';
import { indexOrShelfName, indexValue, shelfName } from './shelfRules.ts';
import { toleranceKeys } from './toleranceKeys.ts';
import {
  orNone,
  plainNumber,
  quantityRules,
  textLine,
  trueOrFalse,
  wholeNumber,
  word,
  words,
} from './valueRules.ts';

/**
 * Every key of a brief: what it means, what it may hold, its limits, and its default. All of this stands here and nowhere
 * else: checks, help, the JSON Schema and written briefs are made of it. Defaults are written as a brief would write them.
 *
 * @param presets the folder of the shelf
 * @param title what a brief without a title is called; null where it has no file yet
 */
export function briefSchema(units: Units, presets: string, title: string | null) {
  const { quantity, quantityRange } = quantityRules(units);
  const media = shelfName(
    'media',
    (name) => loadIndexModel('media', name, presets),
    'air',
    ', or an index such as 1.332',
  );
  const shops = shelfName('shops', (name) => loadShop(name, presets), 'photomask');

  const wavelength = quantity('length', ['100 nm', '20 um'], '635 nm');
  const linewidth = quantity('length', ['0 nm', '4 um'], '1 nm');
  const titleRule = textLine(200);
  const titleAbout = "what the results folder and the report are called; the file's name if left out";

  return {
    title: title === null ? optional(titleAbout, titleRule) : withDefault(title, titleAbout, titleRule),
    light: section('the light that falls on the particle', {
      wavelength: required('wavelength in vacuum', wavelength),
      linewidth: withDefault('0 nm', 'full width of the line at half maximum', linewidth),
      shape: withDefault('gaussian', 'shape of the line and of further ones', word(LINE_SHAPES)),
      also: noneOrListOf(8, 'further lines of the same source', '{ wavelength: 650 nm, share: 40 % }', {
        wavelength: required('wavelength in vacuum', wavelength),
        share: required(
          'its part of all the light; the main line has the rest',
          quantity('ratio', ['0.001 %', '99.999 %'], '40 %'),
        ),
        linewidth: withDefault('0 nm', 'full width of this line at half maximum', linewidth),
      }),
      drift: withDefault(
        '0 nm',
        'every line may be off by this much, either way',
        quantity('length', ['0 nm', '4 um'], '1 nm'),
      ),
      polarization: withDefault(
        'none',
        'direction of the electric field from x; none for unpolarised light',
        orNone(quantity('angle', ['-360 deg', '360 deg'], '30 deg')),
      ),
      sourceAngle: withDefault(
        '0 mrad',
        'half-angle of a source that is not a point, seen from the particle',
        quantity('angle', ['0 mrad', '100 mrad'], '2 mrad'),
      ),
      irradiance: withDefault(
        '5 W/cm^2',
        'at the nominal place of the particle',
        quantity('irradiance', ['1e-9 W/cm^2', '1e12 W/cm^2'], '5 W/cm^2'),
      ),
      beam: valueOrSection(
        withDefault(
          'flat',
          'a flat wave, or a Gaussian beam by its waist and focus',
          word(['flat'], 'flat, or the keys waist, focus'),
        ),
        '{ waist: 200 um }',
        {
          waist: required(
            'radius at which the irradiance in the focus is 1/e² of that on the axis',
            quantity('length', ['0.1 um', '10 m'], '200 um'),
          ),
          focus: withDefault(
            '0 mm',
            "how far the focus is behind the particle's nominal place",
            quantity('length', ['-10 m', '10 m'], '0 mm'),
          ),
        },
      ),
      intensityNoise: withDefault(
        'none',
        'relative intensity noise of the source',
        orNone(plainNumber(-300, 0, 'a number of dB/Hz', -150)),
      ),
    }),
    medium: withDefault(
      'air',
      'what the particles are in: a name on the shelf, or a real index',
      indexOrShelfName(indexValue({ n: [0.5, 5], k: 0 }), media),
    ),
    particles: listOf(
      50,
      'the particles that must be read, one kind an entry',
      '{ diameter: 1 um to 4 um, material: polystyrene }',
      particleKeys(units, presets),
    ),
    placement: section('where the particle may be while it is measured', {
      offset: withDefault(
        '0 um',
        'anywhere within this distance of the axis',
        quantity('length', ['0 um', '10 mm'], '10 um'),
      ),
      depth: withDefault(
        '0 mm',
        'and this far before or behind its nominal place',
        quantity('length', ['0 mm', '1 m'], '1 mm'),
      ),
      spread: valueOrSection(
        withDefault(
          '0 um',
          'random motion during one measurement: rms along each axis, or by diffusion',
          quantity('length', ['0 um', '10 mm'], '5 um', ', or { diffusing for: 1 ms }'),
        ),
        '{ diffusing for: 1 ms }',
        {
          'diffusing for': required(
            'how long the particle diffuses',
            quantity('time', ['1 ns', '1e6 s'], '1 ms'),
          ),
          temperature: withDefault(
            '20 degC',
            'of the medium',
            quantity('temperature', ['1 K', '3000 K'], '20 degC'),
          ),
          viscosity: optional(
            'of a medium whose own is not known here',
            quantity('viscosity', ['1e-7 Pa s', '1e4 Pa s'], '1.2 mPa s'),
          ),
        },
      ),
      crossing: noneOrSection('a straight flight across the beam, over which the reading is averaged', {
        span: required(
          'length of the flight, half of it on either side',
          quantity('length', ['10 nm', '100 mm'], '400 um'),
        ),
        heading: withDefault(
          '0 deg',
          'direction of the flight from x',
          quantity('angle', ['-360 deg', '360 deg'], '0 deg'),
        ),
      }),
    }),
    detector: section('the detector and its amplifier', {
      distance: required(
        'from the particle to the mask: one distance, or a range to search',
        quantityRange('length', ['0.1 mm', '10 m'], '10 mm to 60 mm'),
      ),
      radius: required(
        'of the circle around the outline: one, or a range to search',
        quantityRange('length', ['1 um', '1 m'], '50 um to 2 mm'),
      ),
      responsivity: withDefault(
        '0.42 A/W',
        'current of the detector for the power on it',
        quantity('responsivity', ['1e-6 A/W', '1e9 A/W'], '0.42 A/W'),
      ),
      noiseCurrent: withDefault(
        '2 pA',
        'noise of the amplifier, per square root of hertz',
        quantity('current', ['0 pA', '1 A'], '2 pA'),
      ),
      elements: withDefault(
        'several',
        'whether a search may draw several weighted elements',
        word(['several', 'one']),
      ),
      gap: withDefault(
        '10 um',
        'least gap between elements in one plane',
        quantity('length', ['0 um', '10 mm'], '10 um'),
      ),
      balanced: withDefault(
        false,
        "whether weights must make the light's intensity noise cancel",
        trueOrFalse(),
      ),
      commonModeRejection: withDefault(
        'none',
        'how well the difference of two currents rejects what is common; none for perfectly',
        orNone(plainNumber(0, 300, 'a number of dB', 60)),
      ),
    }),
    target: section('what a design must reach', {
      correction: required(
        'how far the reading may be from the extinction, over all of the brief',
        quantity('ratio', ['1e-7 %', '99.9 %'], '1 %'),
      ),
      gain: withDefault(
        'one',
        'free: one factor for all particles may be calibrated away; one: none',
        word(['one', 'free']),
      ),
      lobe: withDefault(
        'none',
        "largest half-angle of the detector over that of diffraction's first dark ring",
        orNone(quantity('ratio', ['0.0001 %', '10000 %'], '10 %')),
      ),
      time: withDefault(
        'none',
        'longest time that one measurement may take',
        orNone(quantity('time', ['1 ns', '1e6 s'], '1 ms')),
      ),
    }),
    uncertainties: section('of the built instrument: what rimwright budget and evaluate count with', {
      averaging: withDefault(
        '1 ms',
        'of each of the two readings, without and with the particle',
        quantity('time', ['1 ns', '1e6 s'], '1 ms'),
      ),
      irradiance: withDefault(
        '1 %',
        'standard uncertainty over the value',
        quantity('ratio', ['0 %', '50 %'], '1 %'),
      ),
      responsivity: withDefault(
        '1 %',
        'standard uncertainty over the value',
        quantity('ratio', ['0 %', '50 %'], '1 %'),
      ),
      gain: withDefault(
        '0 %',
        'standard uncertainty over the value, where the gain is not calibrated',
        quantity('ratio', ['0 %', '50 %'], '0.5 %'),
      ),
      lightDrift: withDefault(
        '0.0001 %',
        'limits, either way, of the light between the two readings',
        quantity('ratio', ['0 %', '50 %'], '0.0001 %'),
      ),
      nonlinearity: withDefault(
        '0.1 %',
        'limits, either way, of the detector',
        quantity('ratio', ['0 %', '50 %'], '0.1 %'),
      ),
      distance: withDefault('20 um', 'standard uncertainty', quantity('length', ['0 um', '1 m'], '20 um')),
      wavelength: withDefault(
        '0.1 nm',
        'standard uncertainty',
        quantity('length', ['0 nm', '100 nm'], '0.1 nm'),
      ),
    }),
    shop: withDefault('none', 'who cuts the mask: a name on the shelf; none for no limits', orNone(shops)),
    families: withDefault([...FAMILY_NAMES], 'kinds of outlines to try', words(FAMILY_NAMES)),
    tolerances: section('how one build differs from the next, for rimwright yield', toleranceKeys(units)),
    search: section('how much a search tries', {
      candidates: withDefault(20_000, 'how many designs to try', wholeNumber(100, 100_000_000, 20_000)),
      seed: withDefault(1, 'the same seed finds the same designs', wholeNumber(0, 2 ** 31 - 1, 1)),
    }),
  };
}
