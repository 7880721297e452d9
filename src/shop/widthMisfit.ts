import { layOut } from './boundary.ts';
import { narrowest } from './narrowest.ts';
import type { ShopRules } from './shopRules.ts';

/** How an outline repeats itself about the axis: see `Shape`. */
interface Repeats {
  folds: number;
  mirror: boolean;
}

/** Widths may fall this share short: a polygonised circle is that much narrower than the circle it stands for. */
export const WIDTH_SLACK = 1e-3;

/** Room beside a sector's ends, radians: for vertices that rounding puts on the other side. */
const ROOM = 1e-6;

/**
 * The misfit of `inspectOutline` alone, a hundred times quicker: widths are those between edges, nothing wider than the rules ask for is looked at, and of an n-fold
 * outline only one part from which the others follow. For searches; what is reported is inspected as a whole.
 *
 * @param elements rings as for `inspectOutline`
 * @returns 0 where the outline fits, else up to 1
 */
export function widthMisfit(
  elements: readonly { rings: readonly Float64Array[] }[],
  rules: ShopRules,
  repeats: Repeats,
): number {
  const limits = { openingM: least(rules.smallestOpeningM), webM: least(rules.smallestWebM) };
  const isFrom = oneOfAll(repeats);
  let misfit = 0;
  for (const { rings } of elements) {
    if (rings.length === 0) return 1;
    const boundary = layOut(rings);
    if (rules.islands === 'fall out' && boundary.rings.some(({ areaM2 }) => areaM2 < 0)) return 1;
    const { opening, web } = narrowest(boundary, { ...limits, isFrom });
    if (opening) misfit = Math.max(misfit, 1 - opening.widthM / rules.smallestOpeningM);
    if (web) misfit = Math.max(misfit, 1 - web.widthM / rules.smallestWebM);
  }
  return misfit;
}

function least(ruleM: number): number {
  return ruleM * (1 - WIDTH_SLACK);
}

/** Whether an edge is, in part, where the symmetry turns and mirrors it to from anywhere else. */
function oneOfAll({ folds, mirror }: Repeats): (ax: number, ay: number, bx: number, by: number) => boolean {
  if (folds === 1 && !mirror) return () => true;
  // Of circles about the axis any edge stands for all; a few are kept, for the roundness of the polygon.
  const span = (2 * Math.PI) / Math.min(folds, 16) / (mirror ? 2 : 1);
  const isWithin = (x: number, y: number) => {
    const azimuth = Math.atan2(y, x);
    return (azimuth < -ROOM ? azimuth + 2 * Math.PI : azimuth) <= span + ROOM;
  };
  return (ax, ay, bx, by) => isWithin(ax, ay) || isWithin(bx, by) || isWithin((ax + bx) / 2, (ay + by) / 2);
}
