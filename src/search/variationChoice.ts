import type { RandomSource } from '../base/random.ts';

/** Each way is tried at least this often: what pays nothing now may pay later. */
const LEAST_SHARE = 0.02;

/** Share of what was learnt that is kept from one round to the next. */
const MEMORY = 0.95;

/** After so many rounds that brought nothing at all, all ways are alike again. */
const PATIENCE = 5;

/** Chances go as this power of what a way brings: a clear lead is used, noise does not decide. */
const GREED = 3;

/** Chooses among ways to make points by what they brought of late. (Adaptive operator selection: Thierens (2005), GECCO 2005, 1539.) */
export class VariationChoice {
  private readonly gains: Float64Array;
  private readonly uses: Float64Array;
  private barrenRounds = 0;

  constructor(count: number) {
    this.gains = new Float64Array(count);
    this.uses = new Float64Array(count);
  }

  /** Chance of each; they add up to 1. */
  chances(): Float64Array {
    const count = this.gains.length;
    const rates = this.gains.map((gain, k) => (gain / (this.uses[k] + 1)) ** GREED);
    const total = rates.reduce((sum, rate) => sum + rate, 0);
    return rates.map((rate) =>
      total > 0 ? LEAST_SHARE + (1 - count * LEAST_SHARE) * (rate / total) : 1 / count,
    );
  }

  draw(random: RandomSource): number {
    const chances = this.chances();
    let rest = random.uniform();
    for (const [k, chance] of chances.entries()) {
      rest -= chance;
      if (rest < 0) return k;
    }
    return chances.length - 1;
  }

  /** @param gains what each point of a round brought, and which way made it */
  record(gains: readonly { way: number; gain: number }[]): void {
    for (const numbers of [this.gains, this.uses]) {
      for (let k = 0; k < numbers.length; k++) numbers[k] *= MEMORY;
    }
    this.barrenRounds = gains.some(({ gain }) => gain > 0) ? 0 : this.barrenRounds + 1;
    if (this.barrenRounds >= PATIENCE) this.gains.fill(0);
    for (const { way, gain } of gains) {
      this.gains[way] += gain;
      this.uses[way]++;
    }
  }
}
