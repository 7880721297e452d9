import type { Candidate } from '../crew/candidate.ts';
import { frontObjectives } from '../crew/trials.ts';
import type { Variant } from '../outline/families/family.ts';
import { hypervolume } from '../search/hypervolume.ts';

/** Share of a variant's credit that is left a round later. */
const MEMORY = 0.5;

/** Every so many turns one goes to the family that had fewest, whatever its credit: no family starves. */
const FLOOR_EVERY = 4;

/** What each variant has added to the front of late, and the turns that it gets for that. */
export class FrontCredit {
  readonly #familyOf: ReadonlyMap<string, string>;
  readonly #credits = new Map<string, number>();
  /** Turns given to each family so far. */
  readonly #turns: Map<string, number>;

  constructor(variants: readonly Pick<Variant, 'id' | 'family'>[]) {
    this.#familyOf = new Map(variants.map(({ id, family }) => [id, family]));
    this.#turns = new Map(variants.map(({ family }) => [family, 0]));
  }

  /**
   * Takes note of a round: each variant is credited with the share of the hypervolume, in logarithms, that the fronts before and
   * after it would together lack without the variant's newcomers.
   */
  note(before: readonly Candidate[], after: readonly Candidate[]): void {
    for (const [id, credit] of this.#credits) this.#credits.set(id, MEMORY * credit);
    const newcomers = after.filter((one) => !before.includes(one));
    if (newcomers.length === 0) return;
    const known = before.map(frontObjectives);
    const all = [...known, ...newcomers.map(frontObjectives)];
    const corner = [0, 1, 2].map((j) => 1 + Math.max(...all.map((row) => row[j])));
    const whole = hypervolume(all, corner);
    for (const id of new Set(newcomers.map(({ variant }) => variant))) {
      const others = newcomers.filter(({ variant }) => variant !== id).map(frontObjectives);
      const lost = 1 - hypervolume([...known, ...others], corner) / whole;
      this.#credits.set(id, this.#creditOf(id) + lost);
    }
  }

  /**
   * Deals turns to variants in proportion to their credits, as D'Hondt's rule shares out seats.
   *
   * @param ranked variants from the best on: who is taken first where there is no credit
   */
  deal(count: number, ranked: readonly string[]): string[] {
    const all = [...new Set([...ranked, ...this.#familyOf.keys()])];
    const dealt = new Map<string, number>();
    const worth = (id: string) => this.#creditOf(id) / (1 + (dealt.get(id) ?? 0));
    return Array.from({ length: count }, (_, i) => {
      const isFloor = i % FLOOR_EVERY === FLOOR_EVERY - 1;
      const fewest = isFloor ? this.#familyWithFewest() : null;
      const asked = fewest === null ? all : all.filter((id) => this.#familyOf.get(id) === fewest);
      const id = asked.reduce((a, b) => (worth(b) > worth(a) ? b : a));
      const family = this.#familyOf.get(id) as string;
      dealt.set(id, (dealt.get(id) ?? 0) + 1);
      this.#turns.set(family, (this.#turns.get(family) ?? 0) + 1);
      return id;
    });
  }

  #creditOf(id: string): number {
    return this.#credits.get(id) ?? 0;
  }

  #familyWithFewest(): string {
    return [...this.#turns].reduce((a, b) => (b[1] < a[1] ? b : a))[0];
  }
}
