import svgpath from 'svgpath';
import type { Curve, Point } from './curve.ts';
import { arcAbout, bezier, curved, straight } from './curve.ts';

/**
 * The curves of SVG path data, one list for each of its parts.
 *
 * @returns what is wrong, in words, where anything is
 */
export function svgPathCurves(data: string): Curve[][] | string {
  if (LONGEST_ARCS.test(data)) return 'more arcs after one letter than are read';
  const path = svgpath(spelledOut(data));
  // The library keeps what came before a mistake; its words begin with its own name.
  const { err } = path as unknown as { err: string };
  if (err !== '') return `broken data (${err.replace(/^\w+: /, '')})`;
  const parts: Curve[][] = [];
  let part: Curve[] = [];
  let start: Point = [0, 0];
  let mistake: string | undefined;
  const begin = (point: Point) => {
    if (part.length > 0) parts.push(part);
    part = [];
    start = point;
  };
  path
    .abs()
    .unshort()
    .iterate((segment, _, x, y) => {
      const from: Point = [x, y];
      const [command, ...values] = segment as [string, ...number[]];
      const to = values.slice(-2) as unknown as Point;
      if (command === 'M') begin(to);
      else if (command === 'Z' || command === 'z') {
        addEdge(part, from, start);
        begin(start);
      } else if (command === 'L') addEdge(part, from, to);
      else if (command === 'H') addEdge(part, from, [values[0], y]);
      else if (command === 'V') addEdge(part, from, [x, values[0]]);
      else if (command === 'C' || command === 'Q') part.push(bezier([from, ...pairs(values)]));
      else if (command === 'A') part.push(...ellipticArc(from, values, to));
      else mistake ??= `the command ${JSON.stringify(command)}`;
    });
  begin(start);
  return mistake ?? parts;
}

/** Numbers that each command takes, but for arcs, whose flags may stand without a space. */
const COUNTS: Record<string, number> = { m: 2, l: 2, h: 1, v: 1, c: 6, s: 4, q: 4, t: 2 };
/** Arcs are not spelled out, see there. */
const LONGEST_ARCS = /a[^a-df-z]{200000}/i;
const NUMBER = /[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/g;

/** Data with a letter for every step: the library takes a time that grows as the square of the numbers after one letter. */
function spelledOut(data: string): string {
  return data.replace(/([mlhvcsqt])([^a-df-z]*)/gi, (whole, letter: string, text: string) => {
    const numbers = text.match(NUMBER) ?? [];
    const count = COUNTS[letter.toLowerCase()];
    const isPlain = numbers.length > count && numbers.length % count === 0;
    if (!isPlain || !/^[\s,]*$/.test(text.replace(NUMBER, ' '))) return whole;
    const next = letter === 'm' ? 'l' : letter === 'M' ? 'L' : letter;
    const steps: string[] = [];
    for (let i = 0; i < numbers.length; i += count) {
      steps.push(`${i === 0 ? letter : next}${numbers.slice(i, i + count).join(' ')}`);
    }
    return steps.join('');
  });
}

/** An edge from a point to itself is none. */
function addEdge(part: Curve[], from: Point, to: Point): void {
  if (from[0] !== to[0] || from[1] !== to[1]) part.push(straight(from, to));
}

function pairs(values: readonly number[]): Point[] {
  return Array.from({ length: values.length / 2 }, (_, i) => [values[2 * i], values[2 * i + 1]] as const);
}

/** An arc from end points to centre (SVG 1.1, appendix F.6.5 and F.6.6). */
function ellipticArc(from: Point, values: readonly number[], to: Point): Curve[] {
  const [rawX, rawY, tilt, isLarge, isPositive] = values;
  if (from[0] === to[0] && from[1] === to[1]) return [];
  if (rawX === 0 || rawY === 0) return [straight(from, to)];
  const [cos, sin] = [Math.cos((tilt * Math.PI) / 180), Math.sin((tilt * Math.PI) / 180)];
  const [halfX, halfY] = [(from[0] - to[0]) / 2, (from[1] - to[1]) / 2];
  const [x1, y1] = [cos * halfX + sin * halfY, cos * halfY - sin * halfX];
  // Radii that are too small grow until the ends can be joined.
  const grown = Math.sqrt(Math.max(1, (x1 / rawX) ** 2 + (y1 / rawY) ** 2));
  const [rx, ry] = [Math.abs(rawX) * grown, Math.abs(rawY) * grown];
  const [u, v] = [x1 / rx, y1 / ry];
  const reach = Math.sqrt(Math.max(0, 1 / (u * u + v * v) - 1)) * (isLarge === isPositive ? -1 : 1);
  const [cx, cy] = [reach * v, -reach * u];
  const centre: Point = [
    cos * cx * rx - sin * cy * ry + (from[0] + to[0]) / 2,
    sin * cx * rx + cos * cy * ry + (from[1] + to[1]) / 2,
  ];
  const start = Math.atan2(v - cy, u - cx);
  const turn = Math.atan2(-v - cy, -u - cx) - start;
  const span = isPositive ? turn + (turn < 0 ? 2 * Math.PI : 0) : turn - (turn > 0 ? 2 * Math.PI : 0);
  if (rx === ry) return arcAbout(centre, rx, start + (tilt * Math.PI) / 180, span);
  return [0, 1].map((half) =>
    curved((t) => {
      const angle = start + ((half + t) / 2) * span;
      const [x, y] = [rx * Math.cos(angle), ry * Math.sin(angle)];
      return [centre[0] + cos * x - sin * y, centre[1] + sin * x + cos * y];
    }),
  );
}
