import type { Curve, Point } from './curve.ts';

/** Depth of halving: a curve that still bends after a million pieces is no outline. */
const DEEPEST = 20;
const LEAST_PIECES = 4;

/**
 * Points of a curve from its start to just before its end. Chords stay within `sagM` of it, and the points between the ends lie a
 * little outside, so that what every chord cuts off is made up for beside it: the polygon has the curve's area, and locally so, hence
 * the mean of ρ² and the phase as well.
 *
 * @param most points that may be made
 * @returns flat [x0, y0, x1, y1, …]; null where more would be needed
 */
export function flattenCurve(curve: Curve, sagM: number, most: number): number[] | null {
  const { at } = curve;
  if (at === undefined) return [...curve.from];
  const places = samplePlaces(at, sagM, most);
  if (places === null) return null;
  const points = places.map((t, i): Point => (i === 0 ? curve.from : t === 1 ? curve.to : at(t)));
  const lost = points.slice(1).map((_, i) => cutOff(at, places[i], places[i + 1]));
  const flat: number[] = [...points[0]];
  for (let i = 1; i + 1 < points.length; i++) {
    // The ends stay, so their neighbours make up for both halves of what the first and the last chord cut off.
    const first = i === 1 ? 1 : 0.5;
    const last = i + 2 === points.length ? 1 : 0.5;
    const [dx, dy] = [points[i + 1][0] - points[i - 1][0], points[i + 1][1] - points[i - 1][1]];
    const squared = dx * dx + dy * dy;
    const shift = squared === 0 ? 0 : (2 * (first * lost[i - 1] + last * lost[i])) / squared;
    flat.push(points[i][0] + shift * dy, points[i][1] - shift * dx);
  }
  return flat;
}

/** Parameters from 0 to 1 between which the curve stays within `sagM` of its chord. */
function samplePlaces(at: (t: number) => Point, sagM: number, most: number): number[] | null {
  const places = [0];
  const halve = (from: number, to: number, depth: number): boolean => {
    if (depth >= DEEPEST || isFlat(at, from, to, sagM)) {
      places.push(to);
      return places.length <= most;
    }
    const middle = (from + to) / 2;
    return halve(from, middle, depth + 1) && halve(middle, to, depth + 1);
  };
  for (let k = 0; k < LEAST_PIECES; k++) {
    if (!halve(k / LEAST_PIECES, (k + 1) / LEAST_PIECES, 0)) return null;
  }
  return places;
}

/** Whether three points between lie close enough to the chord, and none far outside of its ends. */
function isFlat(at: (t: number) => Point, from: number, to: number, sagM: number): boolean {
  const [x0, y0] = at(from);
  const [x1, y1] = at(to);
  const [dx, dy] = [x1 - x0, y1 - y0];
  const squared = dx * dx + dy * dy;
  return [0.25, 0.5, 0.75].every((part) => {
    const [x, y] = at(from + part * (to - from));
    const along = squared === 0 ? 0 : Math.min(1, Math.max(0, ((x - x0) * dx + (y - y0) * dy) / squared));
    return Math.hypot(x - x0 - along * dx, y - y0 - along * dy) <= sagM;
  });
}

/**
 * Signed area between a short stretch of a curve and its chord: by polygons of two and of four edges, and what Richardson (1911)
 * makes of both.
 */
function cutOff(at: (t: number) => Point, from: number, to: number): number {
  const points = [0, 0.25, 0.5, 0.75, 1].map((part) => at(from + part * (to - from)));
  const triangle = (a: Point, b: Point, c: Point) =>
    ((b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])) / 2;
  const [p0, p1, p2, p3, p4] = points;
  // Seen along the chord, a curve to its right has the chord on the left: its points turn left.
  const two = triangle(p0, p2, p4);
  const four = two + triangle(p0, p1, p2) + triangle(p2, p3, p4);
  return four + (four - two) / 3;
}
