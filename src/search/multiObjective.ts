import { RimwrightError } from '../base/errors.ts';
import { memberOf, type Outcome } from './frontMember.ts';
import { FrontPopulation } from './frontPopulation.ts';
import {
  type CheckedMultiObjectiveOptions,
  checkedMultiObjectiveOptions,
  type MultiObjectiveOptions,
} from './multiObjectiveOptions.ts';
import { compareRows } from './pareto.ts';
import { VARIATIONS } from './variation.ts';
import { VariationChoice } from './variationChoice.ts';

/** A point that no other point seen dominates. */
export interface FrontPoint {
  x: Float64Array;
  objectives: readonly number[];
}

/** A point, its place in the unit cube, and which way made it; −1 for the first ones. */
interface Pending {
  x: Float64Array;
  unit: Float64Array;
  way: number;
}

/** Share of the budget after which the front may grow beyond the least size. */
const APPROACH = 0.2;

/**
 * Searches the whole front of two or three objectives at once, by the hypervolume that each point adds.
 *
 * Every point that no other dominates is kept; those that add much are bred from more often. New points come from the
 * ways of `VARIATIONS`, each used the more, the more hypervolume its points brought of late. Selection by hypervolume as
 * in Beume, Naujoks & Emmerich (2007), Eur. J. Oper. Res. 181, 1653, and Igel, Hansen & Roth (2007), Evol. Comput. 15, 1.
 * No weights and no reference point are needed: objectives are measured by the spans of the population.
 *
 * Ask, score, tell, until `ask` returns no points. Points of one `ask` may be scored side by side; what is found does
 * not depend on how, and the same random stream and outcomes give the same points.
 */
export class MultiObjectiveSearch {
  private readonly options: CheckedMultiObjectiveOptions;
  private readonly population: FrontPopulation;
  private readonly choice = new VariationChoice(VARIATIONS.length);
  /** The points that are out for scoring. */
  private pending: Pending[];
  private scored = 0;

  /** @throws RimwrightError `input` that lists every mistake in the options */
  constructor(options: MultiObjectiveOptions) {
    this.options = checkedMultiObjectiveOptions(options);
    this.population = new FrontPopulation(this.options.population, this.options.objectives);
    this.pending = this.firstPoints().slice(0, this.options.budget);
  }

  /** Points scored so far. */
  get evaluations(): number {
    return this.scored;
  }

  /** True when the budget is spent. */
  get done(): boolean {
    return this.pending.length === 0;
  }

  /** The points to score next, inside the bounds; none when the search is over. */
  ask(): Float64Array[] {
    return this.pending.map(({ x }) => x.slice());
  }

  /**
   * Learns from the last points.
   *
   * @param outcomes one a point, in the order of `ask`
   * @throws RimwrightError `machine` at NaN, with the candidate; `input` at a wrong number of outcomes
   */
  tell(outcomes: readonly Outcome[]): void {
    const { objectives, budget, batch } = this.options;
    const count = this.pending.length;
    if (outcomes.length !== count) {
      throw new RimwrightError('input', `tell: ${outcomes.length} outcomes for ${count} points`);
    }
    const newcomers = this.pending.map((point, k) =>
      memberOf(point, outcomes[k], objectives, `candidate ${k + 1} of ${count}`),
    );
    this.scored += count;
    if (this.scored > APPROACH * budget) this.population.grow();
    const gains = this.population.add(newcomers);
    if (this.pending.some(({ way }) => way >= 0)) {
      // Roots: one lucky find must not decide for many rounds.
      this.choice.record(this.pending.map(({ way }, k) => ({ way, gain: Math.sqrt(gains[k]) })));
    }
    this.pending = Array.from({ length: Math.min(batch, budget - this.scored) }, () => this.nextPoint());
  }

  /**
   * All points that no other point told so far dominates, in the order of their objectives, one of each set of equal
   * objectives; none where none is allowed.
   */
  get front(): FrontPoint[] {
    return this.population
      .whole()
      .sort((a, b) => compareRows(a.objectives, b.objectives))
      .filter(({ objectives }, k, all) => k === 0 || compareRows(all[k - 1].objectives, objectives) !== 0)
      .map(({ x, objectives }) => ({ x: x.slice(), objectives }));
  }

  private nextPoint(): Pending {
    const { random } = this.options;
    const way = this.choice.draw(random);
    const unit = VARIATIONS[way](this.population, random);
    return { x: this.inBox(unit), unit, way };
  }

  /** The starts, and random points that share every coordinate out evenly: McKay, Beckman & Conover (1979), Technometrics 21, 239. */
  private firstPoints(): Pending[] {
    const { box, population, random, starts } = this.options;
    const columns = Array.from(box.lower, () => {
      const order = Array.from({ length: population }, (_, k) => k);
      for (let k = population - 1; k > 0; k--) {
        const other = Math.floor((k + 1) * random.uniform());
        [order[k], order[other]] = [order[other], order[k]];
      }
      return order.map((cell) => (cell + random.uniform()) / population);
    });
    const given = starts.map((x) => ({
      x: x.slice(),
      unit: x.map((v, i) => (v - box.lower[i]) / (box.upper[i] - box.lower[i])),
      way: -1,
    }));
    const spread = Array.from({ length: population }, (_, k) => {
      const unit = Float64Array.from(columns, (column) => column[k]);
      return { x: this.inBox(unit), unit, way: -1 };
    });
    return [...given, ...spread];
  }

  private inBox(unit: Float64Array): Float64Array {
    const { lower, upper } = this.options.box;
    return unit.map((u, i) => Math.min(upper[i], Math.max(lower[i], (1 - u) * lower[i] + u * upper[i])));
  }
}

/**
 * Runs a search for a front to its end.
 *
 * @returns all points that no other point seen dominates, in the order of their objectives
 * @throws RimwrightError as `MultiObjectiveSearch` does
 */
export function minimiseFront(f: (x: Float64Array) => Outcome, options: MultiObjectiveOptions): FrontPoint[] {
  const search = new MultiObjectiveSearch(options);
  for (let points = search.ask(); points.length > 0; points = search.ask()) search.tell(points.map(f));
  return search.front;
}
