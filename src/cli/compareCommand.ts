import type { Problem } from '../base/errors.ts';
import { inputError, RimwrightError } from '../base/errors.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { DesignChoice } from '../run/chooseDesign.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import { designToJson } from '../run/designJson.ts';
import { jsonText } from '../run/jsonText.ts';
import { judgeOutline } from '../run/judgeOutline.ts';
import type { OpenedBrief } from '../run/openBrief.ts';
import { openBrief } from '../run/openBrief.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { rankGiven, scoreGiven } from '../run/scoreGiven.ts';
import { outlineOf, present, readingWarnings } from '../run/warnings.ts';
import type { Task } from '../score/task.ts';
import { DESIGN_COLUMNS, MEETS_COLUMN, shopColumn } from './designColumns.ts';
import { EXIT } from './exit.ts';
import { noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readDistance } from './quantityOptions.ts';
import { table } from './table.ts';

/** A design and the file that it came from. */
type Compared = RankedDesign & { file: string };

/** Runs `rimwright compare` and gives its exit code. */
export async function run(
  place: string,
  files: readonly string[],
  options: { design: readonly string[]; unit?: LengthUnit; distance?: string; exact?: true; json?: true },
): Promise<number> {
  const distance = await readDistance(options.distance);
  const unit = options.unit === undefined ? {} : { unit: options.unit };
  const choices = [
    ...files.map((outline) => ({ outline, ...unit })),
    ...options.design.map((design) => ({ design })),
  ];
  if (choices.length === 0) {
    const expected = "files, or --design ID for designs of the brief's own results";
    throw inputError([{ key: 'files', found: 'nothing to compare', expected }]);
  }
  const opened = await openBrief(place);
  const { brief } = opened;
  const { task } = brief;
  const wanted = options.exact ? 'exact' : 'far';
  const compared = scoreAll(opened, choices, distance, wanted);
  const designs = rankGiven(compared.designs);
  const warnings = present([...compared.warnings, ...readingWarnings(task, wanted, designs.map(outlineOf))]);
  if (!options.json) noteDefaults(brief.defaults);
  warn(warnings);
  if (options.json) {
    const plain = designs.map((design) => ({ file: design.file, ...designToJson(design) }));
    print(jsonText({ brief, designs: plain, warnings }));
  } else printComparison(designs, task);
  return EXIT.done;
}

/** Scores every file. Where some are broken, all of their messages come together, and no scores. */
function scoreAll(
  opened: OpenedBrief,
  choices: readonly DesignChoice[],
  distance: number | null,
  fields: Fields,
): { designs: Compared[]; warnings: string[] } {
  const { task } = opened.brief;
  const problems: Problem[] = [];
  const designs: Compared[] = [];
  const warnings: string[] = [];
  for (const choice of choices) {
    try {
      const { given, warnings: ofResults } = chooseDesign(opened, choice);
      const judged = judgeOutline(task, given, distance, null, fields);
      designs.push({ ...scoreGiven(task, given, judged), file: given.file });
      warnings.push(...ofResults);
    } catch (error) {
      if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
      problems.push(...error.problems);
    }
  }
  if (problems.length > 0) throw inputError(problems);
  return { designs, warnings };
}

function printComparison(designs: readonly Compared[], task: Task): void {
  const { worst, rms, gain, lobe, snr, time, area } = DESIGN_COLUMNS;
  const place = { title: [], cell: ({ rank }: Compared) => String(rank) };
  const name = {
    title: ['design'],
    cell: ({ id }: Compared) => id,
    align: 'left' as const,
    flexible: true,
  };
  print(
    table(
      [place, name, worst, rms, gain, lobe, snr, time, area, shopColumn(task.shop !== null), MEETS_COLUMN],
      designs,
    ),
  );
  print('');
  const width = String(designs.length).length;
  for (const { rank, file, shop } of designs) {
    const [note] = shop.notes;
    printWrapped(note === undefined ? file : `${file}: ${note}`, `${String(rank).padStart(width)}  `);
  }
}
