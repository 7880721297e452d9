import { formatQuantity } from '../base/quantity.ts';
import { FAMILY_NAMES } from '../outline/families/family.ts';
import type { Design } from '../score/design.ts';
import type { Task } from '../score/task.ts';
import { measureOutline } from '../shop/measureOutline.ts';
import type { ShopRules } from '../shop/shopRules.ts';
import type { Brief } from './brief.ts';
import { missesOf } from './ranking.ts';

/** A design lies at a limit from this share of it on, and up to this one: what is beyond it misses it. */
const AT_LIMIT = { from: 0.97, to: 1.005 };

/** The front still moves where the last quarter of a search brought more than this. A search may rest and move again. */
const STILL_MOVING = 0.02;

/** Another correction is worth a word where it makes a measurement at least this much shorter. */
const MUCH_FASTER = 0.9;

/**
 * What to change in a brief to get further: which of its limits the designs lie at, and what it keeps out. Each hint names a
 * key, and says no more than what was found.
 *
 * @param designs those that a search ended with, best first
 * @param movedInLastQuarter as `FrontHistory` says
 */
export function hintsFor(
  brief: Brief,
  designs: readonly Design[],
  movedInLastQuarter: number | null,
): string[] {
  const meeting = designs.filter((design) => missesOf(design, brief.task).length === 0);
  const shown = meeting.length > 0 ? meeting : designs;
  return [
    ...candidatesHints(brief, movedInLastQuarter),
    ...correctionHints(brief, designs, meeting),
    ...limitHints(brief, shown),
    ...placeHints(brief, shown),
    ...keptOutHints(brief),
  ];
}

function candidatesHints({ search }: Brief, moved: number | null): string[] {
  if (moved === null || moved <= STILL_MOVING) return [];
  return [
    `search.candidates: the front has not come to rest, more than ${search.candidates} may take it further`,
  ];
}

/** What a looser target would buy, by a design that was found. */
function correctionHints({ task }: Brief, designs: readonly Design[], meeting: readonly Design[]): string[] {
  if (meeting.length === 0) return [];
  const timeOf = ({ scores }: Design) => scores.snr.time_s;
  const fastest = Math.min(...meeting.map(timeOf));
  const looser = designs
    .filter((design) => timeOf(design) < MUCH_FASTER * fastest)
    .filter((design) => missesOf(design, task).every(({ limit }) => limit === 'target.correction'))
    .sort((a, b) => timeOf(a) - timeOf(b))[0];
  if (looser === undefined) return [];
  const factor = missesOf(looser, task)[0]?.factor ?? 1;
  const times = [timeOf(looser), fastest].map((time) => formatQuantity(time, 'time', 3));
  // Up to the next digit: what is said to be enough must be enough.
  const enough = Math.ceil(factor * task.target.correction * 1e4) / 1e4;
  return [
    `target.correction: ${formatQuantity(enough, 'ratio', 4)} would do with ${times[0]} in place of ${times[1]}`,
  ];
}

/** Limits that designs lie at. */
function limitHints({ task }: Brief, shown: readonly Design[]): string[] {
  return limitsOf(task).flatMap(({ key, limit, change, share }) => {
    const shares = shown.map(share);
    const count = shares.filter((used) => used >= AT_LIMIT.from && used <= AT_LIMIT.to).length;
    if (count === 0) return [];
    const lie = shown.length === 1 ? 'the design lies' : `${count} of ${shown.length} designs lie`;
    return [`${key}: ${lie} at ${limit}, ${change} may lead further`];
  });
}

interface Limit {
  key: string;
  /** With its article where it has one. */
  limit: string;
  change: string;
  /** How much of the limit a design uses up: 1 is all of it. */
  share: (design: Design) => number;
}

function limitsOf({ target, detector, shop }: Task): Limit[] {
  const { lobe, timeS } = target;
  const [shortest, longest] = detector.distanceM;
  const [least, most] = detector.radiusM;
  const length = (metres: number) => formatQuantity(metres, 'length', 3);
  const limits: Limit[] = [];
  const add = (key: string, limit: string, change: string, share: Limit['share']) =>
    limits.push({ key, limit, change, share });
  if (lobe !== null) {
    const share = ({ scores }: Design) => scores.lobe.ratio / lobe;
    add('target.lobe', formatQuantity(lobe, 'ratio', 3), 'a higher limit', share);
  }
  if (timeS !== null) {
    const share = ({ scores }: Design) => scores.snr.time_s / timeS;
    add('target.time', formatQuantity(timeS, 'time', 3), 'a longer time', share);
  }
  add('detector.radius', length(most), 'a larger one', ({ scores }) => scores.radius_m / most);
  add('detector.radius', length(least), 'a smaller one', ({ scores }) => least / scores.radius_m);
  if (shortest < longest) {
    add('detector.distance', length(longest), 'a longer one', ({ distanceM }) => distanceM / longest);
    add('detector.distance', length(shortest), 'a shorter one', ({ distanceM }) => shortest / distanceM);
  }
  if (shop !== null) {
    const share = (design: Design) => shopShare(design, shop);
    add('shop', `the smallest widths of ${shop.name}`, 'a finer process', share);
  }
  return limits;
}

/** The shop's smallest width over a design's own, of openings or webs. */
function shopShare({ elements }: Design, shop: ShopRules): number {
  const shares = elements.flatMap(({ rings }) => {
    const { smallestOpening, smallestWeb } = measureOutline(rings);
    return [
      smallestOpening === null ? 0 : shop.smallestOpeningM / smallestOpening.widthM,
      smallestWeb === null ? 0 : shop.smallestWebM / smallestWeb.widthM,
    ];
  });
  return Math.max(0, ...shares);
}

/** Places at the edge of what the brief allows, where designs read worst. */
function placeHints({ task }: Brief, shown: readonly Design[]): string[] {
  const { offsetM, depthM } = task.placement;
  const places = [
    { key: 'placement.offset', most: offsetM, of: ([x, y]: readonly number[]) => Math.hypot(x, y) },
    { key: 'placement.depth', most: depthM, of: ([, , z]: readonly number[]) => Math.abs(z) },
  ];
  return places.flatMap(({ key, most, of }) => {
    if (most === 0) return [];
    const count = shown.filter(({ scores }) => {
      const at = scores.correction.certifiedAt;
      return at !== undefined && of([...at.position_m, at.depth_m]) >= AT_LIMIT.from * most;
    }).length;
    if (count === 0) return [];
    const designs = shown.length === 1 ? 'the design reads' : `${count} of ${shown.length} designs read`;
    return [`${key}: ${designs} worst at ${formatQuantity(most, 'length', 3)}, less may lead further`];
  });
}

/** What a brief does not allow at all: with it, nothing that was found is lost. */
function keptOutHints({ task, families }: Brief): string[] {
  const hints: string[] = [];
  if (task.target.gain === 'one') {
    hints.push('target.gain: free would let one calibrated factor for all particles be taken out');
  }
  if (task.detector.elements === 'one') {
    hints.push('detector.elements: several would let weighted elements be tried');
  }
  const left = FAMILY_NAMES.filter((family) => !families.includes(family));
  if (left.length > 0) hints.push(`families: ${left.join(', ')} were not looked at`);
  return hints;
}
