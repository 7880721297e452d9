import { inputError } from '../../base/errors.ts';
import type { Curve } from './curve.ts';
import type { ReadOutline } from './drawnOutline.ts';
import { drawingSize, outlineOf } from './drawnOutline.ts';
import type { DrawnPath, Place } from './drawnPath.ts';
import { quoted, refuseAt, refuseManyRings } from './drawnPath.ts';
import { filledParts } from './fillRule.ts';
import { joinPaths } from './joinPaths.ts';
import type { LengthUnit } from './lengthUnit.ts';
import { svgPathCurves } from './svgPath.ts';
import type { Attributes } from './svgShape.ts';
import { SVG_SHAPES, svgShapeData } from './svgShape.ts';
import { svgUserUnit } from './svgSize.ts';
import type { Matrix } from './svgTransform.ts';
import { moved, movedCurve, multiply, readTransform } from './svgTransform.ts';
import { walkSvg } from './svgTree.ts';

const GROUPS = ['svg', 'g', 'a'];
/** Elements that draw something which is not read. */
const REFUSED = ['use', 'image', 'foreignObject', 'switch'];
const INHERITED = ['fill', 'fill-rule', 'display', 'visibility'];

/** What an element hands on to those within it. */
interface Context {
  matrix: Matrix;
  /** Place of the origin, in metres on the sheet. */
  origin: readonly [number, number];
  style: Attributes;
  /** Within `<defs>` and the like nothing is drawn. */
  isShown: boolean;
}

interface DrawnShape {
  curves: Curve[][];
  place: Place;
  /** Number and weight of the element, in our own drawings. */
  element: { number: number; weight: number } | null;
}

/**
 * Reads an outline from an SVG text: paths and basic shapes, with nested transforms. y is turned over, since SVG's runs down. The origin
 * is that of the root's user space, or of a group marked `data-origin="axis"`, as in our own drawings; of these only the paths with
 * `data-element` and `data-weight` are taken. Parts of one filled shape follow its fill rule; one shape inside another is a hole.
 *
 * @param unit of the user unit, for drawings that state no size
 * @throws RimwrightError `input` for text that is no SVG, no size, elements that are not read, open curves, and what `outlineOf` refuses
 */
export function readSvg(text: string, file: string, unit: LengthUnit | null): ReadOutline {
  const { shapes, refusals, notes } = collectShapes(text, file, unit);
  const own = shapes.filter(({ element }) => element !== null);
  // What stands around the outline in our own drawings is for reading only.
  if (own.length === 0 && refusals.length > 0) {
    const [{ place, found }] = refusals;
    refuseAt(file, place, found, `only ${SVG_SHAPES.join(', ')}: turn it into paths`);
  }
  const taken = own.length > 0 ? own : shapes;
  const pathsOf = (shape: DrawnShape): DrawnPath[] =>
    shape.curves.map((curves) => ({ curves, place: shape.place }));
  const sizeM = drawingSize(taken.flatMap(pathsOf), file);
  const numbers = [...new Set(taken.map(({ element }) => element?.number ?? 1))].sort((a, b) => a - b);
  const elements = numbers.map((number) => {
    const within = taken.filter(({ element }) => (element?.number ?? 1) === number);
    const weight = within[0].element?.weight ?? 1;
    return { weight, loops: joinPaths(within.flatMap(pathsOf), sizeM, file) };
  });
  return { elements: outlineOf(elements, file), notes };
}

function collectShapes(text: string, file: string, unit: LengthUnit | null) {
  const shapes: DrawnShape[] = [];
  const refusals: { place: Place; found: string }[] = [];
  const notes: string[] = [];
  const stack: Context[] = [];
  walkSvg(text, file, {
    open(name, attributes, line) {
      const place = { name: `the ${name} in line ${line}`, line };
      const outer = stack[stack.length - 1];
      if (outer === undefined) {
        stack.push(rootContext(name, attributes, line));
        return;
      }
      const context = innerContext(outer, name, attributes, place, file);
      stack.push(context);
      if (name === 'style') notes.push(`${file}: the style sheet in line ${line} is passed over`);
      if (!context.isShown) return;
      const clipped = ['clip-path', 'mask'].find((key) => (attributes[key] ?? 'none') !== 'none');
      if (REFUSED.includes(name) || name === 'svg') refusals.push({ place, found: `the element ${name}` });
      else if (clipped !== undefined) refusals.push({ place, found: `a ${clipped} of ${place.name}` });
      else if (SVG_SHAPES.includes(name)) shapes.push(readShape(name, attributes, context, place, file));
    },
    close() {
      stack.pop();
    },
  });
  return { shapes: shapes.filter(({ curves }) => curves.length > 0), refusals, notes };

  function rootContext(name: string, attributes: Attributes, line: number): Context {
    if (name !== 'svg') refuseAt(file, { line }, `the element ${quoted(name)}`, 'an SVG drawing');
    const { unitM, note } = svgUserUnit(attributes, line, file, unit);
    if (note !== null) notes.push(note);
    const flipped: Matrix = [unitM, 0, 0, -unitM, 0, 0];
    const style = styleOf({}, attributes);
    return { matrix: flipped, origin: [0, 0], style, isShown: style.display !== 'none' };
  }
}

