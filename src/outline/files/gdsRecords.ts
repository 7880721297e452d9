import { refuseAt } from './drawnPath.ts';

/** Kinds of records of a GDSII stream (GDSII Stream Format Manual, release 6.0, 1987), by the number in their third byte. */
export const GDS = {
  HEADER: 0x00,
  BGNLIB: 0x01,
  LIBNAME: 0x02,
  UNITS: 0x03,
  ENDLIB: 0x04,
  BGNSTR: 0x05,
  STRNAME: 0x06,
  ENDSTR: 0x07,
  BOUNDARY: 0x08,
  PATH: 0x09,
  SREF: 0x0a,
  AREF: 0x0b,
  TEXT: 0x0c,
  LAYER: 0x0d,
  DATATYPE: 0x0e,
  XY: 0x10,
  ENDEL: 0x11,
  SNAME: 0x12,
  COLROW: 0x13,
  NODE: 0x15,
  STRANS: 0x1a,
  MAG: 0x1b,
  ANGLE: 0x1c,
  PROPATTR: 0x2b,
  PROPVALUE: 0x2c,
  BOX: 0x2d,
} as const;

/** Bytes of a record before its data: its whole length, its kind, and the type of its data. */
export const GDS_HEAD = 4;

/** One record of a stream. */
export interface GdsRecord {
  kind: number;
  /** Place of its first byte in the file. */
  at: number;
  data: DataView;
}

/**
 * The records of a stream up to ENDLIB.
 *
 * @throws RimwrightError `input` where the bytes are no records
 */
export function readGdsRecords(bytes: Uint8Array, file: string): GdsRecord[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const records: GdsRecord[] = [];
  for (let at = 0; at + GDS_HEAD <= bytes.length; ) {
    const length = view.getUint16(at);
    const kind = view.getUint8(at + 2);
    if (records.length === 0 && (kind !== GDS.HEADER || length !== 6)) break;
    if (length < GDS_HEAD || at + length > bytes.length) {
      refuseAt(file, byteAt(at), `a record of ${length} bytes`, 'a record that fits into the file');
    }
    const data = new DataView(view.buffer, view.byteOffset + at + GDS_HEAD, length - GDS_HEAD);
    records.push({ kind, at, data });
    if (kind === GDS.ENDLIB) return records;
    at += length;
  }
  if (records.length === 0) refuseAt(file, {}, 'bytes without the header of a GDSII stream', 'a GDSII file');
  return refuseAt(file, byteAt(bytes.length), 'the end of the file', 'a GDSII stream that ends with ENDLIB');
}

/** A place in a binary file, for messages. */
export function byteAt(at: number): { key: string } {
  return { key: `byte ${at}` };
}

/** Whole numbers of 16 or 32 bits, or numbers of 64. */
export function gdsNumbers({ data }: GdsRecord, size: 2 | 4 | 8): number[] {
  return Array.from({ length: Math.floor(data.byteLength / size) }, (_, k) => {
    if (size === 2) return data.getInt16(2 * k);
    return size === 4 ? data.getInt32(4 * k) : gdsReal(data, 8 * k);
  });
}

export function gdsText({ data }: GdsRecord): string {
  const bytes = Array.from({ length: data.byteLength }, (_, k) => data.getUint8(k));
  return String.fromCharCode(...bytes.filter((byte) => byte !== 0));
}

/** A number of 64 bits: sign, a power of 16 beyond 64, and 56 bits after the point. */
function gdsReal(data: DataView, at: number): number {
  const first = data.getUint8(at);
  const mantissa = (data.getUint32(at) & 0xffffff) * 2 ** -24 + data.getUint32(at + 4) * 2 ** -56;
  return (first & 0x80 ? -1 : 1) * mantissa * 16 ** ((first & 0x7f) - 64);
}

/** Writes a number above 0 as `gdsReal` reads it. */
export function writeGdsReal(data: DataView, at: number, value: number): void {
  let power = 64;
  let mantissa = value;
  for (; mantissa >= 1; power++) mantissa /= 16;
  for (; mantissa < 1 / 16; power--) mantissa *= 16;
  const high = Math.floor(mantissa * 2 ** 24);
  data.setUint32(at, high);
  data.setUint8(at, power);
  data.setUint32(at + 4, Math.floor((mantissa * 2 ** 24 - high) * 2 ** 32));
}
