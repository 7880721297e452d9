import { GDS, GDS_HEAD, writeGdsReal } from '../outline/files/gdsRecords.ts';
import { openingsOf } from '../outline/nesting.ts';
import { checkDrawing, type Drawing } from './drawing.ts';
import { keyholed } from './keyhole.ts';
import { splitRing } from './splitRing.ts';

/** Database unit: a nanometre, the grid on which a search draws; a user unit is a micrometre. */
const UNIT_M = 1e-9;
const USER_UNITS = 1e-3;
/** Points of a boundary, with the first again at its end, that every reader takes. */
const MOST_POINTS = 4094;
const RELEASE = 600;
/** Year, month, day, hour, minute, second of the last change and of the last access: always the same, so that the bytes are. */
const DATES = [2000, 1, 1, 0, 0, 0, 2000, 1, 1, 0, 0, 0];

/** Types of a record's data. */
const NONE = 0;
const INT16 = 2;
const INT32 = 3;
const REAL = 5;
const TEXT = 6;

/**
 * The drawing as a GDSII stream: one cell named after the design's hash, database unit 1 nm, element 1 on layer 1, element 2 on layer
 * 2, and so on, openings as BOUNDARY. Holes are joined to the ring around them by slits of no width, and rings of more than 4093
 * vertices are cut along their diagonals, which keeps their area. Where there is more than one element, or its weight is not 1, property
 * 1 of every boundary tells the weight. The same drawing always gives the same bytes.
 *
 * @throws RimwrightError `input` where `checkDrawing` does
 */
export function drawGds(drawing: Drawing): Uint8Array {
  checkDrawing(drawing);
  const { elements, hash } = drawing;
  const isPlain = elements.length === 1 && elements[0].weight === 1;
  const records = [
    numbers(GDS.HEADER, INT16, [RELEASE]),
    numbers(GDS.BGNLIB, INT16, DATES),
    text(GDS.LIBNAME, 'RIMWRIGHT'),
    reals(GDS.UNITS, [USER_UNITS, UNIT_M]),
    numbers(GDS.BGNSTR, INT16, DATES),
    text(GDS.STRNAME, cellName(hash)),
    ...elements.flatMap(({ weight, rings }, e) =>
      polygonsOf(rings).flatMap((ring) => boundary(ring, e + 1, isPlain ? null : weight)),
    ),
    numbers(GDS.ENDSTR, NONE, []),
    numbers(GDS.ENDLIB, NONE, []),
  ];
  return Buffer.concat(records);
}

/** Cells have names of up to 32 letters, digits and underscores. */
function cellName(hash: string): string {
  return `OUTLINE_${hash.replace(/[^A-Za-z0-9_]/g, '_')}`.slice(0, 32);
}

/** Polygons without holes, on the grid, each within the limit of points. */
function polygonsOf(rings: readonly Float64Array[]): Float64Array[] {
  return openingsOf(rings.map(onGrid).filter((ring) => ring.length >= 6)).flatMap(({ outer, holes }) =>
    splitRing(keyholed(outer, holes), MOST_POINTS - 1),
  );
}

/** A ring in whole nanometres, without points that fall together. */
function onGrid(ring: Float64Array): Float64Array {
  const points: number[] = [];
  for (let i = 0; i < ring.length; i += 2) {
    const [x, y] = [Math.round(ring[i] / UNIT_M) + 0, Math.round(ring[i + 1] / UNIT_M) + 0];
    const last = points.length - 2;
    if (last < 0 || points[last] !== x || points[last + 1] !== y) points.push(x, y);
  }
  const last = points.length - 2;
  if (last > 0 && points[0] === points[last] && points[1] === points[last + 1]) points.length = last;
  return Float64Array.from(points);
}

function boundary(ring: Float64Array, layer: number, weight: number | null): Buffer[] {
  return [
    numbers(GDS.BOUNDARY, NONE, []),
    numbers(GDS.LAYER, INT16, [layer]),
    numbers(GDS.DATATYPE, INT16, [0]),
    numbers(GDS.XY, INT32, [...ring, ring[0], ring[1]]),
    ...(weight === null ? [] : [numbers(GDS.PROPATTR, INT16, [1]), text(GDS.PROPVALUE, `weight ${weight}`)]),
    numbers(GDS.ENDEL, NONE, []),
  ];
}

function record(kind: number, type: number, length: number): { bytes: Buffer; data: DataView } {
  const bytes = Buffer.alloc(GDS_HEAD + length);
  bytes.writeUInt16BE(bytes.length, 0);
  bytes.writeUInt8(kind, 2);
  bytes.writeUInt8(type, 3);
  return { bytes, data: new DataView(bytes.buffer, bytes.byteOffset + GDS_HEAD, length) };
}

function numbers(kind: number, type: number, values: readonly number[]): Buffer {
  const size = type === INT32 ? 4 : 2;
  const { bytes, data } = record(kind, type, size * values.length);
  values.forEach((value, k) => {
    if (type === INT32) data.setInt32(4 * k, value);
    else data.setInt16(2 * k, value);
  });
  return bytes;
}

function reals(kind: number, values: readonly number[]): Buffer {
  const { bytes, data } = record(kind, REAL, 8 * values.length);
  values.forEach((value, k) => {
    writeGdsReal(data, 8 * k, value);
  });
  return bytes;
}

/** A text of plain letters, filled up to an even length. */
function text(kind: number, value: string): Buffer {
  const { bytes } = record(kind, TEXT, value.length + (value.length % 2));
  bytes.write(value, GDS_HEAD, 'latin1');
  return bytes;
}
