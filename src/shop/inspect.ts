import type { Corner } from './cornerRadii.ts';
import type { OutlineMeasures } from './measureOutline.ts';
import { measureOutline } from './measureOutline.ts';
import type { Width } from './narrowest.ts';
import type { ShopRules } from './shopRules.ts';
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

/**
 * Holds an outline against a shop's rules. Openings and webs that are too narrow, and islands that fall out, do not fit.
 * Corners always fit: the shop rounds them, the notes say by how much, and an opening or web too small to hold the
 * rounding is already refused for its width.
 *
 * @param elements each is a detector of its own, cut in a sheet of its own: widths are not measured from one to the next
 * @throws RimwrightError as `measureOutline`
 */
export function inspectOutline(
  elements: readonly { rings: readonly Float64Array[] }[],
  rules: ShopRules,
): ShopReport {
  const reports = elements.map(({ rings }) => inspectElement(measureOutline(rings), rules));
  if (reports.length === 1) return reports[0];
  const misfits = reports.map(({ misfit }) => misfit);
  const order = [...reports.keys()].sort((a, b) => Number(reports[a].fits) - Number(reports[b].fits));
  return {
    fits: reports.every(({ fits }) => fits),
    notes: order.flatMap((k) => reports[k].notes.map((note) => `element ${k + 1}: ${note}`)),
    misfit: Math.max(0, ...misfits),
  };
}

function inspectElement(measures: OutlineMeasures, rules: ShopRules): ShopReport {
  const { smallestOpening: opening, smallestWeb: web, islands, islandAt } = measures;
  const misfits: { note: string; misfit: number }[] = [];
  const holdWidth = (what: string, width: Width | null, leastM: number) => {
    if (width === null || width.widthM >= leastM * (1 - WIDTH_SLACK)) return;
    const measured = `the smallest ${what}, ${lengthText(width.widthM)} at ${placeText(width.at)},`;
    misfits.push({
      note: `${measured} is below the shop's ${lengthText(leastM)}`,
      misfit: 1 - width.widthM / leastM,
    });
  };
  if (opening === null) misfits.push({ note: 'there is nothing to cut', misfit: 1 });
  holdWidth('opening', opening, rules.smallestOpeningM);
  holdWidth('web', web, rules.smallestWebM);
  if (islandAt !== null && rules.islands === 'fall out') {
    const pieces =
      islands === 1
        ? `a piece of sheet around ${placeText(islandAt)} falls out: bridges are needed to hold it`
        : `${islands} pieces of sheet fall out, the largest around ${placeText(islandAt)}: bridges are needed to hold them`;
    misfits.push({ note: pieces, misfit: 1 });
  }

  const notes = misfits.map(({ note }) => note);
  if (misfits.length === 0 && opening !== null) {
    const webText = web === null ? 'no web' : `smallest web ${lengthText(web.widthM)}`;
    notes.push(
      `smallest opening ${lengthText(opening.widthM)}, ${webText}: within the rules of ${rules.name}`,
    );
  }
  notes.push(
    ...roundingNotes('inside', measures.tightestInsideCorner, rules.insideCornerRadiusM),
    ...roundingNotes('outside', measures.tightestOutsideCorner, rules.outsideCornerRadiusM),
  );
  return {
    fits: misfits.length === 0,
    notes,
    misfit: Math.max(0, ...misfits.map(({ misfit }) => misfit)),
  };
}

function roundingNotes(side: string, corner: Corner | null, shopRadiusM: number): string[] {
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
function lengthText(metres: number): string {
  const [factor, unit] = metres < 1e-3 ? [1e6, 'µm'] : [1e3, 'mm'];
  return `${Number((metres * factor).toPrecision(3))} ${unit}`;
}

/** To the micrometre. */
function placeText([x, y]: readonly [number, number]): string {
  const [xMm, yMm] = [x, y].map((metres) => (Math.round(metres * 1e6) / 1000 + 0).toFixed(3));
  return `(${xMm}, ${yMm}) mm`;
}
