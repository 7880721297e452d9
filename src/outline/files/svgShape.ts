/** Attributes of an element. */
export type Attributes = Readonly<Record<string, string>>;

const NUMBER = /^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*(px)?\s*$/;

export const SVG_SHAPES = ['path', 'polygon', 'polyline', 'line', 'rect', 'circle', 'ellipse'];

/**
 * Path data that draw a basic shape as the standard does (SVG 1.1, chapter 9).
 *
 * @returns null where an attribute is no number in user units, or has a size that cannot be
 */
export function svgShapeData(name: string, attributes: Attributes): string | null {
  const number = (key: string, otherwise: number | null = 0) => {
    if (attributes[key] === undefined) return otherwise ?? Number.NaN;
    return Number(NUMBER.exec(attributes[key])?.[1] ?? Number.NaN);
  };
  switch (name) {
    case 'path':
      return attributes.d ?? '';
    case 'polygon':
      return closed(attributes.points ?? '', ' Z');
    case 'polyline':
      return closed(attributes.points ?? '', '');
    case 'line':
      return ifFinite([number('x1'), number('y1'), number('x2'), number('y2')], (values) => `M${values}`);
    case 'circle': {
      const radius = number('r');
      return ellipseData(number('cx'), number('cy'), radius, radius);
    }
    case 'ellipse':
      return ellipseData(number('cx'), number('cy'), number('rx', null), number('ry', null));
    default: {
      const [width, height] = [number('width'), number('height')];
      const rx = number('rx', number('ry', 0));
      const ry = number('ry', number('rx', 0));
      return rectangleData(number('x'), number('y'), width, height, rx, ry);
    }
  }
}

function closed(points: string, end: string): string {
  return points.trim() === '' ? '' : `M ${points}${end}`;
}

function ifFinite(values: readonly number[], data: (text: string) => string): string | null {
  return values.every(Number.isFinite) ? data(values.join(' ')) : null;
}

function ellipseData(x: number, y: number, rx: number, ry: number): string | null {
  if (!(rx >= 0 && ry >= 0)) return null;
  if (rx === 0 || ry === 0) return '';
  const half = (to: number) => `A${rx} ${ry} 0 0 1 ${to} ${y}`;
  return ifFinite([x, y, rx, ry], () => `M${x + rx} ${y} ${half(x - rx)} ${half(x + rx)} Z`);
}

function rectangleData(
  x: number,
  y: number,
  width: number,
  height: number,
  rawX: number,
  rawY: number,
): string | null {
  if (!(width >= 0 && height >= 0 && rawX >= 0 && rawY >= 0)) return null;
  if (width === 0 || height === 0) return '';
  const [rx, ry] = [Math.min(rawX, width / 2), Math.min(rawY, height / 2)];
  const [right, bottom] = [x + width, y + height];
  return ifFinite([x, y, width, height, rx, ry], () => {
    if (rx === 0 || ry === 0) return `M${x} ${y} H${right} V${bottom} H${x} Z`;
    const corner = (toX: number, toY: number) => `A${rx} ${ry} 0 0 1 ${toX} ${toY}`;
    return [
      `M${x + rx} ${y} H${right - rx}`,
      corner(right, y + ry),
      `V${bottom - ry}`,
      corner(right - rx, bottom),
      `H${x + rx}`,
      corner(x, bottom - ry),
      `V${y + ry}`,
      corner(x + rx, y),
      'Z',
    ].join(' ');
  });
}
