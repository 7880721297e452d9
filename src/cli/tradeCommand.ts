import { inputError } from '../base/errors.ts';
import { packageVersion } from '../base/version.ts';
import { drawHeatMap } from '../draw/heatMap.ts';
import { areaText, percentText, quantityText, timeText } from '../draw/quantityText.ts';
import { jsonText } from '../run/jsonText.ts';
import type { OpenedBrief } from '../run/openBrief.ts';
import { smallest } from '../run/search.ts';
import type { SearchRun } from '../run/searchRun.ts';
import type { Trade, TradeCell } from '../run/trade.ts';
import { tradeCsv, tradeToJson } from '../run/trade.ts';
import type { TradeGrid } from '../run/tradeGrid.ts';
import { tradeGrid } from '../run/tradeGrid.ts';
import type { TextFile } from '../run/writeWhole.ts';
import type { Measure } from '../score/aim.ts';
import { measureOf } from '../score/aim.ts';
import { worstOf } from '../score/scores.ts';
import { EXIT } from './exit.ts';
import { interruptible, uninterrupted } from './interrupt.ts';
import { note, print, printWrapped } from './notes.ts';
import type { ResumableOptions } from './resuming.ts';
import { keepingCheckpoint, noteResume, openRun } from './resuming.ts';
import { withProgress, workersOf } from './searching.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

const COMMAND = 'trade';
const STEPS = 4;

interface Options extends ResumableOptions {
  over?: string;
  steps?: number;
  by?: Measure;
}

/** What a trade is asked besides its brief. */
interface Asked {
  grid: TradeGrid;
  by: Measure;
}

/** Runs `rimwright trade` and gives its exit code. */
export async function run(place: string | undefined, options: Options): Promise<number> {
  const { over, steps, by } = options;
  const run = await openRun(COMMAND, place, options, (opened) => ask(opened, options), {
    '--over': over,
    '--steps': steps,
    '--by': by,
  });
  const { opened, folder, asked } = run;
  let stopped = false;
  const cells = await keepingCheckpoint(run, COMMAND, options, () =>
    interruptible(async (signal) => {
      const found = await searchCells(run, options, signal);
      stopped = signal.aborted;
      return found;
    }),
  );
  const trade: Trade = { axes: asked.grid.axes, by: asked.by, cells };
  if (options.json) print(jsonText(tradeToJson(opened, trade, stopped)));
  else printTrade(trade);
  if (stopped) {
    noteResume(folder, COMMAND);
  } else {
    uninterrupted(() => run.write(tradeFiles(opened, trade, options), true));
    const text = `Written to ${folder}/`;
    if (!options.json) print(`\n${text}\n  trade.csv  trade.json  trade.svg  run.json`);
    else if (!options.quiet) note(text);
  }
  return cells.some(({ result }) => result.design !== null) ? EXIT.done : EXIT.target;
}

async function ask(opened: OpenedBrief, { over, steps, by }: Options): Promise<Asked> {
  if (over === undefined) {
    throw inputError([{ key: '--over', found: 'none', expected: 'two keys of the brief: distance,offset' }]);
  }
  return { grid: await tradeGrid(opened, over, steps ?? STEPS), by: by ?? 'time' };
}

/** One search for each pair of values; those that an interruption leaves unfinished are left out. */
async function searchCells(
  run: SearchRun<Asked>,
  options: Options,
  signal: AbortSignal,
): Promise<TradeCell[]> {
  const { grid, by } = run.asked;
  const [first, second] = grid.axes;
  const cells: TradeCell[] = [];
  for (const [i, brief] of grid.briefs.entries()) {
    const values: [string, string] = [
      first.values[Math.floor(i / second.values.length)],
      second.values[i % second.values.length],
    ];
    const title = `${i + 1} of ${grid.briefs.length}, ${first.key} ${values[0]}, ${second.key} ${values[1]}`;
    const result = await withProgress(
      { ...brief, title },
      options,
      signal,
      run.memory(`pair-${i}`),
      (course) => smallest(brief, by, course),
    );
    if (signal.aborted) break;
    cells.push({ values, result });
  }
  return cells;
}

function tradeFiles(opened: OpenedBrief, trade: Trade, options: Options): TextFile[] {
  const json = tradeToJson(opened, trade, false);
  const [across, up] = trade.axes;
  const numbers = across.values.map((_, i) =>
    up.values.map((_, j) => {
      const { design } = trade.cells[i * up.values.length + j].result;
      return design && measureOf(design.scores, trade.by);
    }),
  );
  const map = drawHeatMap({
    title: opened.brief.title,
    quantity: `Least ${trade.by} that meets the target`,
    across: { title: across.key, values: across.values },
    up: { title: up.key, values: up.values },
    numbers,
    textOf: (value) => measureText(value, trade.by),
  });
  const { brief, text, file } = opened;
  const record = {
    rimwright: packageVersion(),
    node: process.version,
    ...brief.search,
    workers: workersOf(options),
    seconds: json.seconds,
    by: trade.by,
    over: trade.axes,
    brief: { file, text },
    defaults: brief.defaults,
  };
  return [
    { path: 'trade.json', text: jsonText(json) },
    { path: 'trade.csv', text: tradeCsv(trade) },
    { path: 'trade.svg', text: map },
    { path: 'run.json', text: jsonText(record) },
  ];
}

function printTrade({ axes, by, cells }: Trade): void {
  const shown = ({ result }: TradeCell) => result.design ?? result.nearest;
  const of = (text: (design: NonNullable<ReturnType<typeof shown>>) => string) => (cell: TradeCell) => {
    const design = shown(cell);
    return design === null ? '–' : text(design);
  };
  const columns: Column<TradeCell>[] = [
    ...axes.map(({ key }, i) => ({ title: key.split('.'), cell: ({ values }: TradeCell) => values[i] })),
    { title: ['time'], cell: of(({ scores }) => timeText(scores.snr.time_s)) },
    { title: ['radius'], cell: of(({ scores }) => quantityText(scores.radius_m, 'm')) },
    { title: ['worst'], cell: of(({ scores }) => percentText(worstOf(scores))) },
    { title: ['family'], cell: of(({ family }) => family), align: 'left' },
    { title: ['target'], cell: ({ result }) => (result.design === null ? 'no' : 'met') },
  ];
  if (cells.length > 0) print(`${table(columns, cells)}\n\n`);
  const met = cells.filter(({ result }) => result.design !== null).length;
  printWrapped(`The least by ${by}: ${met} of ${cells.length} pairs have a design that meets the target.`);
}

function measureText(value: number, by: Measure): string {
  switch (by) {
    case 'time':
      return timeText(value);
    case 'radius':
      return quantityText(value, 'm');
    case 'area':
    case 'cost':
      return areaText(value);
  }
}
