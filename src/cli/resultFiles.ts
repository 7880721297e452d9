import { packageVersion } from '../base/version.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { renderReport } from '../report/renderReport.ts';
import type { ReportInput } from '../report/reportInput.ts';
import { designToJson } from '../run/designJson.ts';
import { endingText } from '../run/ending.ts';
import { frontCsv } from '../run/frontCsv.ts';
import { jsonText } from '../run/jsonText.ts';
import type { OpenedBrief } from '../run/openBrief.ts';
import type { SearchJson } from '../run/results.ts';
import type { SearchResult } from '../run/search.ts';
import type { TextFile } from '../run/writeWhole.ts';
import { SEARCH_FINENESS } from '../score/fineness.ts';
import { Judge } from '../score/judge.ts';
import { DRAWING_FORMATS, drawAs, rankedDrawing } from './designDrawing.ts';

/** The files of a results folder. */
export function resultFiles(
  opened: OpenedBrief,
  result: SearchResult,
  json: SearchJson,
  workers: number,
): TextFile[] {
  const { brief } = opened;
  const { designs } = result;
  const judge = new Judge(brief.task, SEARCH_FINENESS);
  return [
    { path: 'front.json', text: jsonText(json) },
    { path: 'front.csv', text: frontCsv(designs) },
    { path: 'report.html', text: renderReport(reportInput(opened, result, json.warnings)) },
    { path: 'run.json', text: jsonText(runRecord(opened, result, json.warnings, workers)) },
    ...designs.flatMap((design) => {
      const drawing = rankedDrawing(brief.title, design, judge);
      return [
        ...DRAWING_FORMATS.map((format) => ({
          path: `drawings/${design.id}.${format}`,
          text: drawAs(format, drawing),
        })),
        { path: `drawings/${design.id}.json`, text: jsonText(designToJson(design)) },
      ];
    }),
  ];
}

/** What it takes to make the same run again, and what depends on the machine. */
function runRecord(
  { brief, text, file }: OpenedBrief,
  { evaluations, seconds, stopped }: SearchResult,
  warnings: readonly string[],
  workers: number,
) {
  return {
    rimwright: packageVersion(),
    node: process.version,
    ...brief.search,
    workers,
    evaluations,
    seconds,
    stopped,
    brief: { file, text },
    defaults: brief.defaults,
    warnings,
  };
}

function reportInput(
  { brief, text }: OpenedBrief,
  { designs, evaluations, ending }: SearchResult,
  warnings: readonly string[],
): ReportInput {
  const { light, medium, placement, target, shop } = brief.task;
  return {
    title: brief.title,
    briefText: text,
    defaults: brief.defaults,
    warnings,
    designs: designs.map(({ shop: { fits, notes }, scores, ...design }) => ({
      ...design,
      scores: { ...scores, shop: { fits: shop === null ? null : fits, notes } },
    })),
    wavelengthMediumM: light.wavelengthM / refractiveIndex(medium, light.wavelengthM)[0],
    offsetM: placement.offsetM,
    targetCorrection: target.correction,
    evaluations,
    ending: endingText(ending, evaluations, brief.search.candidates),
    hints: ending.hints,
    seed: brief.search.seed,
    candidates: brief.search.candidates,
    version: packageVersion(),
  };
}
