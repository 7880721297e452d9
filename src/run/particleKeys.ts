import type { Units } from '../base/quantity.ts';
import { loadIndexModel } from '../optics/shelf.ts';
import { optional, required, valueOrSection } from './keyMakers.ts';
import { COUNT_OF_DISTRIBUTION, COUNT_OF_RANGE } from './readParticles.ts';
import { indexValue, shelfName } from './shelfRules.ts';
import { fileName, plainNumber, quantityRules, refused, wholeNumber } from './valueRules.ts';

/** Keys of one entry of `particles`. What they ask of each other is checked by `readParticles`. */
export function particleKeys(units: Units, presets: string) {
  const { quantity, quantityRange } = quantityRules(units);
  const materials = shelfName(
    'materials',
    (name) => loadIndexModel('materials', name, presets),
    'polystyrene',
  );
  const ownIndex = indexValue({ n: [0.05, 30], k: 30 });
  return {
    diameter: optional(
      'a diameter or a range of them; with amplitudes, that of a sphere as large',
      quantityRange('length', ['0.01 nm', '1 m'], '1 um to 4 um'),
    ),
    distribution: valueOrSection(
      optional(
        'sizes in place of a diameter: log-normal by number, or a table of counts',
        fileName('the keys median, gsd, or a table such as counts.csv', 'counts.csv'),
      ),
      '{ median: 2 um, gsd: 1.6 }',
      {
        median: required('median diameter by number', quantity('length', ['0.01 nm', '1 m'], '2 um')),
        gsd: required(
          'geometric standard deviation of the diameters',
          plainNumber(1.001, 5, 'a geometric standard deviation', 1.6),
        ),
      },
    ),
    count: optional(
      `how many diameters stand for the entry; ${COUNT_OF_RANGE} of a range, ${COUNT_OF_DISTRIBUTION} of a distribution if left out`,
      wholeNumber(1, 50, 3),
    ),
    material: optional('what they are made of: a name on the shelf', materials),
    index: optional('their index relative to vacuum, in place of a material', ownIndex),
    core: valueOrSection(
      optional(
        'a core of its own; material or index beside it are then the shell',
        refused('the keys share, material, index'),
      ),
      '{ share: 60 %, material: polystyrene }',
      {
        share: required(
          "the core's diameter over that of the particle",
          quantity('ratio', ['0.1 %', '99.99 %'], '60 %'),
        ),
        material: optional('what the core is made of: a name on the shelf', materials),
        index: optional("the core's index relative to vacuum, in place of a material", ownIndex),
      },
    ),
    amplitudes: optional(
      'a table of amplitudes from another computation, in place of a material',
      fileName('the path of a table, such as amplitudes.csv', 'amplitudes.csv'),
    ),
    extinction: optional(
      'extinction cross-section that the amplitudes were computed with',
      quantity('area', ['1e-12 um^2', '1 m^2'], '12.3 um^2'),
    ),
  };
}
