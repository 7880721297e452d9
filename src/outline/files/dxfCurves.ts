import type { Curve, Point } from './curve.ts';
import { arcAbout, bulged, curved, straight } from './curve.ts';
import type { Place } from './drawnPath.ts';
import { quoted, refuseAt } from './drawnPath.ts';
import type { DxfEntity, DxfGroup } from './dxfGroups.ts';
import { nurbs } from './nurbs.ts';

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const SUPPORTED = ['LINE', 'ARC', 'CIRCLE', 'ELLIPSE', 'SPLINE', 'LWPOLYLINE', 'POLYLINE'];
/** Heights and tilts below this come from rounding. */
const FLAT = 1e-9;
/** Flags of a POLYLINE that is a mesh of some kind, and of a vertex that only frames a spline. */
const MESH = 16 | 64;
const FRAME_VERTEX = 16;
const DEGREE = Math.PI / 180;

/** Turns one entity into curves in the drawing's unit times `unitM`. */
class EntityReader {
  readonly file: string;
  readonly place: Place;
  readonly #groups: readonly DxfGroup[];
  readonly #unitM: number;

  constructor(groups: readonly DxfGroup[], place: Place, unitM: number, file: string) {
    this.#groups = groups;
    this.place = place;
    this.#unitM = unitM;
    this.file = file;
  }

  /** The number of a group; the last one counts. */
  number(code: number, otherwise?: number): number {
    const group = this.#groups.findLast((one) => one.code === code);
    if (group !== undefined) return this.#parse(group);
    if (otherwise !== undefined) return otherwise;
    return this.refuse('no group', `a group ${code} with a number`);
  }

  numbers(code: number): number[] {
    return this.#groups.filter((one) => one.code === code).map((group) => this.#parse(group));
  }

  length(code: number): number {
    const value = this.number(code);
    if (!(value > 0)) this.refuse(`a size of ${value}`, 'a size above 0');
    return value * this.#unitM;
  }

