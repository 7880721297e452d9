import { inputError } from '../../base/errors.ts';
import type { Curve, Point } from './curve.ts';
import { straight } from './curve.ts';
import type { ReadOutline } from './drawnOutline.ts';
import { outlineOf } from './drawnOutline.ts';
import type { DrawnPath } from './drawnPath.ts';
import { gdsCells } from './gdsCells.ts';
import { flattenGds } from './gdsFlatten.ts';
import { readGdsRecords } from './gdsRecords.ts';
import { joinBoundaries } from './joinBoundaries.ts';

/** Property of a boundary that holds its element's weight, in our own files. */
const WEIGHT_PROPERTY = 1;
const WEIGHT = /^weight ([+-]?\d*\.?\d+(?:e[+-]?\d+)?)$/;

/**
 * Reads an outline from a GDSII stream: the polygons of its top cell and of the cells within it. Polygons that share edges are joined,
 * which undoes keyholes. A layer is an element; where there are several, the boundaries' property 1 must tell their weights, as
 * `weight -1`. Texts are passed over.
 *
 * @throws RimwrightError `input` for bytes that are no stream, paths and boxes, more than one top cell, several layers without weights,
 *   and what `outlineOf` refuses
 */
export function readGds(bytes: Uint8Array, file: string): ReadOutline {
  const library = gdsCells(readGdsRecords(bytes, file), file);
  const { top, boundaries } = flattenGds(library, file);
  const layers = [...new Set(boundaries.map(({ layer }) => layer))].sort((a, b) => a - b);
  const elements = layers.map((layer) => {
    const own = boundaries.filter((boundary) => boundary.layer === layer);
    const name = `layer ${layer} of the cell ${JSON.stringify(top)}`;
    const text = own[0].properties.get(WEIGHT_PROPERTY) ?? '';
    const told = WEIGHT.exec(text)?.[1];
    const weight = told === undefined && layers.length === 1 ? 1 : Number(told ?? 0);
    if (weight === 0) {
      const expected = 'one layer, or the property 1 of each boundary, such as "weight -1"';
      throw inputError([{ file, found: `${layers.length} layers, and no weight for ${name}`, expected }]);
    }
    const rings = joinBoundaries(own.map(({ points }) => points));
    return { weight, loops: rings.map((ring): DrawnPath => pathOf(ring, library.unitM, name)) };
  });
  return { elements: outlineOf(elements, file), notes: [] };
}

function pathOf(ring: Float64Array, unitM: number, name: string): DrawnPath {
  const count = ring.length / 2;
  const point = (k: number): Point => [ring[2 * (k % count)] * unitM, ring[2 * (k % count) + 1] * unitM];
  const curves = Array.from({ length: count }, (_, k): Curve => straight(point(k), point(k + 1)));
  return { curves, place: { name } };
}
