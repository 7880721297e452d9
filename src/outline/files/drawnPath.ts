import type { Problem } from '../../base/errors.ts';
import { inputError } from '../../base/errors.ts';
import type { Curve, Point } from './curve.ts';

/** Files longer than this are no outlines. */
export const MOST_FILE_BYTES = 50_000_000;
/** Points of all rings together. */
export const MOST_VERTICES = 200_000;
/** Rings of all elements together. */
const MOST_RINGS = 5000;
/** Largest coordinate either way, metres. */
export const LARGEST_M = 1;

/** Where something stands in its file, for messages. */
export interface Place {
  /** `the CIRCLE in line 12`. */
  name: string;
  line?: number;
  key?: string;
}

/** Curves one after the other, as a file draws them. */
export interface DrawnPath {
  curves: readonly Curve[];
  place: Place;
}

/** One detector element as a file draws it: closed paths. */
export interface DrawnElement {
  weight: number;
  loops: readonly DrawnPath[];
}

/** A mistake at its place. */
export function problemAt(
  file: string,
  { line, key }: Partial<Place>,
  found: string,
  expected: string,
): Problem {
  return { file, ...(line !== undefined && { line }), ...(key !== undefined && { key }), found, expected };
}

/** @throws RimwrightError `input`, always */
export function refuseAt(file: string, place: Partial<Place>, found: string, expected: string): never {
  throw inputError([problemAt(file, place, found, expected)]);
}

/** @throws RimwrightError `input` where there are more rings than are read */
export function refuseManyRings(count: number, file: string): void {
  if (count <= MOST_RINGS) return;
  throw inputError([{ file, found: `${count} rings`, expected: `at most ${MOST_RINGS} rings` }]);
}

/** A point of a file as a message names it: `x = 0.5 mm, y = -0.25 mm`. */
export function pointText([x, y]: Point): string {
  const [xMm, yMm] = [x, y].map((metres) => Number((metres * 1000).toPrecision(6)));
  return `x = ${xMm} mm, y = ${yMm} mm`;
}

/** What stood in a file, fit for a message. */
export function quoted(text: string): string {
  return JSON.stringify(text.length > 60 ? `${text.slice(0, 60)}…` : text);
}
