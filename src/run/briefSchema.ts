import type { Units } from '../base/quantity.ts';
import { LINE_SHAPES } from '../optics/light.ts';
import { loadIndexModel } from '../optics/shelf.ts';
import { loadShop } from '../shop/shelf.ts';
import { FAMILY_NAMES } from './brief.ts';
import type {
  ListKey,
  NoneOrListKey,
  NoneOrSectionKey,
  SectionKey,
  ValueKey,
  ValueOrSectionKey,
} from './readMapping.ts';
import { indexOrShelfName, indexValue, shelfName } from './shelfRules.ts';
import type { ValueRule } from './valueRules.ts';
import {
  fileName,
  orNone,
  orWord,
  plainNumber,
  quantityRules,
  refused,
  textLine,
  trueOrFalse,
  wholeNumber,
  word,
  words,
} from './valueRules.ts';

/**
 * Every key of a brief: what it may hold, its limits, and its default. Defaults stand here and nowhere else, written as
 * a brief would write them.
 *
 * @param presets the folder of the shelf
 * @param title what a brief without a title is called
 */
export function briefSchema(units: Units, presets: string, title: string) {
  const { quantity, quantityRange } = quantityRules(units);
  const materials = shelfName(
    (name) => loadIndexModel('materials', name, presets),
    'the name of a material on the shelf, such as polystyrene',
  );
  const ownIndex = indexValue({ n: [0.05, 30], k: 30 });
  const media = shelfName(
    (name) => loadIndexModel('media', name, presets),
    'the name of a medium on the shelf, such as air, or an index such as 1.332',
  );
  const shops = shelfName(
    (name) => loadShop(name, presets),
    'the name of a shop on the shelf, such as photomask',
  );

  const wavelength = quantity('length', ['100 nm', '20 um'], '635 nm');
  const linewidth = quantity('length', ['0 nm', '4 um'], '1 nm');

  return {
    title: withDefault(title, textLine(200)),
    light: section({
      wavelength: required(wavelength),
      linewidth: withDefault('0 nm', linewidth),
      shape: withDefault('gaussian', word(LINE_SHAPES)),
      also: noneOrListOf(8, {
        wavelength: required(wavelength),
        share: required(quantity('ratio', ['0.001 %', '99.999 %'], '40 %')),
        linewidth: withDefault('0 nm', linewidth),
      }),
      drift: withDefault('0 nm', quantity('length', ['0 nm', '4 um'], '1 nm')),
      polarization: withDefault('none', orNone(quantity('angle', ['-360 deg', '360 deg'], '30 deg'))),
      sourceAngle: withDefault('0 mrad', quantity('angle', ['0 mrad', '100 mrad'], '2 mrad')),
      irradiance: withDefault('5 W/cm^2', quantity('irradiance', ['1e-9 W/cm^2', '1e12 W/cm^2'], '5 W/cm^2')),
      beam: valueOrSection(withDefault('flat', word(['flat'], 'flat, or the keys waist, focus')), {
        waist: required(quantity('length', ['0.1 um', '10 m'], '200 um')),
        focus: withDefault('0 mm', quantity('length', ['-10 m', '10 m'], '0 mm')),
      }),
      intensityNoise: withDefault('none', orNone(plainNumber(-300, 0, 'a number of dB/Hz'))),
    }),
    medium: withDefault('air', indexOrShelfName(indexValue({ n: [0.5, 5], k: 0 }), media)),
    particles: listOf(50, {
      diameter: optional(quantityRange('length', ['0.01 nm', '1 m'], '1 um to 4 um')),
      distribution: valueOrSection(
        optional(fileName('the keys median, gsd, or a table such as counts.csv')),
        {
          median: required(quantity('length', ['0.01 nm', '1 m'], '2 um')),
          gsd: required(plainNumber(1.001, 5, 'a geometric standard deviation')),
        },
      ),
      count: optional(wholeNumber(1, 50)),
      material: optional(materials),
      index: optional(ownIndex),
      core: valueOrSection(optional(refused('the keys share, material, index')), {
        share: required(quantity('ratio', ['0.1 %', '99.99 %'], '60 %')),
        material: optional(materials),
        index: optional(ownIndex),
      }),
      amplitudes: optional(fileName('the path of a table, such as amplitudes.csv')),
      extinction: optional(quantity('area', ['1e-12 um^2', '1 m^2'], '12.3 um^2')),
    }),
    placement: section({
      offset: withDefault('0 um', quantity('length', ['0 um', '10 mm'], '10 um')),
      depth: withDefault('0 mm', quantity('length', ['0 mm', '1 m'], '1 mm')),
      spread: valueOrSection(
        withDefault('0 um', quantity('length', ['0 um', '10 mm'], '5 um, or { diffusing for: 1 ms }')),
        {
          'diffusing for': required(quantity('time', ['1 ns', '1e6 s'], '1 ms')),
          temperature: withDefault('20 degC', quantity('temperature', ['1 K', '3000 K'], '20 degC')),
          viscosity: optional(quantity('viscosity', ['1e-7 Pa s', '1e4 Pa s'], '1.2 mPa s')),
        },
      ),
      crossing: noneOrSection({
        span: required(quantity('length', ['10 nm', '100 mm'], '400 um')),
        heading: withDefault('0 deg', quantity('angle', ['-360 deg', '360 deg'], '0 deg')),
      }),
    }),
    detector: section({
      distance: required(quantityRange('length', ['0.1 mm', '10 m'], '10 mm to 60 mm')),
      radius: required(quantityRange('length', ['1 um', '1 m'], '50 um to 2 mm')),
      responsivity: withDefault('0.42 A/W', quantity('responsivity', ['1e-6 A/W', '1e9 A/W'], '0.42 A/W')),
      noiseCurrent: withDefault('2 pA', quantity('current', ['0 pA', '1 A'], '2 pA')),
      elements: withDefault('several', word(['several', 'one'])),
      gap: withDefault('10 um', quantity('length', ['0 um', '10 mm'], '10 um')),
      balanced: withDefault(false, trueOrFalse()),
      commonModeRejection: withDefault('none', orNone(plainNumber(0, 300, 'a number of dB'))),
    }),
    target: section({
      correction: required(quantity('ratio', ['1e-7 %', '99.9 %'], '1 %')),
      gain: withDefault('one', word(['one', 'free'])),
      lobe: withDefault('none', orNone(quantity('ratio', ['0.0001 %', '10000 %'], '10 %'))),
      time: withDefault('none', orNone(quantity('time', ['1 ns', '1e6 s'], '1 ms'))),
    }),
    uncertainties: section({
      averaging: withDefault('1 ms', quantity('time', ['1 ns', '1e6 s'], '1 ms')),
      irradiance: withDefault('1 %', quantity('ratio', ['0 %', '50 %'], '1 %')),
      responsivity: withDefault('1 %', quantity('ratio', ['0 %', '50 %'], '1 %')),
      gain: withDefault('0 %', quantity('ratio', ['0 %', '50 %'], '0.5 %')),
      lightDrift: withDefault('0.0001 %', quantity('ratio', ['0 %', '50 %'], '0.0001 %')),
      nonlinearity: withDefault('0.1 %', quantity('ratio', ['0 %', '50 %'], '0.1 %')),
      distance: withDefault('20 um', quantity('length', ['0 um', '1 m'], '20 um')),
      wavelength: withDefault('0.1 nm', quantity('length', ['0 nm', '100 nm'], '0.1 nm')),
    }),
    shop: withDefault('none', orNone(shops)),
    families: withDefault([...FAMILY_NAMES], words(FAMILY_NAMES)),
    tolerances: section(toleranceKeys(units)),
    search: section({
      candidates: withDefault(20_000, wholeNumber(100, 100_000_000)),
      seed: withDefault(1, wholeNumber(0, 2 ** 31 - 1)),
    }),
  };
}

