import type { Crew } from '../crew/crew.ts';
import type { Job, ResultOf } from '../crew/messages.ts';
import type { JobMemory } from './journal.ts';

/** Whoever does jobs. */
export type Hands = Pick<Crew, 'do'>;

/**
 * Hands that do only what has not been done before, and write down what they did.
 *
 * @param secondsSoFar spent on the search until now
 * @param onRecall told of each result that was there already
 */
export function remembering(
  hands: Hands,
  memory: JobMemory,
  secondsSoFar: () => number,
  onRecall: (result: ResultOf<Job>) => void,
): Hands {
  return {
    do: async <J extends Job>(job: J): Promise<ResultOf<J>> => {
      const known = memory.recall(job);
      if (known !== undefined) {
        onRecall(known);
        return known;
      }
      const result = await hands.do(job);
      memory.keep(job, result, secondsSoFar());
      return result;
    },
  };
}
