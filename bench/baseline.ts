import optimjs from 'optimization-js';
import { tryCandidate } from '../src/crew/candidate.ts';
import { Workshop } from '../src/crew/workshop.ts';
import type { FamilyName, Variant } from '../src/outline/families/family.ts';
import { Rounds } from '../src/run/rounds.ts';
import { SEARCH_FINENESS } from '../src/score/fineness.ts';
import { Judge } from '../src/score/judge.ts';
import { searchSpace } from '../src/score/searchSpace.ts';
import { median, presetBrief } from './sampleTask.ts';
import { withSeed } from './withSeed.ts';

const SEEDS = [1, 2, 3, 4, 5];
const BUDGET = 4000;

/** For each family the variant that the library is given: the one that does best there in longer runs. */
const FAMILIES: readonly { family: FamilyName; variant: string }[] = [
  { family: 'rings', variant: 'rings-2' },
  { family: 'fourier', variant: 'fourier-square-5-fold-6' },
  { family: 'sectors', variant: 'sectors-hub-3-fold-2' },
];

/**
 * The search beside optimization-js on the real problem, at the same number of evaluations. Figures are exp of the value
 * made small over λz: the area over λz where the target is met, and far more where it is not. Medians over seeds. The
 * library gets all evaluations for one good variant, and the better of its two methods without derivatives counts.
 */
export async function benchBaseline() {
  const { task } = await presetBrief('offset-range');
  const aim = { measure: 'area', correction: task.target.correction } as const;
  const judge = new Judge(task, SEARCH_FINENESS);
  const floor = judge.wavelengthM * task.detector.distanceM[0];
  const rows = [];
  for (const { family, variant: id } of FAMILIES) {
    const ours: number[] = [];
    const theirs: number[] = [];
    const space = searchSpace(task, [family], judge);
    const variant = space.variants.find((one) => one.id === id) as Variant;
    for (const seed of SEEDS) {
      const workshop = new Workshop({ task, families: [family] });
      const { variants, distances } = workshop.space;
      const quest = { task, variants, distances, aims: [aim], candidates: BUDGET, seed };
      const rounds = new Rounds(quest, workshop, () => {});
      await rounds.run();
      ours.push(Math.exp(rounds.findings.best[0][0].value) / floor);
      const f = (x: number[]) => tryCandidate(judge, space, variant, Float64Array.from(x), aim).value;
      const box = variant.parameters.map(({ low, high }) => optimjs.Real(low, high));
      const methods = [optimjs.rs_minimize, optimjs.dummy_minimize];
      const values = methods.map((method) => withSeed(seed, () => method(f, box, BUDGET).best_y));
      theirs.push(Math.exp(Math.min(...values)) / floor);
    }
    rows.push({ family, evaluations: BUDGET, ours: median(ours), optimizationJs: median(theirs) });
  }
  return rows;
}
