import type { RandomSource } from '../base/random.ts';
import { ascending } from './ascending.ts';
import { alongFront, beats, type Member } from './frontMember.ts';
import { firstAtLeast } from './hypervolume.ts';
import { hypervolumeContributions } from './hypervolumeContributions.ts';
import { hypervolumeGaps } from './hypervolumeGaps.ts';
import { compareRows, nonDominatedRanks } from './pareto.ts';

/** Worst corner of the hypervolume, in units of the spans: a tenth beyond the worst, so that the ends of the front count too. */
export const CORNER = 1.1;

/** Spans are those of at least so many points: a front that shrinks to a point would lose all sense of scale. */
const LEAST_FOR_SPANS = 20;

/**
 * The points that a search for a front breeds from: the whole front, filled up with the next ranks while it is small.
 *
 * At first the front is held at the least size by giving up the point that costs least hypervolume, one at a time
 * (Beume, Naujoks & Emmerich (2007), Eur. J. Oper. Res. 181, 1653): a small population comes near the front sooner.
 * From `grow` on it may have any size. Points given up before then come back.
 */
export class FrontPopulation {
  private readonly least: number;
  /** All that are on the front, then others by rank; at least `least` once that many were seen. */
  members: readonly Member[] = [];
  /** The best of `members`: allowed, and dominated by none. */
  front: readonly Member[] = [];
  /** Points that were beaten of late, at most `least`. */
  beaten: readonly Member[] = [];
  private resting: Member[] = [];
  private mayGrow = false;
  /** Best and worst objectives that places are measured by. */
  private best: number[] = [];
  private worst: number[] = [];
  /** Gaps, the most promising last, once somebody asks for one; and those that were given out. */
  private gaps: FrontGap[] | undefined;
  private given: FrontGap[] = [];
  /** Running sums of worth over the front. */
  private sums: number[] = [];

  constructor(least: number) {
    this.least = least;
  }

  /** Lets the front grow beyond the least size. */
  grow(): void {
    this.mayGrow = true;
  }

  /** Takes newcomers in, and leaves out who is not needed any more. */
  add(newcomers: readonly Member[]): number[] {
    const arrivals = this.mayGrow ? [...newcomers, ...this.resting.splice(0)] : newcomers;
    const isLarge = this.mayGrow && this.front.length >= this.least;
    const { front, others, wide } = isLarge
      ? merged(this.front, arrivals)
      : ranked([...this.members, ...arrivals]);
    this.noteMisses(newcomers);
    const before = this.front.map((member) => ({ member, worth: member.worth }));
    this.measure(wide, arrivals);
    // In order, the next appraisal need not sort it again.
    front.sort((a, b) => ascending(a.place[a.place.length - 1], b.place[b.place.length - 1]));
    appraise(front);
    while (!this.mayGrow && front.length > this.least) {
      const cheapest = front.reduce((least, { worth }, k) => (worth < front[least].worth ? k : least), 0);
      this.resting.push(...front.splice(cheapest, 1));
      appraise(front);
    }
    for (const member of others) member.worth = 0;
    const staying = new Set(front);
    const gone = before.filter(({ member }) => !staying.has(member));
    const gains = newcomers.map((newcomer) =>
      gone.reduce((sum, { member, worth }) => (beats(newcomer, member) ? sum - worth : sum), newcomer.worth),
    );
    const known = new Set(this.beaten);
    const losers = others.filter((member) => !known.has(member));
    this.beaten = [...this.beaten, ...losers].slice(-this.least);
    this.front = front;
    this.members = [...front, ...others.slice(0, Math.max(0, this.least - front.length))];
    this.gaps = undefined;
    let sum = 0;
    this.sums = front.map(({ worth }) => {
      sum += worth;
      return sum;
    });
    return gains.map((gain) => Math.max(0, gain));
  }

  /** Everything on the front that was seen so far. */
  whole(): Member[] {
    const all = [...this.front, ...this.resting];
    const ranks = nonDominatedRanks(all.map(({ objectives }) => objectives));
    return all.filter((_, k) => ranks[k] === 1);
  }

  /** Any member. */
  any(random: RandomSource): Member {
    return this.members[Math.floor(this.members.length * random.uniform())];
  }

  /** A member of the front with a chance that grows with its worth: lonely ones and those ahead; now and then any member. */
  worthy(random: RandomSource): Member {
    const total = this.sums[this.sums.length - 1] ?? 0;
    if (total === 0 || random.uniform() < 0.2) return this.any(random);
    const k = firstAtLeast(this.sums, total * random.uniform());
    return this.front[Math.min(k, this.front.length - 1)];
  }

  /** The gap that promises most, given out once a round; undefined where there is none. */
  takeGap(): FrontGap | undefined {
    if (!this.gaps) {
      this.gaps = promisingGaps(this.front);
    }
    const gap = this.gaps.pop();
    if (gap) this.given.push(gap);
    return gap;
  }

  /** A gap that stays as it was is less and less likely to be one that can be filled. */
  private noteMisses(newcomers: readonly Member[]): void {
    for (const { corner, holders } of this.given) {
      const isHit = newcomers.some(
        ({ objectives, violation }) => violation === 0 && objectives.every((x, j) => x < corner[j]),
      );
      if (!isHit) for (const holder of holders) holder.misses++;
    }
    this.given = [];
  }