function innerContext(
  outer: Context,
  name: string,
  attributes: Attributes,
  place: Place,
  file: string,
): Context {
  const style = styleOf(outer.style, attributes);
  const isKnown = GROUPS.includes(name) || SVG_SHAPES.includes(name) || REFUSED.includes(name);
  const isShown = outer.isShown && isKnown && style.display !== 'none';
  if (!isShown) return { ...outer, style, isShown };
  const transform = attributes.transform === undefined ? null : readTransform(attributes.transform);
  if (attributes.transform !== undefined && transform === null) {
    const found = `transform=${quoted(attributes.transform)}`;
    refuseAt(file, place, found, 'a transform such as translate(1 2) scale(1 -1)');
  }
  if (/(?:^|;)\s*transform/.test(attributes.style ?? '')) {
    refuseAt(file, place, `a transform in the style of ${place.name}`, 'the attribute transform');
  }
  const matrix = transform === null ? outer.matrix : multiply(outer.matrix, transform);
  const origin = attributes['data-origin'] === 'axis' ? moved(matrix, [0, 0]) : outer.origin;
  return { matrix, origin, style, isShown };
}

/** Presentation attributes and the `style` attribute, which goes before them; what is not inherited is new for every element. */
function styleOf(outer: Attributes, attributes: Attributes): Attributes {
  const own: Record<string, string> = {};
  for (const key of INHERITED) {
    const value = attributes[key]?.trim() ?? outer[key];
    if (value !== undefined && value !== 'inherit') own[key] = value;
  }
  for (const declaration of (attributes.style ?? '').split(';')) {
    const [key, value] = declaration.split(':').map((part) => part.trim());
    if (INHERITED.includes(key) && value !== undefined && value !== 'inherit') own[key] = value;
  }
  return own;
}

function readShape(
  name: string,
  attributes: Attributes,
  { matrix, origin, style }: Context,
  place: Place,
  file: string,
): DrawnShape {
  const data = svgShapeData(name, attributes);
  if (data === null) {
    refuseAt(file, place, `a size or place of ${place.name} that cannot be`, 'numbers in user units');
  }
  const parts = svgPathCurves(data);
  if (typeof parts === 'string') refuseAt(file, place, `${parts} in ${place.name}`, 'path data of SVG');
  refuseManyRings(parts.length, file);
  const [a, b, c, d, e, f] = matrix;
  const onAxis: Matrix = [a, b, c, d, e - origin[0], f - origin[1]];
  const curves = parts.map((part) => part.map((curve) => movedCurve(onAxis, curve)));
  const isFilled = style.fill !== 'none' && style['fill-rule'] !== 'evenodd';
  return {
    curves: style.visibility === 'hidden' ? [] : isFilled ? filledParts(curves) : curves,
    place,
    element: elementOf(attributes, place, file),
  };
}

function elementOf(attributes: Attributes, place: Place, file: string): DrawnShape['element'] {
  const { 'data-element': number, 'data-weight': weight } = attributes;
  if (number === undefined) return null;
  const values = { number: Number(number), weight: Number(weight ?? 1) };
  if (/^\d{1,4}$/.test(number) && Number.isFinite(values.weight) && values.weight !== 0) return values;
  const found = `data-element=${quoted(number)} and data-weight=${quoted(weight ?? '')}`;
  throw inputError([
    { file, line: place.line as number, found, expected: 'a whole number and a weight other than 0' },
  ]);
}
