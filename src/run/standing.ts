import type { Candidate } from '../crew/candidate.ts';
import type { ExploreJob, ExploreResult } from '../crew/explore.ts';
import type { Variant } from '../outline/families/family.ts';
import type { Aim } from '../score/aim.ts';

/** The best of a family for the main aim so far, or null before its first. */
export interface FamilyStanding {
  family: string;
  best: Candidate | null;
}

/** What is best for the main aim while a search runs, in all and of each family: for those who watch, it decides nothing. */
export class Standing {
  readonly #familyOf: Map<string, string>;
  readonly #mainAim: Aim;
  readonly #bests = new Map<string, NonNullable<ExploreResult['best']>>();

  constructor(variants: readonly Variant[], mainAim: Aim) {
    this.#familyOf = new Map(variants.map(({ id, family }) => [id, family]));
    this.#mainAim = mainAim;
  }

  note({ aim, variant }: ExploreJob, { best }: ExploreResult): void {
    const family = this.#familyOf.get(variant);
    if (aim !== this.#mainAim || best === null || family === undefined) return;
    const held = this.#bests.get(family);
    if (held === undefined || best.value < held.value) this.#bests.set(family, best);
  }

  get best(): Candidate | null {
    const bests = [...this.#bests.values()].sort((a, b) => a.value - b.value);
    return bests[0]?.candidate ?? null;
  }

  get families(): FamilyStanding[] {
    return [...new Set(this.#familyOf.values())].map((family) => ({
      family,
      best: this.#bests.get(family)?.candidate ?? null,
    }));
  }
}
