import { insideRadius } from './asCut.ts';
import type { Corner } from './cornerRadii.ts';
import type { OutlineMeasures } from './measureOutline.ts';
import { measureOutline } from './measureOutline.ts';
import type { Width } from './narrowest.ts';
import type { Rings } from './offset.ts';
import type { Side } from './rolling.ts';
import { narrowPlaces, rolled } from './rolling.ts';
import type { ShopRules } from './shopRules.ts';
import { smallestWidth } from './smallestWidth.ts';
import { WIDTH_SLACK } from './widthMisfit.ts';

/** Whether a shop can cut an outline, and what it should know. */
export interface ShopReport {
  fits: boolean;
  /** Sentences for the user, without full stop; what does not fit comes first. */
  notes: string[];
  /**
   * The worst share by which a rule is missed, from 0 to 1: 1 − measured/required for openings and webs, 1 for islands
   * that fall out. 0 exactly when the outline fits.
   */
  misfit: number;
}

/** Places that a note names, the others it counts. */
const MOST_PLACES = 4;

/**
 * Holds an outline against a shop's rules. Openings and webs that are too narrow, and islands that fall out, do not fit.
 * Corners always fit: the shop rounds them, the notes say by how much, and an opening or web too small to hold the
 * rounding is already refused for its width.
 *
 * Widths are those of discs that can pass (see `smallestWidth`). Some ten milliseconds an element.
 *
 * @param elements each is a detector of its own, cut in a sheet of its own: widths are not measured from one to the next
 * @throws RimwrightError as `measureOutline`
 */
export function inspectOutline(elements: readonly { rings: Rings }[], rules: ShopRules): ShopReport {
  const reports = elements.map(({ rings }) => inspectElement(rings, rules));
  if (reports.length === 1) return reports[0];
  const misfits = reports.map(({ misfit }) => misfit);
  const order = [...reports.keys()].sort((a, b) => Number(reports[a].fits) - Number(reports[b].fits));
  return {
    fits: reports.every(({ fits }) => fits),
    notes: order.flatMap((k) => reports[k].notes.map((note) => `element ${k + 1}: ${note}`)),
    misfit: Math.max(0, ...misfits),
  };
}

function inspectElement(rings: Rings, rules: ShopRules): ShopReport {
  const quick = measureOutline(rings);
  const measures: OutlineMeasures = {
    ...quick,
    smallestOpening: smallestWidth(rings, 1, quick.smallestOpening, rules.smallestOpeningM),
    smallestWeb: smallestWidth(rings, -1, quick.smallestWeb, rules.smallestWebM),
  };
  const { smallestOpening: opening, smallestWeb: web } = measures;
  const troubles = troublesOf(measures, rules);
  const notes = troubles.map(({ note, side, leastM }) =>
    side === 0 ? note : note + stopsText(rings, side, leastM),
  );
  if (troubles.length === 0 && opening !== null) {
    const webText = web === null ? 'no web' : `smallest web ${lengthText(web.widthM)}`;
    notes.push(
      `smallest opening ${lengthText(opening.widthM)}, ${webText}: within the rules of ${rules.name}`,
    );
  }
  notes.push(
    ...roundingNotes('inside', measures.tightestInsideCorner, insideRadius(rules), opening),
    ...roundingNotes('outside', measures.tightestOutsideCorner, rules.outsideCornerRadiusM, web),
  );
  return {
    fits: troubles.length === 0,
    notes,
    misfit: Math.max(0, ...troubles.map(({ misfit }) => misfit)),
  };
}

/** What does not fit. `side` says where it is too narrow: 0 for other troubles. */
interface Trouble {
  note: string;
  misfit: number;
  side: Side | 0;
  leastM: number;
}

function troublesOf(measures: OutlineMeasures, rules: ShopRules): Trouble[] {
  const { smallestOpening, smallestWeb, islands, islandAt } = measures;
  const troubles: Trouble[] = [];
  const holdWidth = (side: Side, width: Width | null, leastM: number) => {
    if (width === null || width.widthM >= leastM * (1 - WIDTH_SLACK)) return;
    const what = side > 0 ? 'opening' : 'web';
    const measured = `the smallest ${what}, ${lengthText(width.widthM)} at ${placeText(width.at)},`;
    troubles.push({
      note: `${measured} is below the shop's ${lengthText(leastM)}`,
      misfit: 1 - width.widthM / leastM,
      side,
      leastM,
    });
  };
  if (smallestOpening === null)
    troubles.push({ note: 'there is nothing to cut', misfit: 1, side: 0, leastM: 0 });
  holdWidth(1, smallestOpening, rules.smallestOpeningM);
  holdWidth(-1, smallestWeb, rules.smallestWebM);
  if (islandAt !== null && rules.islands === 'fall out') {
    const pieces =
      islands === 1
        ? `a piece of sheet around ${placeText(islandAt)} falls out: bridges are needed to hold it`
        : `${islands} pieces of sheet fall out, the largest around ${placeText(islandAt)}: bridges are needed to hold them`;
    troubles.push({ note: pieces, misfit: 1, side: 0, leastM: 0 });
  }
  return troubles;
}

/** Where a disc of the least width is stopped, if that is at several places. */
function stopsText(rings: Rings, side: Side, leastM: number): string {
  const places = narrowPlaces(rings, rolled(rings, (leastM / 2) * (1 - WIDTH_SLACK), side), side);
  if (places.length < 2) return '';
  const more = places.length > MOST_PLACES ? ` and ${places.length - MOST_PLACES} more places` : '';
  return `; a disc of that width stops at ${places.slice(0, MOST_PLACES).map(placeText).join(', ')}${more}`;
}

/** In a slot narrower than its rounding a shop leaves ends as round as the slot is wide. */
function roundingNotes(
  side: string,
  corner: Corner | null,
  shopRadiusM: number,
  narrowest: Width | null,
): string[] {
  const isSlotEnd = narrowest !== null && corner !== null && corner.radiusM > 0.49 * narrowest.widthM;
  if (isSlotEnd) return [];
  if (corner === null || corner.radiusM >= shopRadiusM * (1 - WIDTH_SLACK)) return [];
  const rounded = `will be rounded to a radius of ${lengthText(shopRadiusM)}`;
  if (corner.radiusM > 0) {
    const drawn = `with a radius of ${lengthText(corner.radiusM)} at ${placeText(corner.at)}`;
    return [`the tightest ${side} corner, drawn ${drawn}, ${rounded}`];
  }
  // A circle of radius r in a corner that turns by τ stays r/cos(τ/2) − r away from its tip.
  const shortM = shopRadiusM / Math.cos(corner.turnRad / 2) - shopRadiusM;
  const drawn = `drawn sharp at ${placeText(corner.at)}`;
  return [`the tightest ${side} corner, ${drawn}, ${rounded}, up to ${lengthText(shortM)} off its tip`];
}

/** Three significant digits, in µm below a millimetre. */
export function lengthText(metres: number): string {
  const [factor, unit] = metres < 1e-3 ? [1e6, 'µm'] : [1e3, 'mm'];
  return `${Number((metres * factor).toPrecision(3))} ${unit}`;
}

/** To a tenth of a micrometre. */
export function placeText([x, y]: readonly [number, number]): string {
  const [xUm, yUm] = [x, y].map((metres) => (Math.round(metres * 1e7) / 10 + 0).toFixed(1));
  return `(${xUm}, ${yUm}) µm`;
}
