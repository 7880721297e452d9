import { writeGdsReal } from '../../../src/outline/files/gdsRecords.ts';

/** A record: its whole length, its kind and its data's type, then the data (GDSII Stream Format Manual, 1987). */
function record(kind: number, type: number, data: Uint8Array = new Uint8Array(0)): Uint8Array {
  const length = data.length + 4;
  return Uint8Array.from([length >> 8, length & 255, kind, type, ...data]);
}

const join = (...parts: Uint8Array[]) => Uint8Array.from(parts.flatMap((part) => [...part]));
const int16 = (...values: number[]) =>
  Uint8Array.from(values.flatMap((value) => [(value >> 8) & 255, value & 255]));
const int32 = (...values: number[]) => join(...values.map((value) => int16(value >> 16, value & 0xffff)));
const letters = (value: string) =>
  Uint8Array.from([...`${value}${value.length % 2 ? '\0' : ''}`].map((one) => one.charCodeAt(0)));
const name = (kind: number, value: string) => record(kind, 6, letters(value));

function real(value: number): Uint8Array {
  const data = new DataView(new ArrayBuffer(8));
  writeGdsReal(data, 0, value);
  return new Uint8Array(data.buffer);
}

const DATES = int16(...Array.from({ length: 12 }, () => 1));

/** A library of cells; its database unit is a nanometre. */
export function library(cells: readonly Uint8Array[], unitM = 1e-9): Uint8Array {
  const units = record(3, 5, join(real(1e-3), real(unitM)));
  return join(record(0, 2, int16(600)), record(1, 2, DATES), name(2, 'LIB'), units, ...cells, record(4, 0));
}

export function cell(title: string, ...elements: Uint8Array[]): Uint8Array {
  return join(record(5, 2, DATES), name(6, title), ...elements, record(7, 0));
}

/** A polygon [x0, y0, x1, y1, …] in database units; its first point is repeated. */
export function boundary(layer: number, points: readonly number[], property?: string): Uint8Array {
  const properties = property === undefined ? [] : [record(0x2b, 2, int16(1)), name(0x2c, property)];
  const xy = record(0x10, 3, int32(...points, points[0], points[1]));
  return join(
    record(8, 0),
    record(0x0d, 2, int16(layer)),
    record(0x0e, 2, int16(0)),
    xy,
    ...properties,
    record(0x11, 0),
  );
}

interface Turn {
  mirror?: boolean;
  /** Degrees. */
  turn?: number;
  scale?: number;
}

export function sref(title: string, x: number, y: number, { mirror, turn, scale }: Turn = {}): Uint8Array {
  return join(
    record(0x0a, 0),
    name(0x12, title),
    record(0x1a, 1, int16(mirror ? 0x8000 : 0)),
    ...(scale === undefined ? [] : [record(0x1b, 5, real(scale))]),
    ...(turn === undefined ? [] : [record(0x1c, 5, real(turn))]),
    record(0x10, 3, int32(x, y)),
    record(0x11, 0),
  );
}

/** @param places of the first, of the end of all columns and of the end of all rows */
export function aref(title: string, columns: number, rows: number, places: readonly number[]): Uint8Array {
  return join(
    record(0x0b, 0),
    name(0x12, title),
    record(0x13, 2, int16(columns, rows)),
    record(0x10, 3, int32(...places)),
    record(0x11, 0),
  );
}

export function text(): Uint8Array {
  const [layer, type] = [record(0x0d, 2, int16(1)), record(0x16, 2, int16(0))];
  return join(
    record(0x0c, 0),
    layer,
    type,
    record(0x10, 3, int32(0, 0)),
    name(0x19, 'here'),
    record(0x11, 0),
  );
}
