import type { RandomSource } from '../base/random.ts';
import { ascending } from './ascending.ts';
import type { Member } from './frontMember.ts';
import { firstAtLeast } from './hypervolume.ts';
import { hypervolumeContributions } from './hypervolumeContributions.ts';
import { nonDominatedRanks } from './pareto.ts';

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
  add(newcomers: readonly Member[]): void {
    const all = [...this.members, ...newcomers];
    if (this.mayGrow) all.push(...this.resting.splice(0));
    const ranks = constrainedRanks(all);
    this.measure(all, ranks);
    const front = all.filter((member, k) => ranks[k] === 1 && member.violation === 0);
    const corner = new Array<number>(all[0].objectives.length).fill(CORNER);
    appraise(front, corner);
    while (!this.mayGrow && front.length > this.least) {
      const cheapest = front.reduce((least, { worth }, k) => (worth < front[least].worth ? k : least), 0);
      this.resting.push(...front.splice(cheapest, 1));
      appraise(front, corner);
    }
    const onFront = new Set([...front, ...this.resting]);
    const others = all
      .map((member, k) => ({ member, rank: ranks[k] }))
      .filter(({ member }) => !onFront.has(member));
    others.sort((a, b) => a.rank - b.rank);
    for (const { member } of others) member.worth = 0;
    const known = new Set(this.beaten);
    this.beaten = [
      ...this.beaten,
      ...others.map(({ member }) => member).filter((member) => !known.has(member)),
    ].slice(-this.least);
    const fill = Math.max(0, this.least - front.length);
    this.front = front;
    this.members = [...front, ...others.slice(0, fill).map(({ member }) => member)];
    let sum = 0;
    this.sums = front.map(({ worth }) => {
      sum += worth;
      return sum;
    });
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

  /** Gives every member its place. */
  private measure(all: readonly Member[], ranks: readonly number[]): void {
    const limit = ranks.toSorted(ascending)[Math.min(all.length, LEAST_FOR_SPANS) - 1];
    const wide = all.filter((member, k) => ranks[k] <= limit && member.violation < Number.POSITIVE_INFINITY);
    const best = all[0].objectives.map((_, j) =>
      wide.reduce((x, { objectives }) => Math.min(x, objectives[j]), Infinity),
    );
    const worst = all[0].objectives.map((_, j) =>
      wide.reduce((x, { objectives }) => Math.max(x, objectives[j]), -Infinity),
    );
    for (const member of all) {
      member.place = member.objectives.map((x, j) => {
        const span = worst[j] - best[j];
        return (x - best[j]) / (span > 0 ? span : 1);
      });
    }
  }
}

function appraise(front: readonly Member[], corner: readonly number[]): void {
  const worth = hypervolumeContributions(
    front.map(({ place }) => place),
    corner,
  );
  for (const [k, member] of front.entries()) member.worth = worth[k];
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
