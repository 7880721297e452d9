import { fileURLToPath } from 'node:url';
import type { Brief } from '../src/run/brief.ts';
import { smallest } from '../src/run/search.ts';
import { worstOf } from '../src/score/scores.ts';
import { presetBrief } from './sampleTask.ts';

/** Times of one measurement that meets the target, seconds. */
export interface BalancedGain {
  single: number;
  balanced: number;
  /** The one over the other. */
  ratio: number;
}

/**
 * What a balanced layout of weighted elements gains where the light is noisy: the fastest single element of the brief `noisy-laser`
 * over its fastest balanced layout, both certified within the target; Infinity or 0 where one of them is not found.
 */
export async function balancedGain(seed = 1, candidates?: number): Promise<BalancedGain> {
  const brief = await presetBrief('noisy-laser');
  const { detector } = brief.task;
  const fastest = async (changes: Partial<Brief['task']['detector']>) => {
    const asked: Brief = {
      ...brief,
      task: { ...brief.task, detector: { ...detector, ...changes } },
      search: { candidates: candidates ?? brief.search.candidates, seed },
    };
    const workerEntry = fileURLToPath(new URL('../dist/crew/worker.js', import.meta.url));
    const { design } = await smallest(asked, 'time', { workers: 2, workerEntry });
    const isKept = design !== null && worstOf(design.scores) <= brief.task.target.correction;
    return isKept ? design.scores.snr.time_s : Number.POSITIVE_INFINITY;
  };
  const single = await fastest({ elements: 'one', balanced: false });
  const balanced = await fastest({ elements: 'several', balanced: true });
  return { single, balanced, ratio: single / balanced };
}
