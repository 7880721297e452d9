import { refuseAt } from './drawnPath.ts';
import type { GdsRecord } from './gdsRecords.ts';
import { byteAt, GDS, gdsNumbers, gdsText } from './gdsRecords.ts';

/** A filled polygon, in database units; the first point is not repeated. */
export interface GdsBoundary {
  layer: number;
  points: Float64Array;
  /** Texts by their number. */
  properties: ReadonlyMap<number, string>;
  /** Its place in the file. */
  at: number;
}

/** Other cells within a cell: one, or columns and rows of it. */
export interface GdsReference {
  cell: string;
  /** Places of the cell's origin: of the first, and in an array at the ends of all columns and of all rows. */
  points: Float64Array;
  columns: number;
  rows: number;
  /** Mirrored at the x axis before it is turned. */
  isMirrored: boolean;
  scale: number;
  turnRad: number;
  at: number;
}

export interface GdsCell {
  name: string;
  boundaries: GdsBoundary[];
  references: GdsReference[];
}

export interface GdsLibrary {
  /** Size of the database unit, metres. */
  unitM: number;
  cells: ReadonlyMap<string, GdsCell>;
}

/** Sizes of a database unit that are believed, metres. */
const UNITS_M = [1e-15, 1e-2] as const;
/** Kinds that begin something within a cell. */
const STARTS: ReadonlyMap<number, string> = new Map([
  [GDS.BOUNDARY, 'BOUNDARY'],
  [GDS.PATH, 'PATH'],
  [GDS.SREF, 'SREF'],
  [GDS.AREF, 'AREF'],
  [GDS.TEXT, 'TEXT'],
  [GDS.NODE, 'NODE'],
  [GDS.BOX, 'BOX'],
]);
/** What is drawn without enclosing anything on a mask. */
const REMARKS = ['TEXT', 'NODE'];
const MIRRORED = 0x8000;
const ABSOLUTE = 0x0006;

/**
 * The cells of a stream with their polygons and references.
 *
 * @throws RimwrightError `input` for a PATH or BOX, records in the wrong place, and a stream without units
 */
export function gdsCells(records: readonly GdsRecord[], file: string): GdsLibrary {
  let unitM: number | null = null;
  const cells = new Map<string, GdsCell>();
  let cell: GdsCell | null = null;
  for (let k = 0; k < records.length; k++) {
    const record = records[k];
    const start = STARTS.get(record.kind);
    if (record.kind === GDS.UNITS) unitM = unitOf(record, file);
    else if (record.kind === GDS.BGNSTR) cell = { name: '', boundaries: [], references: [] };
    else if (record.kind === GDS.STRNAME && cell !== null) {
      cell.name = gdsText(record);
      if (cells.has(cell.name)) {
        refuseAt(file, byteAt(record.at), `a second cell ${JSON.stringify(cell.name)}`, 'each cell once');
      }
      cells.set(cell.name, cell);
    } else if (start !== undefined) {
      let end = k + 1;
      while (end < records.length && records[end].kind !== GDS.ENDEL) end++;
      if (cell === null || end === records.length) {
        refuseAt(
          file,
          byteAt(record.at),
          `a ${start} outside of a cell`,
          'elements that end with ENDEL, in cells',
        );
      }
      addElement(cell, start, records.slice(k, end), file);
      k = end;
    }
  }
  if (unitM === null) refuseAt(file, {}, 'no record UNITS', 'a GDSII stream with its units');
  return { unitM, cells };
}

function unitOf(record: GdsRecord, file: string): number {
  const unitM = gdsNumbers(record, 8)[1];
  if (unitM >= UNITS_M[0] && unitM <= UNITS_M[1]) return unitM;
  return refuseAt(
    file,
    byteAt(record.at),
    `a database unit of ${unitM} m`,
    `one from ${UNITS_M.join(' to ')} m`,
  );
}

function addElement(cell: GdsCell, start: string, records: readonly GdsRecord[], file: string): void {
  const [{ at }] = records;
  if (start === 'BOUNDARY') {
    const points = pointsOf(records, file);
    cell.boundaries.push({
      layer: numberOf(records, GDS.LAYER) ?? 0,
      points: withoutLast(points),
      properties: propertiesOf(records),
      at,
    });
  } else if (start === 'SREF' || start === 'AREF') {
    cell.references.push(referenceOf(records, start === 'AREF', file));
  } else if (!REMARKS.includes(start)) {
    const place = `the cell ${JSON.stringify(cell.name)}`;
    refuseAt(file, byteAt(at), `a ${start} in ${place}`, 'outlines as BOUNDARY: turn it into polygons');
  }
}

function recordOf(records: readonly GdsRecord[], kind: number): GdsRecord | undefined {
  return records.find((record) => record.kind === kind);
}

function numberOf(records: readonly GdsRecord[], kind: number, size: 2 | 8 = 2): number | undefined {
  const record = recordOf(records, kind);
  return record && gdsNumbers(record, size)[0];
}

function pointsOf(records: readonly GdsRecord[], file: string): Float64Array {
  const record = recordOf(records, GDS.XY);
  const values = record === undefined ? [] : gdsNumbers(record, 4);
  if (values.length < 2 || values.length % 2 !== 0) {
    refuseAt(file, byteAt(records[0].at), `${values.length} coordinates`, 'x and y of points in a record XY');
  }
  return Float64Array.from(values);
}

/** A boundary ends with its first point again. */
function withoutLast(points: Float64Array): Float64Array {
  const last = points.length - 2;
  return points[0] === points[last] && points[1] === points[last + 1] ? points.slice(0, last) : points;
}

function propertiesOf(records: readonly GdsRecord[]): Map<number, string> {
  const properties = new Map<number, string>();
  records.forEach((record, k) => {
    const value = records[k + 1];
    if (record.kind === GDS.PROPATTR && value?.kind === GDS.PROPVALUE) {
      properties.set(gdsNumbers(record, 2)[0], gdsText(value));
    }
  });
  return properties;
}

function referenceOf(records: readonly GdsRecord[], isArray: boolean, file: string): GdsReference {
  const [{ at }] = records;
  const name = recordOf(records, GDS.SNAME);
  const flags = (numberOf(records, GDS.STRANS) ?? 0) & 0xffff;
  const colrow = recordOf(records, GDS.COLROW);
  const [columns, rows] = isArray && colrow ? gdsNumbers(colrow, 2) : [1, 1];
  const points = pointsOf(records, file);
  const scale = numberOf(records, GDS.MAG, 8) ?? 1;
  const isSound = columns > 0 && rows > 0 && scale > 0 && points.length === (isArray ? 6 : 2);
  if (name === undefined || !isSound || (isArray && !colrow)) {
    refuseAt(file, byteAt(at), 'a broken reference to a cell', 'its name, places, columns and rows');
  }
  if ((flags & ABSOLUTE) !== 0) {
    refuseAt(file, byteAt(at), 'a reference of absolute size or angle', 'one that follows its cell');
  }
  return {
    cell: gdsText(name),
    points,
    columns,
    rows,
    isMirrored: (flags & MIRRORED) !== 0,
    scale,
    turnRad: ((numberOf(records, GDS.ANGLE, 8) ?? 0) * Math.PI) / 180,
    at,
  };
}
