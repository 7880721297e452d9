import type { RandomSource } from '../base/random.ts';
import { ascending } from './ascending.ts';
import { CORNER, type FilledGap, FrontGaps } from './frontGaps.ts';
import { alongFront, type Member } from './frontMember.ts';
import { firstAtLeast } from './hypervolume.ts';
import { hypervolumeContributions } from './hypervolumeContributions.ts';
import { compareRows, nonDominatedRanks } from './pareto.ts';

/** Spans are those of at least so many points: a front that shrinks to a point would lose all sense of scale. */
const LEAST_FOR_SPANS = 20;

/** Worths are computed anew when so large a share of the front has changed. */
const REFRESH = 0.02;

/**
 * The points that a search for a front breeds from: the whole front, filled up with the next ranks while it is small.
 *
 * At first the front is held at the least size by giving up the point that costs least hypervolume, one at a time
 * (Beume, Naujoks & Emmerich (2007), Eur. J. Oper. Res. 181, 1653): a small population comes near the front sooner.
 * From `grow` on it may have any size. Points given up before then come back.
 */
export class FrontPopulation {
  private readonly least: number;
  private readonly objectives: number;
  /** What is missing on the front of all points seen. */
  readonly gaps: FrontGaps;
  /** All that are on the front, then others by rank; at least `least` once that many were seen. */
  members: readonly Member[] = [];
  /** The best of `members`: allowed, and dominated by none. */
  front: readonly Member[] = [];
  /** Points that were beaten of late, at most `least`. */
  beaten: readonly Member[] = [];
  /** `members`, then `beaten`; and their places along the front, one after the other. */
  known: readonly Member[] = [];
  alongs = new Float64Array(0);
  private resting: Member[] = [];
  private mayGrow = false;
  /** Best and worst objectives that places are measured by. */
  private best: number[] = [];
  private worst: number[] = [];
  /** Members that came in or went since all worths were computed. */
  private changes = 0;
  /** Running sums of worth over the front. */
  private sums: number[] = [];

  constructor(least: number, objectives: number) {
    this.least = least;
    this.objectives = objectives;
    this.gaps = new FrontGaps(objectives);
  }

  /** Lets the front grow beyond the least size. */
  grow(): void {
    this.mayGrow = true;
  }

  /**
   * Takes newcomers in, and leaves out who is not needed any more.
   *
   * @returns the hypervolume that each newcomer brought, in units of the spans
   */
  add(newcomers: readonly Member[]): number[] {
    const filled = newcomers.map((member) => (member.violation > 0 ? [] : this.gaps.add(member.objectives)));
    this.gaps.endRound();
    const returning = this.mayGrow ? this.resting.splice(0) : [];
    const arrivals = [...newcomers, ...returning];
    const isLarge = this.mayGrow && returning.length === 0 && this.front.length >= this.least;
    const { front, others, wide } = isLarge
      ? merged(this.front, newcomers, filled)
      : ranked([...this.members, ...arrivals]);
    this.measure(wide, arrivals);
    // Where nothing else is in its way, this is what a newcomer is worth.
    const gains = newcomers.map((member, k) => {
      member.worth = this.gaps.brought(member.objectives, filled[k]);
      return member.worth;
    });
    this.changes += arrivals.length;
    if (!isLarge || this.changes > REFRESH * front.length) {
      // In order, the next appraisal need not sort it again.
      front.sort((a, b) => ascending(a.place[a.place.length - 1], b.place[b.place.length - 1]));
      appraise(front);
      this.changes = 0;
    }
    while (!this.mayGrow && front.length > this.least) {
      const cheapest = front.reduce((least, { worth }, k) => (worth < front[least].worth ? k : least), 0);
      this.resting.push(...front.splice(cheapest, 1));
      appraise(front);
    }
    for (const member of others) member.worth = 0;
    const known = new Set(this.beaten);
    const losers = others.filter((member) => !known.has(member));
    this.beaten = [...this.beaten, ...losers].slice(-this.least);
    this.front = front;
    this.members = [...front, ...others.slice(0, Math.max(0, this.least - front.length))];
    this.known = [...this.members, ...this.beaten];
    const width = this.objectives - 1;
    this.alongs = new Float64Array(width * this.known.length);
    for (let k = 0; k < this.known.length; k++) {
      const { along } = this.known[k];
      for (let j = 0; j < width; j++) this.alongs[width * k + j] = along[j];
    }
    let sum = 0;
    this.sums = front.map(({ worth }) => {
      sum += worth;
      return sum;
    });
    return gains;
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

  /** Gives all that are new their places, and everyone where the spans have changed. */
  private measure(wide: readonly Member[], arrivals: readonly Member[]): void {
    const extreme = (pick: (a: number, b: number) => number, start: number) =>
      Array.from(wide[0]?.objectives ?? [], (_, j) =>
        wide.reduce((x, { objectives }) => pick(x, objectives[j]), start),
      );
    const best = extreme(Math.min, Number.POSITIVE_INFINITY);
    const worst = extreme(Math.max, Number.NEGATIVE_INFINITY);
    const isSame =
      best.length === this.best.length &&
      compareRows(best, this.best) === 0 &&
      compareRows(worst, this.worst) === 0;
    this.best = best;
    this.worst = worst;
    const spans = best.map((least, j) => worst[j] - least || 1);
    if (!isSame && best.length > 0) this.gaps.measure(best, spans);
    for (const member of isSame ? arrivals : [...this.members, ...this.beaten, ...arrivals]) {
      member.place = best.map((least, j) => (member.objectives[j] - least) / spans[j]);
      member.along = alongFront(member.place);
    }
  }
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

/** A front that is large enough to do without others. Only points beside the gaps that an arrival filled can be beaten by it. */
function merged(
  old: readonly Member[],
  arrivals: readonly Member[],
  filled: readonly (readonly FilledGap[])[],
): Sorted {
  const lost = new Set<readonly number[]>();
  for (const [k, { objectives }] of arrivals.entries()) {
    for (const { holders } of filled[k]) {
      for (const holder of holders) if (holder && isNoBetter(holder, objectives)) lost.add(holder);
    }
  }
  const all = [...old, ...arrivals.filter((_, k) => filled[k].length > 0)];
  const front = lost.size > 0 ? all.filter(({ objectives }) => !lost.has(objectives)) : all;
  const others = arrivals.filter((_, k) => filled[k].length === 0);
  if (lost.size > 0) others.push(...all.filter(({ objectives }) => lost.has(objectives)));
  return { front, others, wide: front };
}

/** Whether a is nowhere below b. */
function isNoBetter(a: readonly number[], b: readonly number[]): boolean {
  for (let j = 0; j < a.length; j++) if (a[j] < b[j]) return false;
  return true;
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
