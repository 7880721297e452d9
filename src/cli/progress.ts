import { MultiBar } from 'cli-progress';
import { percentText, quantityText, timeText } from '../draw/quantityText.ts';
import type { Progress } from '../run/progress.ts';
import { durationText } from './durationText.ts';

/** Shows how far a search has come, on standard error. */
export interface ProgressDisplay {
  show(progress: Progress): void;
  close(): void;
}

/** Milliseconds between two lines where no terminal redraws them. */
const LINE_INTERVAL = 10_000;

/** A bar with a line for each family on a terminal, now and then a line anywhere else, and nothing where `quiet`. */
export function openProgress(candidates: number, quiet: boolean): ProgressDisplay {
  if (quiet) return { show() {}, close() {} };
  return process.stderr.isTTY ? bars(candidates) : lines();
}

/** Widths of the columns family, correction, time and radius. */
const COLUMNS = [10, 12, 12, 12];

function bars(candidates: number): ProgressDisplay {
  const all = new MultiBar({
    barsize: 20,
    barCompleteChar: '█',
    barIncompleteChar: '░',
    stream: process.stderr,
    hideCursor: true,
    clearOnComplete: true,
    linewrap: false,
    // The search watches for Ctrl-C itself.
    gracefulExit: false,
    emptyOnZero: true,
  });
  const bar = all.create(candidates, 0, { times: '' }, { format: '{bar} {value} of {total}  {times}' });
  const row = (text: string) => all.create(1, 0, { text }, { format: '{text}' });
  const rows = new Map([['', row(rowText(['best of', 'correction', 'time', 'radius']))]]);
  return {
    show(progress) {
      bar.update(Math.min(candidates, progress.evaluations), { times: timesText(progress) });
      for (const { family, best } of progress.families) {
        const cells = best === null ? ['–', '–', '–'] : numbersOf(best);
        const text = rowText([family, ...cells]);
        const held = rows.get(family);
        if (held === undefined) rows.set(family, row(text));
        else held.update(0, { text });
      }
    },
    close: () => all.stop(),
  };
}

function lines(): ProgressDisplay {
  let last = performance.now();
  return {
    show(progress) {
      const now = performance.now();
      if (now - last < LINE_INTERVAL) return;
      last = now;
      process.stderr.write(`${lineText(progress)}\n`);
    },
    close() {},
  };
}

/** `12000 of 20000 candidates, 9 s, about 6 s to go; best rings-2: 0.9 %, 325 µs, 82.2 µm; disc 3 %, …` in one line. */
export function lineText(progress: Progress): string {
  const { evaluations, candidates, best, families } = progress;
  const drawn = families.flatMap((one) =>
    one.best === null ? [] : [`${one.family} ${numbersOf(one.best).join(' ')}`],
  );
  return [
    `${evaluations} of ${candidates} candidates, ${timesText(progress)}`,
    ...(best === null ? ['nothing drawn yet'] : [`best ${best.variant}`, ...drawn]),
  ].join('; ');
}

function timesText({ phase, elapsedS, remainingS }: Progress): string {
  if (phase === 'judging') return `${durationText(elapsedS)}, judging the best finely`;
  const left = remainingS === null ? '' : `, about ${durationText(remainingS)} to go`;
  return `${durationText(elapsedS)}${left}`;
}

function rowText(cells: readonly string[]): string {
  return cells.map((cell, i) => cell.padEnd(COLUMNS[i])).join('');
}

function numbersOf({ scores }: NonNullable<Progress['best']>): string[] {
  const { correction, snr, radius_m } = scores;
  return [percentText(correction.worst), timeText(snr.time_s), quantityText(radius_m, 'm')];
}
