/** A value or a group of them, `code value` in turn, as lines of a DXF. */
export type Groups = readonly (string | number)[];

/** A DXF of the given entities; `units` is `$INSUNITS`, 4 for millimetres, null for none. */
export function dxfText(entities: readonly Groups[], units: number | null = 4): string {
  const header = units === null ? [] : [0, 'SECTION', 2, 'HEADER', 9, '$INSUNITS', 70, units, 0, 'ENDSEC'];
  return `${[...header, 0, 'SECTION', 2, 'ENTITIES', ...entities.flat(), 0, 'ENDSEC', 0, 'EOF'].join('\n')}\n`;
}

export function circle(x: number, y: number, radius: number): Groups {
  return [0, 'CIRCLE', 8, '0', 10, x, 20, y, 40, radius];
}

export function line(fromX: number, fromY: number, toX: number, toY: number): Groups {
  return [0, 'LINE', 8, '0', 10, fromX, 20, fromY, 11, toX, 21, toY];
}

/** Angles in degrees. */
export function arc(x: number, y: number, radius: number, from: number, to: number): Groups {
  return [0, 'ARC', 8, '0', 10, x, 20, y, 40, radius, 50, from, 51, to];
}
