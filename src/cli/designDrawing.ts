import type { Drawing } from '../draw/drawing.ts';
import { drawDxf } from '../draw/dxf.ts';
import { percentText, quantityText } from '../draw/quantityText.ts';
import { drawSvg } from '../draw/svg.ts';
import { designHash } from '../run/designHash.ts';
import type { GivenDesign } from '../run/givenDesign.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { worstOf } from '../score/scores.ts';

export const DRAWING_FORMATS = ['dxf', 'svg'] as const;
export type DrawingFormat = (typeof DRAWING_FORMATS)[number];

/** The text of a drawing file. */
export function drawAs(format: DrawingFormat, drawing: Drawing): string {
  return format === 'dxf' ? drawDxf(drawing) : drawSvg(drawing);
}

/** A drawing of a design that a search found, with what its maker should know. */
export function rankedDrawing(title: string, design: RankedDesign): Drawing {
  const { id, distanceM, elements, scores, shop } = design;
  const gain = Number(scores.gain.toPrecision(5));
  return {
    title: `${title}: ${id}`,
    elements,
    distanceM,
    hash: designHash(distanceM, elements),
    notes: [
      `Radius ${quantityText(scores.radius_m, 'm')}, worst correction ${percentText(worstOf(scores))}, gain ${gain}`,
      ...shop.notes,
    ],
  };
}

/** A drawing of an outline from a file. Its scores depend on a brief, so the sheet does not tell them. */
export function givenDrawing({ id, elements }: GivenDesign, distanceM: number): Drawing {
  return { title: id, elements, distanceM, hash: designHash(distanceM, elements), notes: [] };
}
