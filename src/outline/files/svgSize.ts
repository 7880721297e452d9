import { quoted, refuseAt } from './drawnPath.ts';
import type { LengthUnit } from './lengthUnit.ts';
import { LENGTH_UNITS } from './lengthUnit.ts';
import type { Attributes } from './svgShape.ts';

const LENGTH = /^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*(mm|cm|in|pt|pc|px|)\s*$/;
const PX_M = 0.0254 / 96;
/** Absolute units of SVG, and px by its standard (SVG 1.1, section 7.10; CSS Values 3, section 6.2). */
const UNITS: Record<string, number> = {
  mm: 1e-3,
  cm: 1e-2,
  in: 0.0254,
  pt: 0.0254 / 72,
  pc: 0.0254 / 6,
  px: PX_M,
  '': PX_M,
};
/** How far the scales across and up may differ: widths are rounded. */
const SCALE_SHARE = 1e-4;

/** Size of a drawing's user unit. */
interface UserUnit {
  unitM: number;
  note: string | null;
}

/**
 * The size of an SVG's user unit from the width, height and viewBox of its root.
 *
 * @param unit of the user unit, for drawings that state no size, or only one in px
 * @throws RimwrightError `input` where there is no size, or not the same scale across and up
 */
export function svgUserUnit(
  attributes: Attributes,
  line: number,
  file: string,
  unit: LengthUnit | null,
): UserUnit {
  const sides = (['width', 'height'] as const).map((key) => sideOf(attributes, key, line, file));
  const stated = sides.filter((side) => side !== null);
  const isAbsolute = stated.some(({ isPx }) => !isPx);
  if (!isAbsolute && unit !== null) return { unitM: LENGTH_UNITS[unit], note: null };
  if (stated.length === 0) {
    const found = 'a drawing without width and height';
    refuseAt(file, { line }, found, 'width and height in mm, cm or in, or --unit mm');
  }
  const note = isAbsolute ? null : `${file}: px are taken as 1/96 in, as the SVG standard says`;
  const box = attributes.viewBox;
  // Without a viewBox user units are px, whatever the sheet's size.
  if (box === undefined) {
    return { unitM: PX_M, note: `${file}: user units are taken as px of 1/96 in, as the SVG standard says` };
  }
  const values = box
    .trim()
    .split(/[\s,]+/)
    .map(Number);
  if (values.length !== 4 || !values.every(Number.isFinite) || !(values[2] > 0 && values[3] > 0)) {
    refuseAt(file, { line }, `viewBox=${quoted(box)}`, 'a viewBox such as "-1 -1 2 2"');
  }
  const scales = sides.map((side, i) => (side === null ? null : side.lengthM / values[2 + i]));
  const [across, up] = [scales[0] ?? scales[1] ?? 0, scales[1] ?? scales[0] ?? 0];
  if (Math.abs(across - up) > SCALE_SHARE * up) {
    const found = `a viewBox of another shape than width and height`;
    refuseAt(file, { line }, found, 'the same scale across and up');
  }
  return { unitM: across, note };
}

function sideOf(attributes: Attributes, key: 'width' | 'height', line: number, file: string) {
  const text = attributes[key];
  // A share of the page says nothing about size.
  if (text === undefined || text === 'auto' || text.trim().endsWith('%')) return null;
  const [, number, unit] = LENGTH.exec(text) ?? [];
  if (number === undefined || !(Number(number) > 0)) {
    refuseAt(file, { line }, `${key}=${quoted(text)}`, 'a length above 0 in mm, cm or in');
  }
  return { lengthM: Number(number) * UNITS[unit], isPx: unit === 'px' || unit === '' };
}