  /** A point of the codes `code` and `code + 10`; its height, `code + 20`, must be 0. */
  point(code: number): Point {
    const [x, y, z] = [this.number(code), this.number(code + 10), this.number(code + 20, 0)];
    if (Math.abs(z * this.#unitM) > FLAT) this.refuse(`z = ${z}`, 'a drawing in the plane z = 0');
    return [x * this.#unitM, y * this.#unitM];
  }

  /** All points of the codes `code` and `code + 10`, with the groups that come after each. */
  points(code: number): { point: Point; bulge: number }[] {
    const starts = this.#groups.flatMap((group, k) => (group.code === code ? [k] : []));
    return starts.map((start, i) => {
      const own = new EntityReader(
        this.#groups.slice(start, starts[i + 1] ?? this.#groups.length),
        this.place,
        this.#unitM,
        this.file,
      );
      return { point: own.point(code), bulge: own.number(42, 0) };
    });
  }

  /** Whether the entity is seen from behind, so that its own x runs the other way. */
  isMirrored(): boolean {
    const [x, y, z] = [this.number(210, 0), this.number(220, 0), this.number(230, 1)];
    if (Math.abs(x) > FLAT || Math.abs(y) > FLAT || z === 0) {
      this.refuse('a plane that is tilted', 'a drawing in the plane z = 0');
    }
    return z < 0;
  }

  refuse(found: string, expected: string): never {
    return refuseAt(this.file, this.place, `${found} in ${this.place.name}`, expected);
  }

  #parse({ value, line }: DxfGroup): number {
    const number = NUMBER.test(value) ? Number(value) : Number.NaN;
    if (Number.isFinite(number)) return number;
    return refuseAt(this.file, { line }, quoted(value), 'a number');
  }
}

/**
 * The curves of one entity, metres.
 *
 * @throws RimwrightError `input` for entities that enclose nothing, and for broken ones
 */
export function dxfCurves(entity: DxfEntity, place: Place, unitM: number, file: string): Curve[] {
  const reader = new EntityReader(entity.groups, place, unitM, file);
  const curves = ownCurves(entity, reader, unitM);
  const turn = ['LINE', 'ELLIPSE', 'SPLINE'].includes(entity.type) || !reader.isMirrored();
  return turn ? curves : curves.map(mirrored);
}

function ownCurves(entity: DxfEntity, reader: EntityReader, unitM: number): Curve[] {
  switch (entity.type) {
    case 'LINE':
      return withoutPoints([straight(reader.point(10), reader.point(11))]);
    case 'CIRCLE':
      return arcAbout(reader.point(10), reader.length(40), 0, 2 * Math.PI);
    case 'ARC': {
      const from = reader.number(50) * DEGREE;
      return arcAbout(reader.point(10), reader.length(40), from, spanFrom(from, reader.number(51) * DEGREE));
    }
    case 'ELLIPSE':
      return ellipse(reader);
    case 'SPLINE':
      return spline(reader);
    case 'LWPOLYLINE':
      return polyline(reader.points(10), (reader.number(70, 0) & 1) === 1);
    case 'POLYLINE': {
      const flags = reader.number(70, 0);
      if ((flags & MESH) !== 0) reader.refuse('a mesh', 'flat curves');
      const vertices = entity.vertices
        .map((groups) => new EntityReader(groups, reader.place, unitM, reader.file))
        .filter((vertex) => (vertex.number(70, 0) & FRAME_VERTEX) === 0)
        .map((vertex) => ({ point: vertex.point(10), bulge: vertex.number(42, 0) }));
      return polyline(vertices, (flags & 1) === 1);
    }
    default:
      return refuseAt(
        reader.file,
        reader.place,
        entity.type === '' ? 'an entity without name' : quotedType(entity.type),
        `only ${SUPPORTED.join(', ')}: explode it, or leave it out`,
      );
  }
}

function quotedType(type: string): string {
  return /^[A-Z0-9_]{1,40}$/.test(type) ? `the entity ${type}` : quoted(type);
}

function polyline(vertices: readonly { point: Point; bulge: number }[], isClosed: boolean): Curve[] {
  const count = isClosed ? vertices.length : vertices.length - 1;
  return withoutPoints(
    Array.from({ length: Math.max(0, count) }, (_, k) => {
      const { point, bulge } = vertices[k];
      return bulged({ from: point, to: vertices[(k + 1) % vertices.length].point, bulge });
    }),
  );
}

/** An edge from a point to itself is none. */
function withoutPoints(curves: readonly Curve[]): Curve[] {
  return curves.filter(({ from, to }) => from[0] !== to[0] || from[1] !== to[1]);
}

function ellipse(reader: EntityReader): Curve[] {
  const centre = reader.point(10);
  const major = reader.point(11);
  const ratio = reader.number(40);
  if (!(ratio > 0 && ratio <= 1 + FLAT)) reader.refuse(`an axis ratio of ${ratio}`, 'one above 0, up to 1');
  if (Math.hypot(...major) === 0) reader.refuse('a size of 0', 'a size above 0');
  const side = reader.isMirrored() ? -ratio : ratio;
  const from = reader.number(41, 0);
  const span = spanFrom(from, reader.number(42, 2 * Math.PI));
  // A quarter at a time: halves of a whole ellipse could look flat to a few probes.
  return Array.from({ length: 4 }, (_, k) =>
    curved((t) => {
      const angle = from + ((k + t) * span) / 4;
      const [cos, sin] = [Math.cos(angle), side * Math.sin(angle)];
      return [
        centre[0] + cos * major[0] - sin * major[1],
        centre[1] + cos * major[1] + sin * major[0],
      ] as const;
    }),
  );
}

/** Counter-clockwise from one angle to another, a whole turn where both are the same. */
function spanFrom(from: number, to: number): number {
  const turns = (to - from) / (2 * Math.PI);
  const share = turns - Math.floor(turns);
  return 2 * Math.PI * (share < 1e-12 || share > 1 - 1e-12 ? 1 : share);
}

function spline(reader: EntityReader): Curve[] {
  const points = reader.points(10).map(({ point }) => point);
  if (points.length === 0) reader.refuse('no control points', 'a spline with control points and knots');
  const weights = reader.numbers(41);
  const made = nurbs(reader.number(71), points, reader.numbers(40), weights);
  return typeof made === 'string' ? reader.refuse(made, 'a spline of degree 1 to 10 with its knots') : made;
}

function mirrored({ from, to, at, bulge }: Curve): Curve {
  const turned = ([x, y]: Point): Point => [-x, y];
  return {
    from: turned(from),
    to: turned(to),
    ...(at && { at: (t: number) => turned(at(t)) }),
    ...(bulge !== undefined && { bulge: -bulge }),
  };
}
