import type { OutlineElement } from '../outline/shape.ts';
import { plainDecimal } from './plainDecimal.ts';

/** Decimals of a coordinate in millimetres: a rounding of 5e-11 mm at most. */
const DECIMALS = 10;

/**
 * An outline as CSV, a point a line, in millimetres: one ring of weight 1 with the header `x_mm,y_mm`, several rings with the number of
 * the ring as well, several elements, or another weight, with the number of the element and its weight.
 */
export function outlineCsv(elements: readonly OutlineElement[]): string {
  const isWeighted = elements.length > 1 || elements[0].weight !== 1;
  const isPlain = !isWeighted && elements[0].rings.length === 1;
  const columns = isWeighted ? ',ring,element,weight' : isPlain ? '' : ',ring';
  let ringNumber = 0;
  const rows = elements.flatMap(({ weight, rings }, e) =>
    rings.flatMap((ring) => {
      ringNumber++;
      const rest = isWeighted ? `,${ringNumber},${e + 1},${weight}` : isPlain ? '' : `,${ringNumber}`;
      return Array.from({ length: ring.length / 2 }, (_, k) => {
        const [x, y] = [ring[2 * k], ring[2 * k + 1]].map((metres) => plainDecimal(1e3 * metres, DECIMALS));
        return `${x},${y}${rest}`;
      });
    }),
  );
  return `x_mm,y_mm${columns}\n${rows.join('\n')}\n`;
}
