import type { Units } from '../base/quantity.ts';
import { withDefault } from './keyMakers.ts';
import { orNone, orWord, quantityRules } from './valueRules.ts';

/** Keys of `tolerances`. But for the shop's, defaults are our own estimates of a careful bench. */
export function toleranceKeys(units: Units) {
  const { quantity, tolerance } = quantityRules(units);
  return {
    edge: withDefault(
      'shop',
      'all edges of its openings moved outwards together; shop for what the shop keeps',
      orWord('shop', tolerance('length', '1 mm', '2 um')),
    ),
    kerf: withDefault(
      'shop',
      'width of the cut, which moves every edge by half of it; shop for a tenth of its kerf',
      orWord('shop', tolerance('length', '1 mm', '5 um')),
    ),
    place: withDefault('2 um rms', 'of the mask, along x and along y', tolerance('length', '10 mm', '2 um')),
    distance: withDefault('20 um', 'from the particle to the mask', tolerance('length', '1 m', '20 um')),
    tilt: withDefault(
      '0.2 deg rms',
      'of the mask, about x and about y',
      tolerance('angle', '20 deg', '0.2 deg'),
    ),
    wavelength: withDefault(
      '0.2 nm',
      'from one light source to the next',
      tolerance('length', '1 um', '0.2 nm'),
    ),
    index: withDefault(
      '0.002',
      'real part of the index of all particles',
      tolerance('ratio', '0.5', '0.002'),
    ),
    size: withDefault('1 % rms', "of all particles' diameters", tolerance('ratio', '50 %', '1 %')),
    averaging: withDefault(
      '1 s',
      'how long one measurement is averaged, for its noise; none for no noise',
      orNone(quantity('time', ['1 ns', '1e6 s'], '1 s')),
    ),
  };
}
