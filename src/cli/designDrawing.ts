import { outlineCsv } from '../draw/csv.ts';
import type { Drawing } from '../draw/drawing.ts';
import { checkDrawing } from '../draw/drawing.ts';
import { drawDxf } from '../draw/dxf.ts';
import { drawGds } from '../draw/gds.ts';
import { percentText, quantityText } from '../draw/quantityText.ts';
import { drawSvg } from '../draw/svg.ts';
import { designHash } from '../run/designHash.ts';
import { outlineToJson } from '../run/designJson.ts';
import type { GivenDesign } from '../run/givenDesign.ts';
import { jsonText } from '../run/jsonText.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { edgeSensitivities } from '../score/edgeSensitivity.ts';
import type { Judge } from '../score/judge.ts';
import { worstOf } from '../score/scores.ts';
import { criticalEdges, shopFacts } from './sheetFacts.ts';

/** Drawings that a results folder holds of each design. */
export const DRAWING_FORMATS = ['dxf', 'svg', 'gds'] as const;
type DrawingFormat = (typeof DRAWING_FORMATS)[number];

/** All that an outline may be written to. */
export const FILE_FORMATS = [...DRAWING_FORMATS, 'csv', 'json'] as const;
export type FileFormat = (typeof FILE_FORMATS)[number];

/** The content of a drawing file. */
export function drawAs(format: DrawingFormat, drawing: Drawing): string | Uint8Array {
  const makers = { dxf: drawDxf, svg: drawSvg, gds: drawGds };
  return makers[format](drawing);
}

/** A drawing of a design that a search found, with what its maker should know. */
export function rankedDrawing(title: string, design: RankedDesign, judge: Judge): Drawing {
  const { id, scores, shop } = design;
  const gain = Number(scores.gain.toPrecision(5));
  const worst = percentText(worstOf(scores));
  const drawing = givenDrawing({ ...design, id: `${title}: ${id}` }, design.distanceM, judge);
  return {
    ...drawing,
    notes: [
      `Radius ${quantityText(scores.radius_m, 'm')}, worst correction ${worst}, gain ${gain}`,
      ...drawing.notes,
      ...shop.notes,
    ],
  };
}

/**
 * A drawing of an outline from a file. Its scores depend on a brief, so the sheet does not tell them.
 *
 * @param judge of the brief, where there is one: then the sheet names the shop's rules and the critical edges
 */
export function givenDrawing(
  { id, elements }: Pick<GivenDesign, 'id' | 'elements'>,
  distanceM: number,
  judge: Judge | null,
): Drawing {
  const plain = { title: id, elements, distanceM, hash: designHash(distanceM, elements) };
  if (judge === null) return { ...plain, facts: [], notes: [] };
  const { shop } = judge.task;
  const sensitivities = edgeSensitivities(judge, elements, distanceM);
  return {
    ...plain,
    facts: shopFacts(shop),
    notes: criticalEdges(sensitivities, elements, shop?.edgeToleranceM ?? 0),
  };
}

/** The content of any file that an outline may be written to; `drawing` is its own. */
export function drawGiven(format: FileFormat, drawing: Drawing, given: GivenDesign): string | Uint8Array {
  if (format !== 'csv' && format !== 'json') return drawAs(format, drawing);
  checkDrawing(drawing);
  return format === 'csv' ? outlineCsv(given.elements) : jsonText(outlineToJson(given, drawing.distanceM));
}
