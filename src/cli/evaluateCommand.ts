import { dirname } from 'node:path';
import { formatQuantity } from '../base/quantity.ts';
import { plainText } from '../draw/plainText.ts';
import { countText, percentText } from '../draw/quantityText.ts';
import type { EvaluatedReading } from '../metrology/evaluatePowers.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import type { Evaluation } from '../run/evaluateData.ts';
import { evaluateData } from '../run/evaluateData.ts';
import { evaluationCsv } from '../run/evaluationCsv.ts';
import { instrumentOf } from '../run/instrument.ts';
import { jsonText } from '../run/jsonText.ts';
import { openBrief } from '../run/openBrief.ts';
import { readPowersCsv } from '../run/readPowersCsv.ts';
import { readTextFile } from '../run/readTextFile.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { sphereKind } from '../run/sphereLike.ts';
import { readingWarnings } from '../run/warnings.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import { withUncertainty } from './areaWithUncertainty.ts';
import { evaluationJson } from './evaluationJson.ts';
import { EXIT } from './exit.ts';
import { fitTable, fitText } from './fitText.ts';
import { uninterrupted } from './interrupt.ts';
import { namedColumns, readOmitted, readSaturation } from './measuringOptions.ts';
import { note, noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readCoverage, readDistance } from './quantityOptions.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

interface Options {
  data: string;
  outline?: string;
  design?: string;
  unit?: LengthUnit;
  distance?: string;
  without?: string;
  with?: string;
  columnUnit?: string;
  material?: string;
  saturation?: string;
  coverage: string;
  outlier: number;
  omit?: string;
  keepGain?: true;
  exact?: true;
  csv?: string;
  force?: true;
  json?: true;
}

/** A day of counting: 100 000 rows of a few numbers. */
const MOST_BYTES = 20_000_000;
/** Rows that a terminal is filled with; the file has them all. */
const MOST_SHOWN = 40;
const MOST_REASONS = 20;