/** Keys of `tolerances`. But for the shop's, defaults are our own estimates of a careful bench. */
export function toleranceKeys(units: Units) {
  const { quantity, tolerance } = quantityRules(units);
  return {
    edge: withDefault('shop', orWord('shop', tolerance('length', '1 mm', '2 um'))),
    kerf: withDefault('shop', orWord('shop', tolerance('length', '1 mm', '5 um'))),
    place: withDefault('2 um rms', tolerance('length', '10 mm', '2 um')),
    distance: withDefault('20 um', tolerance('length', '1 m', '20 um')),
    tilt: withDefault('0.2 deg rms', tolerance('angle', '20 deg', '0.2 deg')),
    wavelength: withDefault('0.2 nm', tolerance('length', '1 um', '0.2 nm')),
    index: withDefault('0.002', tolerance('ratio', '0.5', '0.002')),
    size: withDefault('1 % rms', tolerance('ratio', '50 %', '1 %')),
    averaging: withDefault('1 s', orNone(quantity('time', ['1 ns', '1e6 s'], '1 s'))),
  };
}

const required = <T>(rule: ValueRule<T>): ValueKey<T> => ({ kind: 'value', rule, leftOut: 'refused' });
const optional = <T>(rule: ValueRule<T>): ValueKey<T> => ({ kind: 'value', rule, leftOut: 'allowed' });
const withDefault = <T>(use: unknown, rule: ValueRule<T>): ValueKey<T> => ({
  kind: 'value',
  rule,
  leftOut: { use },
});
const section = <K>(keys: K): SectionKey<K> => ({ kind: 'section', keys });
const noneOrSection = <K>(keys: K): NoneOrSectionKey<K> => ({ kind: 'none or section', keys });
const valueOrSection = <T, K>(value: ValueKey<T>, keys: K): ValueOrSectionKey<T, K> => ({
  kind: 'value or section',
  value,
  keys,
});
const listOf = <K>(longest: number, keys: K): ListKey<K> => ({ kind: 'list', keys, longest });
const noneOrListOf = <K>(longest: number, keys: K): NoneOrListKey<K> => ({
  kind: 'none or list',
  keys,
  longest,
});