  /** Gives all that are new their places, and everyone where the spans have changed. */
  private measure(wide: readonly Member[], arrivals: readonly Member[]): void {
    const extreme = (pick: (a: number, b: number) => number, start: number) =>
      Array.from(wide[0]?.objectives ?? [], (_, j) =>
        wide.reduce((x, { objectives }) => pick(x, objectives[j]), start),
      );
    const best = extreme(Math.min, Number.POSITIVE_INFINITY);
    const worst = extreme(Math.max, Number.NEGATIVE_INFINITY);
    const isSame = compareRows(best, this.best) === 0 && compareRows(worst, this.worst) === 0;
    this.best = best;
    this.worst = worst;
    for (const member of isSame ? arrivals : [...this.members, ...this.beaten, ...arrivals]) {
      member.place = best.map((least, j) => (member.objectives[j] - least) / (worst[j] - least || 1));
      member.along = alongFront(member.place);
    }
  }
}

/** Room that the front leaves below a corner. */
export interface FrontGap {
  /** In the objectives. */
  corner: readonly number[];
  /** The members that the corner rests on. */
  holders: readonly Member[];
  promise: number;
  /** Mean place of the holders. */
  middle: readonly number[];
  open: readonly boolean[];
}

function promisingGaps(front: readonly Member[]): FrontGap[] {
  const corner = new Array<number>(front[0]?.place.length ?? 2).fill(CORNER);
  const found = hypervolumeGaps(
    front.map(({ place }) => place),
    corner,
  ).map((gap) => {
    const holders = gap.holders.filter((k) => k >= 0).map((k) => front[k]);
    const middle = gap.corner.map((_, j) => holders.reduce((sum, { place }) => sum + place[j], 0) / holders.length);
    const volume = gap.corner.reduce((product, x, j) => product * (x - middle[j]), 1);
    const misses = Math.min(...holders.map(({ misses }) => misses));
    return {
      corner: gap.holders.map((k, j) => front[k]?.objectives[j] ?? Number.POSITIVE_INFINITY),
      holders,
      promise: holders.length > 0 ? volume * 0.5 ** misses : 0,
      middle,
      open: gap.holders.map((k) => k < 0),
    };
  });
  found.sort((a, b) => a.promise - b.promise);
  return found.slice(-200);
}

function appraise(front: readonly Member[]): void {
  const corner = new Array<number>(front[0]?.place.length ?? 2).fill(CORNER);
  const worth = hypervolumeContributions(
    front.map(({ place }) => place),
    corner,
  );
  for (const [k, member] of front.entries()) member.worth = worth[k];
}

/** Members sorted into the front and the others by rank, and those that the spans are taken from. */
interface Sorted {
  front: Member[];
  others: Member[];
  wide: readonly Member[];
}

/** A front that is large enough to do without others: each arrival is only held against it. */
function merged(old: readonly Member[], arrivals: readonly Member[]): Sorted {
  let front = old.slice();
  const others: Member[] = [];
  for (const arrival of arrivals) {
    if (front.some((member) => beats(member, arrival) || isEqual(member, arrival))) {
      others.push(arrival);
      continue;
    }
    const losers = front.filter((member) => beats(arrival, member));
    if (losers.length > 0) {
      others.push(...losers);
      front = front.filter((member) => !losers.includes(member));
    }
    front.push(arrival);
  }
  return { front, others, wide: front };
}

function isEqual(a: Member, b: Member): boolean {
  return a.violation === b.violation && compareRows(a.objectives, b.objectives) === 0;
}

/** Any members, by their ranks. */
function ranked(members: readonly Member[]): Sorted {
  const ranks = constrainedRanks(members);
  const order = [...members.keys()].sort((a, b) => ranks[a] - ranks[b]);
  const limit = ranks[order[Math.min(members.length, LEAST_FOR_SPANS) - 1]];
  const isFront = (k: number) => ranks[k] === 1 && members[k].violation === 0;
  return {
    front: order.filter(isFront).map((k) => members[k]),
    others: order.filter((k) => !isFront(k)).map((k) => members[k]),
    wide: members.filter((member, k) => ranks[k] <= limit && member.violation < Number.POSITIVE_INFINITY),
  };
}

/** Ranks of what is allowed, then all that is not by how far it is from allowed. */
function constrainedRanks(members: readonly Member[]): number[] {
  const allowed = [...members.keys()].filter((k) => members[k].violation === 0);
  const found = nonDominatedRanks(allowed.map((k) => members[k].objectives));
  const last = found.reduce((most, rank) => Math.max(most, rank), 0);
  const ranks = new Array<number>(members.length).fill(last + 1);
  for (const [i, k] of allowed.entries()) ranks[k] = found[i];
  const violations = members.map(({ violation }) => violation).filter((x) => x > 0);
  const levels = [...new Set(violations)].sort(ascending);
  for (const [k, { violation }] of members.entries()) {
    if (violation > 0) ranks[k] += firstAtLeast(levels, violation);
  }
  return ranks;
}
