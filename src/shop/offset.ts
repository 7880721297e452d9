import Coordinate from 'jsts/org/locationtech/jts/geom/Coordinate.js';
import GeometryFactory from 'jsts/org/locationtech/jts/geom/GeometryFactory.js';
import BufferOp from 'jsts/org/locationtech/jts/operation/buffer/BufferOp.js';
import BufferParameters from 'jsts/org/locationtech/jts/operation/buffer/BufferParameters.js';
import { ringArea, ringsRadius } from '../outline/area.ts';
import { isWithin } from '../outline/nesting.ts';

/** Closed polygons [x0, y0, x1, y1, …] in metres: openings counter-clockwise, islands in them clockwise. */
export type Rings = readonly Float64Array[];

/** Chords of a quarter turn: a rounded right angle is off by 1.4e-4 r² in area. */
const CHORDS_A_QUARTER = 48;

/** The library's own snapping works best with numbers around a hundred. */
const UNIT_M = 1e-6;

/** The part of the library's geometry that is used; its types say `any`. */
interface LineRing {
  getCoordinates(): { x: number; y: number }[];
}
interface Polygon {
  getExteriorRing(): LineRing;
  getNumInteriorRing(): number;
  getInteriorRingN(n: number): LineRing;
}
interface Geometry {
  getNumGeometries(): number;
  getGeometryN(n: number): Polygon & { isEmpty(): boolean };
}

/**
 * The region as far as a disc's centre may go beyond its rim, or must stay within it: every ring moved outwards by `byM`, with
 * round corners, or inwards where that is negative.
 *
 * @param rings that do not cross
 */
export function offset(rings: Rings, byM: number): Float64Array[] {
  const parameters = new BufferParameters(CHORDS_A_QUARTER);
  // Left to itself, the library leaves out notches shallower than a hundredth of the distance.
  parameters.setSimplifyFactor(1e-4);
  return toRings(new BufferOp(toGeometry(rings), parameters).getResultGeometry(byM / UNIT_M));
}

/** What either of two regions covers: an offset by nothing, which unlike the library's overlay never fails on edges that nearly coincide. */
export function union(a: Rings, b: Rings): Float64Array[] {
  const factory = new GeometryFactory();
  const both = factory.createMultiPolygon([...toPolygons(a, factory), ...toPolygons(b, factory)]);
  return toRings(new BufferOp(both, new BufferParameters(CHORDS_A_QUARTER)).getResultGeometry(0));
}

/** What region a covers and b does not: a's surroundings and b together, turned inside out. */
export function difference(a: Rings, b: Rings): Float64Array[] {
  if (a.length === 0) return [];
  const reachM = 2 * Math.max(ringsRadius(a), ringsRadius(b));
  const frame = Float64Array.of(-reachM, -reachM, reachM, -reachM, reachM, reachM, -reachM, reachM);
  const rest = union([frame, ...a.map(turned)], b);
  return rest.filter((ring) => ringsRadius([ring]) < reachM).map(turned);
}

/** The ring run the other way. */
function turned(ring: Float64Array): Float64Array {
  const out = new Float64Array(ring.length);
  for (let i = 0; i < ring.length; i += 2) {
    out[i] = ring[ring.length - 2 - i];
    out[i + 1] = ring[ring.length - 1 - i];
  }
  return out;
}

/** A region's separate openings, each with the islands in it. */
export function openings(rings: Rings): Float64Array[][] {
  const outer = rings
    .filter((ring) => ringArea(ring) > 0)
    .map((ring) => ({ areaM2: ringArea(ring), own: [ring] }))
    .sort((p, q) => p.areaM2 - q.areaM2);
  for (const ring of rings) {
    if (ringArea(ring) > 0) continue;
    // The smallest opening around an island is the one that it lies in.
    outer.find(({ own }) => isWithin(own[0], ring[0], ring[1]))?.own.push(ring);
  }
  return outer.map(({ own }) => own);
}

function toGeometry(rings: Rings): unknown {
  const factory = new GeometryFactory();
  return factory.createMultiPolygon(toPolygons(rings, factory));
}

function toPolygons(rings: Rings, factory: GeometryFactory): unknown[] {
  return openings(rings).map((own) => {
    const [shell, ...holes] = own.map((ring) => factory.createLinearRing(toCoordinates(ring)));
    return factory.createPolygon(shell, holes);
  });
}

function toCoordinates(ring: Float64Array): Coordinate[] {
  const coordinates: Coordinate[] = [];
  for (let i = 0; i < ring.length; i += 2)
    coordinates.push(new Coordinate(ring[i] / UNIT_M, ring[i + 1] / UNIT_M));
  return [...coordinates, coordinates[0]];
}

function toRings(geometry: Geometry): Float64Array[] {
  const rings: Float64Array[] = [];
  for (let n = 0; n < geometry.getNumGeometries(); n++) {
    const part = geometry.getGeometryN(n);
    // An overlay may leave points and lines where regions touch.
    if (part.isEmpty() || !('getExteriorRing' in part)) continue;
    rings.push(toRing(part.getExteriorRing(), 1));
    for (let k = 0; k < part.getNumInteriorRing(); k++) rings.push(toRing(part.getInteriorRingN(k), -1));
  }
  return rings;
}

/** A millionth of a micrometre: of points that differ only by rounding the library makes hard work. */
function onGrid(value: number): number {
  return Math.round(value * 1e6) / 1e6;
}

function toRing(line: LineRing, sense: 1 | -1): Float64Array {
  const points = line
    .getCoordinates()
    .slice(0, -1)
    .map(({ x, y }) => ({ x: onGrid(x), y: onGrid(y) }));
  const ring = Float64Array.from(points.flatMap(({ x, y }) => [x * UNIT_M, y * UNIT_M]));
  if (ringArea(ring) > 0 === sense > 0) return ring;
  return Float64Array.from(points.reverse().flatMap(({ x, y }) => [x * UNIT_M, y * UNIT_M]));
}
