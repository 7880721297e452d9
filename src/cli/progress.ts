import { SingleBar } from 'cli-progress';
import { percentText, timeText } from '../draw/quantityText.ts';
import type { Progress } from '../run/rounds.ts';

/** Shows how far a search has come, on standard error. */
export interface ProgressDisplay {
  show(progress: Progress): void;
  close(): void;
}

/** Milliseconds between two lines where no terminal redraws them. */
const LINE_INTERVAL = 5000;

/** A bar on a terminal, now and then a line anywhere else, and nothing where `quiet`. */
export function openProgress(candidates: number, quiet: boolean): ProgressDisplay {
  if (quiet) return { show() {}, close() {} };
  return process.stderr.isTTY ? bar(candidates) : lines();
}

function bar(candidates: number): ProgressDisplay {
  const shown = new SingleBar({
    format: '{bar} {percentage} % of {total}  {best}',
    barsize: 20,
    barCompleteChar: '█',
    barIncompleteChar: '░',
    stream: process.stderr,
    hideCursor: true,
    clearOnComplete: true,
    linewrap: false,
    // The search watches for Ctrl-C itself.
    gracefulExit: false,
  });
  shown.start(candidates, 0, { best: 'looking everywhere' });
  return {
    show: (progress) =>
      shown.update(Math.min(candidates, progress.evaluations), { best: bestText(progress) }),
    close: () => shown.stop(),
  };
}

function lines(): ProgressDisplay {
  let last = performance.now();
  return {
    show(progress) {
      const now = performance.now();
      if (now - last < LINE_INTERVAL) return;
      last = now;
      const { evaluations, candidates } = progress;
      process.stderr.write(`tried ${evaluations} of ${candidates} candidates; ${bestText(progress)}\n`);
    },
    close() {},
  };
}

function bestText({ best }: Progress): string {
  if (best === null) return 'nothing drawn yet';
  const { correction, snr } = best.scores;
  return `best ${best.variant}: ${percentText(correction.worst)}, ${timeText(snr.time_s)}`;
}
