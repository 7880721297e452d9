import { ringArea } from '../outline/area.ts';
import type { OutlineElement } from '../outline/shape.ts';
import { asCut } from './asCut.ts';
import { bridged } from './bridges.ts';
import type { ShopReport } from './inspect.ts';
import { inspectOutline, lengthText } from './inspect.ts';
import type { ShopRules } from './shopRules.ts';

/** What becomes of an outline at a shop. */
export interface Making {
  /** What goes to the shop: the outline, with bridges where islands would fall out. */
  drawn: readonly OutlineElement[];
  /** What comes back, and counts; `drawn` itself where the shop changes nothing, or leaves nothing of an element. */
  cut: readonly OutlineElement[];
  report: ShopReport;
}

/** A change of area below this share is not worth a word. */
const WORTH_SAYING = 1e-4;

/**
 * What a shop makes of an outline, and its word on it. Without a shop all fits and nothing changes.
 *
 * @throws RimwrightError `input` as `inspectOutline`
 */
export function making(elements: readonly OutlineElement[], rules: ShopRules | null): Making {
  if (rules === null) return { drawn: elements, cut: elements, report: { fits: true, notes: [], misfit: 0 } };
  const notes: string[] = [];
  const drawn = elements.map((element) => {
    const { rings, bridges, widthM } = bridged(element.rings, rules);
    if (bridges === 0) return element;
    notes.push(
      `${bridges} bridges, ${lengthText(widthM)} wide, are drawn in to hold what would fall out, and count in the scores`,
    );
    const { curves: _, ...rest } = element;
    return { ...rest, rings };
  });
  const report = inspectOutline(drawn, rules);
  const cut = asCut(drawn, rules);
  const isSame = cut.every(({ rings }, k) => rings === drawn[k].rings);
  if (isSame || cut.some(({ rings }) => rings.length === 0))
    return { drawn, cut: drawn, report: { ...report, notes: [...report.notes, ...notes] } };
  const share = areaOf(cut) / areaOf(drawn) - 1;
  if (Math.abs(share) > WORTH_SAYING)
    notes.push(
      `cutting changes the area by ${Number((100 * share).toPrecision(2))} %; scores are of the outline as cut`,
    );
  return { drawn, cut, report: { ...report, notes: [...report.notes, ...notes] } };
}

function areaOf(elements: readonly OutlineElement[]): number {
  return elements.reduce((sum, { rings }) => sum + rings.reduce((area, ring) => area + ringArea(ring), 0), 0);
}
