import type { BudgetCheck } from '../metrology/checkBudget.ts';
import { checkBudget } from '../metrology/checkBudget.ts';
import { extinctionInputs, extinctionModel } from '../metrology/extinctionModel.ts';
import type { Budget } from '../metrology/uncertaintyBudget.ts';
import { uncertaintyBudget } from '../metrology/uncertaintyBudget.ts';
import type { Particle } from '../optics/particle.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Brief } from './brief.ts';
import { expectedReadings } from './expectedReadings.ts';
import type { GivenDesign } from './givenDesign.ts';
import type { BuiltInstrument } from './instrument.ts';
import { instrumentOf } from './instrument.ts';
import { judgeOutline } from './judgeOutline.ts';

/** The uncertainty of one measurement that is yet to be made. */
export interface ExtinctionBudget {
  built: BuiltInstrument;
  particle: Particle;
  /** True, and as the instrument is expected to show it, m². */
  extinctionM2: number;
  shownM2: number;
  budget: Budget;
  check: BudgetCheck;
}

/** Most trials of the Monte Carlo run. */
const MOST_TRIALS = 1_000_000;

/**
 * The uncertainty budget of measuring one particle with a design, checked by a Monte Carlo run.
 *
 * @param particle null for the brief's own with the smallest extinction
 * @throws RimwrightError `input` as `judgeOutline`
 */
export function extinctionBudget(
  brief: Brief,
  given: GivenDesign,
  distance: number | null,
  particle: Particle | null,
  { coverage, seed, digits, fields }: { coverage: number; seed: number; digits: number; fields: Fields },
): ExtinctionBudget {
  const chosen = particle ?? faintest(brief, given, distance, fields);
  const built = instrumentOf(brief, given, distance, fields, [chosen]);
  const { instrument, powerW, distanceM } = built;
  const [{ extinctionM2, meanM2 }] = expectedReadings(brief.task, given, distanceM, [chosen], fields);
  const averagingS = brief.uncertainties.averagingS;
  const pair = {
    withoutW: powerW,
    withW: powerW - instrument.irradianceWm2 * meanM2,
    averagingS,
  };
  const model = extinctionModel(instrument);
  const inputs = extinctionInputs(instrument, pair);
  const budget = uncertaintyBudget(model, inputs, coverage);
  const check = checkBudget(model, inputs, budget, { seed, digits, most: MOST_TRIALS });
  const shownM2 = meanM2 / instrument.gain.value;
  return { built, particle: chosen, extinctionM2, shownM2, budget, check };
}

function faintest({ task }: Brief, given: GivenDesign, distance: number | null, fields: Fields): Particle {
  const { scenarios } = judgeOutline(task, given, distance, null, fields).judge;
  return scenarios.reduce((p, q) => (q.extinctionM2 < p.extinctionM2 ? q : p)).particle;
}
