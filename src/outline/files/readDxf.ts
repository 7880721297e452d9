import { inputError } from '../../base/errors.ts';
import type { ReadOutline } from './drawnOutline.ts';
import { drawingSize, outlineOf } from './drawnOutline.ts';
import type { DrawnElement, DrawnPath } from './drawnPath.ts';
import { problemAt, refuseAt } from './drawnPath.ts';
import { dxfCurves } from './dxfCurves.ts';
import type { DxfEntity, DxfFile } from './dxfGroups.ts';
import { readDxfGroups } from './dxfGroups.ts';
import { joinPaths } from './joinPaths.ts';
import type { LengthUnit } from './lengthUnit.ts';
import { LENGTH_UNITS } from './lengthUnit.ts';

/** `$INSUNITS` by its code, in metres: inches, feet, mm, cm, m, microinches, mils, ångström, nm, µm, dm. */
const INSUNITS: Record<number, number> = {
  1: 0.0254,
  2: 0.3048,
  4: 1e-3,
  5: 1e-2,
  6: 1,
  8: 2.54e-8,
  9: 2.54e-5,
  11: 1e-10,
  12: 1e-9,
  13: 1e-6,
  14: 0.1,
};

/** Entities that are read by people, and layers of our own drawings that hold no outline. */
const REMARKS = ['TEXT', 'MTEXT', 'DIMENSION', 'LEADER', 'MULTILEADER', 'POINT', 'ATTDEF', 'VIEWPORT'];
const REMARK_LAYERS = ['CENTRE', 'NOTES', 'DEFPOINTS'];
const OWN_LAYER = /^ELEMENT_(\d{1,4})(_HOLES)?$/;
const OWN_WEIGHT = /^ELEMENT_(\d{1,4}): weight ([+−-]?\d*\.?\d+(?:e[+-]?\d+)?)(?:,|$)/;

/**
 * Reads an outline from a DXF text: circles, arcs, lines, polylines with bulges, ellipses and splines of the model space, which
 * close on themselves or form chains. Curves inside others are holes. Text, dimensions and points are passed over, and the layers
 * CENTRE and NOTES of our own drawings; their layers ELEMENT_1, ELEMENT_2, … are elements with the weights that the notes tell.
 *
 * @param unit for files that state none
 * @throws RimwrightError `input` for files without unit, other entities, open curves, and what `outlineOf` refuses
 */
export function readDxf(text: string, file: string, unit: LengthUnit | null): ReadOutline {
  const dxf = readDxfGroups(text, file);
  const unitM = unitOf(dxf, file, unit);
  const drawn = dxf.entities.filter((entity) => isDrawn(entity));
  const paths = drawn.flatMap((entity) => {
    const place = { name: `the ${entity.type} in line ${entity.line}`, line: entity.line };
    const curves = dxfCurves(entity, place, unitM, file);
    return curves.length === 0 ? [] : [{ layer: firstValue(entity, 8), path: { curves, place } }];
  });
  const sizeM = drawingSize(
    paths.map(({ path }) => path),
    file,
  );
  const elements = elementsOf(paths, dxf, file).map(({ weight, loops }) => ({
    weight,
    loops: joinPaths(loops, sizeM, file),
  }));
  return { elements: outlineOf(elements, file), notes: [] };
}

function unitOf({ units }: DxfFile, file: string, unit: LengthUnit | null): number {
  if (units !== null && units.code !== 0) {
    const unitM = INSUNITS[units.code];
    if (unitM !== undefined) return unitM;
    refuseAt(
      file,
      units,
      `the unit ${units.code} of $INSUNITS`,
      '4 for mm, 13 for um, 5 for cm, 6 for m, 1 for in',
    );
  }
  if (unit !== null) return LENGTH_UNITS[unit];
  const expected = '$INSUNITS in its header (4 for mm), or --unit mm';
  throw inputError([problemAt(file, units ?? {}, 'a drawing without unit', expected)]);
}

/** Whether an entity may be part of the outline: in the model space, and no remark. */
function isDrawn(entity: DxfEntity): boolean {
  const isRemark =
    REMARKS.includes(entity.type) || REMARK_LAYERS.includes(firstValue(entity, 8).toUpperCase());
  return !isRemark && firstValue(entity, 67) !== '1';
}

function firstValue({ groups }: DxfEntity, code: number): string {
  return groups.find((group) => group.code === code)?.value ?? '';
}

/** All paths are one element, unless their layers are those of our own drawings of several. */
function elementsOf(
  paths: readonly { layer: string; path: DrawnPath }[],
  { entities }: DxfFile,
  file: string,
): DrawnElement[] {
  const numbers = paths.map(({ layer }) => Number(OWN_LAYER.exec(layer)?.[1] ?? Number.NaN));
  const distinct = [...new Set(numbers)].sort((a, b) => a - b);
  const isOwn = paths.length > 0 && numbers.every(Number.isFinite);
  const weights = weightsIn(entities);
  if (!isOwn || (distinct.length === 1 && weights.size === 0)) {
    return [{ weight: 1, loops: paths.map(({ path }) => path) }];
  }
  return distinct.map((number) => {
    const weight = weights.get(number);
    if (weight === undefined || weight === 0) {
      const expected = `a text "ELEMENT_${number}: weight +1" on the layer NOTES`;
      throw inputError([{ file, found: `no weight for the layer ELEMENT_${number}`, expected }]);
    }
    return { weight, loops: paths.filter((_, i) => numbers[i] === number).map(({ path }) => path) };
  });
}

function weightsIn(entities: readonly DxfEntity[]): Map<number, number> {
  const weights = new Map<number, number>();
  for (const entity of entities) {
    if (entity.type !== 'TEXT' || firstValue(entity, 8) !== 'NOTES') continue;
    const [, number, weight] = OWN_WEIGHT.exec(firstValue(entity, 1)) ?? [];
    if (number !== undefined) weights.set(Number(number), Number(weight.replace('−', '-')));
  }
  return weights;
}
