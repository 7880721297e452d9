import type { Problem } from '../base/errors.ts';
import { inputError, RimwrightError } from '../base/errors.ts';
import { countText, percentText } from '../draw/quantityText.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Brief } from '../run/brief.ts';
import type { DesignChoice } from '../run/chooseDesign.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import { designToJson } from '../run/designJson.ts';
import { jsonText } from '../run/jsonText.ts';
import { judgeOutline } from '../run/judgeOutline.ts';
import type { OpenedBrief } from '../run/openBrief.ts';
import { openBrief } from '../run/openBrief.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { recommend } from '../run/recommend.ts';
import { rankGiven, scoreGiven } from '../run/scoreGiven.ts';
import { outlineOf, present, readingWarnings } from '../run/warnings.ts';
import { yieldOf } from '../run/yieldOf.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import { DESIGN_COLUMNS, MEETS_COLUMN, percentCell, shopColumn } from './designColumns.ts';
import { EXIT } from './exit.ts';
import { noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readDistance } from './quantityOptions.ts';
import { table } from './table.ts';

/** A design, the file that it came from, and the share of its builds that meet the target where that was worked out. */
type Compared = RankedDesign & { file: string; yield?: number };

interface Options {
  design: readonly string[];
  unit?: LengthUnit;
  distance?: string;
  /** Of each design that meets the target; 0 for none. */
  builds: number;
  exact?: true;
  json?: true;
}

/** Runs `rimwright compare` and gives its exit code. */
export async function run(place: string, files: readonly string[], options: Options): Promise<number> {
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
  const designs = rankGiven(await withYields(compared.designs, brief, options.builds));
  const recommended = recommend(designs, task);
  const warnings = present([...compared.warnings, ...readingWarnings(task, wanted, designs.map(outlineOf))]);
  if (!options.json) noteDefaults(brief.defaults);
  warn(warnings);
  if (options.json) {
    const plain = designs.map((design) => ({
      file: design.file,
      ...designToJson(design),
      ...(design.yield !== undefined && { yield: design.yield }),
    }));
    print(jsonText({ brief, designs: plain, recommended, warnings }));
  } else {
    printComparison(designs, task);
    print('');
    const { id, reason } = recommended;
    printWrapped(id === null ? `No recommendation: ${reason}.` : `Recommended: ${id}, since ${reason}.`);
  }
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

/** The yield of each design that meets the target as drawn: of the others next to no build does. */
async function withYields(
  designs: readonly Compared[],
  { task, tolerances }: Brief,
  builds: number,
): Promise<Compared[]> {
  const found: Compared[] = [];
  for (const design of designs) {
    if (builds === 0 || !design.meetsTarget) {
      found.push(design);
      continue;
    }
    const { fields } = design;
    const { yield: share } = await yieldOf(task, design, tolerances, { builds, fields, quick: true });
    found.push({ ...design, yield: share });
  }
  return found;
}

function printComparison(designs: readonly Compared[], task: Task): void {
  const { worst, gain, lobe, snr, time } = DESIGN_COLUMNS;
  const place = { title: [], cell: ({ rank }: Compared) => String(rank) };
  const name = {
    title: ['design'],
    cell: ({ id }: Compared) => id,
    align: 'left' as const,
    flexible: true,
  };
  const drawn = {
    title: ['drawn', '%'],
    cell: ({ asDrawn, scores }: Compared) => percentCell(asDrawn?.worst ?? worstOf(scores)),
  };
  const cut = { ...worst, title: ['as cut', '%'] };
  const share = {
    title: ['yield', '%'],
    cell: (design: Compared) => (design.yield === undefined ? '–' : countText(100 * design.yield)),
  };
  const hasShop = task.shop !== null;
  const corrections = hasShop ? [drawn, cut] : [worst];
  print(
    table(
      [place, name, ...corrections, gain, lobe, snr, time, share, shopColumn(hasShop), MEETS_COLUMN],
      designs,
    ),
  );
  print('');
  const width = String(designs.length).length;
  for (const { rank, file, shop, asDrawn } of designs) {
    const [note] = shop.notes;
    const drawn = asDrawn && `; as drawn it would read within ${percentText(asDrawn.worst)}`;
    printWrapped(
      note === undefined ? file : `${file}: ${note}${drawn ?? ''}`,
      `${String(rank).padStart(width)}  `,
    );
  }
}
