import type { ArcSegment, Segment } from '../outline/segment.ts';
import { isClosed } from '../outline/segment.ts';
import type { Loop, Shape, ShapeElement } from '../outline/shape.ts';
import { BRIDGE_ROOM, BRIDGES } from './bridges.ts';
import type { ShopRules } from './shopRules.ts';

/**
 * Rings as a shop can cut them whose islands fall out: each parted by three straight bridges, in the same directions for all. They
 * are as wide as its smallest web. The sectors between them are exact curves.
 *
 * @returns the shape itself where nothing falls out, its islands are not circles about the axis, or one is too small to hang on bridges
 */
export function bridgedShape(shape: Shape, rules: ShopRules | null): Shape {
  if (rules === null || rules.islands === 'held') return shape;
  const halfM = (rules.smallestWebM * BRIDGE_ROOM) / 2;
  let isBridged = false;
  const elements = shape.elements.map((element): ShapeElement => {
    const loops = bridgedLoops(element.loops, halfM);
    if (loops === null) return element;
    isBridged = true;
    return { ...element, loops };
  });
  return isBridged ? { ...shape, elements, folds: BRIDGES, mirror: true } : shape;
}

/** Loops with their rings parted; null where there is nothing to part, or it cannot be done. */
function bridgedLoops(loops: readonly Loop[], halfM: number): Loop[] | null {
  const rims = loops.map(centredCircle);
  if (loops.length < 2 || !rims.every((radiusM) => radiusM !== null)) return null;
  const radii = [...rims].sort((a, b) => b - a);
  const bridged: Loop[] = [];
  for (let k = 0; k < radii.length; k += 2) {
    const [outerM, innerM] = [radii[k], radii[k + 1]];
    if (innerM === undefined) bridged.push(loops[rims.indexOf(outerM)]);
    else if (Math.asin(Math.min(1, halfM / innerM)) >= Math.PI / BRIDGES) return null;
    else bridged.push(...sectors(outerM, innerM, halfM));
  }
  return bridged;
}

/** Radius of a loop that is one circle about the axis, else null. */
function centredCircle(loop: Loop): number | null {
  const [only] = loop;
  const isCircle = loop.length === 1 && only.kind === 'arc' && isClosed(only);
  return isCircle && only.centre[0] === 0 && only.centre[1] === 0 ? only.radius : null;
}

function sectors(outerM: number, innerM: number, halfM: number): Loop[] {
  const turn = (2 * Math.PI) / BRIDGES;
  return Array.from({ length: BRIDGES }, (_, k) => {
    const [from, to] = [k * turn, (k + 1) * turn];
    const [far, near] = [outerM, innerM].map((radius) => Math.asin(halfM / radius));
    const outer = arc(outerM, from + far, to - far);
    const inner = arc(innerM, to - near, from + near);
    return [outer, line(end(outer, 1), end(inner, 0)), inner, line(end(inner, 1), end(outer, 0))];
  });
}

function arc(radius: number, from: number, to: number): ArcSegment {
  return { kind: 'arc', centre: [0, 0], radius, from, to };
}

function line(from: [number, number], to: [number, number]): Segment {
  return { kind: 'line', from, to };
}

function end({ radius, from, to }: ArcSegment, at: 0 | 1): [number, number] {
  const phi = at === 0 ? from : to;
  return [radius * Math.cos(phi), radius * Math.sin(phi)];
}