/** Runs `rimwright evaluate` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const { csv, data } = options;
  const distance = await readDistance(options.distance);
  const coverage = await readCoverage(options.coverage);
  const omit = readOmitted(options.omit);
  const named = namedColumns(options);
  if (csv !== undefined) {
    prepareFolder(dirname(csv));
    if (!options.force) refuseExisting([csv]);
  }
  const opened = await openBrief(place);
  const { brief } = opened;
  const { task } = brief;
  const { responsivityAW } = task.detector;
  const saturationW = await readSaturation(options.saturation, responsivityAW);
  const { readings, unused } = readPowersCsv(readTextFile(data, MOST_BYTES), data, responsivityAW, named);
  const { given, warnings: ofResults } = chooseDesign(opened, options);
  const fields = options.exact ? 'exact' : 'far';
  const kind = sphereKind(task, options.material);
  const built = instrumentOf(brief, given, distance, fields);
  const { outlier: limit, keepGain = false } = options;
  const evaluation = evaluateData(built, readings, { coverage, saturationW, kind, limit, omit, keepGain });
  const warnings = [
    ...ofResults,
    ...readingWarnings(task, fields, [built]),
    ...evaluation.warnings,
    ...(unused.length === 0 ? [] : [`Columns that were not used: ${unused.slice(0, 12).join(', ')}`]),
  ];
  if (csv !== undefined) {
    const file = { path: csv, text: evaluationCsv(evaluation) };
    uninterrupted(() => writeWhole([file], options.force ?? false));
    note(`Written to ${csv}`);
  }
  if (!options.json) noteDefaults([...brief.defaults, ...brief.uncertaintyDefaults]);
  warn(warnings);
  if (options.json) {
    print(jsonText({ data, design: given.id, fields, ...evaluationJson(evaluation), brief, warnings }));
  } else printEvaluation(evaluation, data, given.file, csv !== undefined);
  return EXIT.done;
}

function printEvaluation(evaluation: Evaluation, data: string, design: string, isWritten: boolean): void {
  const { rows, fit, gain, coverage, curve } = evaluation;
  const [value, uncertainty] = withUncertainty(gain.value, gain.standardUncertainty);
  const known = gain.standardUncertainty > 0 ? ` ± ${uncertainty} (one standard uncertainty)` : '';
  const origin = gain.isFitted ? 'fitted to reference spheres' : "the design's";
  printWrapped(
    `${data} with ${design}: ${rows.length} ${rows.length === 1 ? 'row' : 'rows'}, gain ${value}${known}, ${origin}. ` +
      `Uncertainties of rows have ${percentText(coverage)} coverage.` +
      (curve === null
        ? ''
        : ` Diameters are those of spheres of ${curve.material}, ` +
          `${[...new Set(curve.rangeM)].map((end) => formatQuantity(end, 'length')).join(' to ')} and a quarter beyond.`),
  );
  print('');
  print(table(COLUMNS, rows.slice(0, MOST_SHOWN)));
  print('');
  const how = isWritten ? 'the CSV has them all' : '--csv FILE writes them all';
  if (rows.length > MOST_SHOWN) printWrapped(`… and ${rows.length - MOST_SHOWN} more: ${how}.`);
  const several = rows.filter(({ diametersM }) => diametersM.length > 1).length;
  const count = (grade: EvaluatedReading['grade']) => rows.filter((row) => row.grade === grade).length;
  printWrapped(
    `${count('good')} good, ${count('doubtful')} doubtful, ${count('unusable')} unusable.` +
      (several === 0
        ? ''
        : ` ${several} ${several === 1 ? 'row fits' : 'rows fit'} more than one diameter, because extinction ripples: ` +
          'the interval holds them all, and CSV and JSON list them.'),
  );
  printReasons(rows);
  if (fit === null) return;
  print('');
  printWrapped(fitText(fit, gain.isFitted));
  print('');
  print(fitTable(fit));
}

/** Each reason with its rows: the table has no room for long ones. */
function printReasons(rows: readonly EvaluatedReading[]): void {
  const linesOf = new Map<string, number[]>();
  for (const { reasons, reading } of rows) {
    for (const reason of reasons) {
      const lines = linesOf.get(reason);
      if (lines === undefined) linesOf.set(reason, [reading.line]);
      else lines.push(reading.line);
    }
  }
  for (const [reason, lines] of [...linesOf].slice(0, MOST_REASONS)) {
    const more = lines.length > 8 ? `, … (${lines.length} lines)` : '';
    printWrapped(
      `${reason}: ${lines.length === 1 ? 'line' : 'lines'} ${lines.slice(0, 8).join(', ')}${more}`,
      '  ',
    );
  }
  if (linesOf.size > MOST_REASONS) print(`  … and ${linesOf.size - MOST_REASONS} reasons more`);
}

const MICRO = 1e6;

const COLUMNS: readonly Column<EvaluatedReading>[] = [
  { title: ['line'], cell: ({ reading }) => String(reading.line) },
  { title: ['label'], cell: ({ reading }) => plainText(reading.label).slice(0, 16), align: 'left' },
  { title: ['extinction', 'µm²'], cell: ({ extinction }) => extinctionParts(extinction)[0] },
  { title: ['±', 'µm²'], cell: ({ extinction }) => extinctionParts(extinction)[1] },
  {
    title: ['diameter', 'µm'],
    cell: ({ diametersM }) =>
      diametersM.length === 0 ? '–' : diametersM.length > 1 ? 'several' : micrometres(diametersM[0]),
  },
  {
    title: ['from – to', 'µm'],
    cell: ({ diameterIntervalM }) => diameterIntervalM?.map(micrometres).join(' – ') ?? '–',
  },
  {
    title: ['grade'],
    cell: ({ grade, reasons }) => plainText([grade, ...reasons].join(': ')),
    align: 'left',
    flexible: true,
  },
];

function extinctionParts(extinction: EvaluatedReading['extinction']): [string, string] {
  if (extinction === null) return ['–', '–'];
  return withUncertainty(extinction.valueM2 * MICRO ** 2, extinction.expandedUncertaintyM2 * MICRO ** 2);
}

const micrometres = (lengthM: number) => countText(lengthM * MICRO);
