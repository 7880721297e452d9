import { Certifier } from '../score/certifier.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import { making } from '../shop/making.ts';
import type { GivenDesign } from './givenDesign.ts';
import type { OutlineJudge } from './judgeOutline.ts';
import type { RankedDesign } from './ranking.ts';
import { missesOf } from './ranking.ts';

/**
 * The certified scores of an outline from outside, over every particle, wavelength and position of the brief: as its shop cuts it, with
 * bridges where islands would fall out. Its rank is 1 as long as it stands alone.
 */
export function scoreGiven(
  task: Task,
  given: GivenDesign,
  { judge, distanceM, fields }: OutlineJudge,
): RankedDesign {
  const { id, family, elements } = given;
  const { drawn, cut, report } = making(elements, task.shop);
  const certifier = new Certifier(judge, fields);
  const { scores } = certifier.scoreOutline(cut, distanceM);
  const design = {
    family,
    distanceM,
    elements: drawn,
    scores,
    fields,
    ...(cut !== drawn && { asDrawn: { worst: worstOf(certifier.scoreOutline(drawn, distanceM).scores) } }),
    shop: report,
  };
  return { ...design, id, rank: 1, meetsTarget: missesOf(design, task).length === 0 };
}

/** The outline that comes back from the brief's shop: see `making`. */
export function asMade({ shop }: Task, given: GivenDesign): GivenDesign {
  return shop === null ? given : { ...given, elements: making(given.elements, shop).cut };
}

/** Designs by whether they meet the target, then by time, each with that place as its rank. */
export function rankGiven<T extends RankedDesign>(designs: readonly T[]): T[] {
  return [...designs]
    .sort(
      (a, b) => Number(b.meetsTarget) - Number(a.meetsTarget) || a.scores.snr.time_s - b.scores.snr.time_s,
    )
    .map((design, i) => ({ ...design, rank: i + 1 }));
}
