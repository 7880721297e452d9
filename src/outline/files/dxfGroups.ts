import { inputError } from '../../base/errors.ts';
import { quoted, refuseAt } from './drawnPath.ts';

/** A DXF file is a list of groups: a code that tells the kind, and a value, each in a line of its own. */
export interface DxfGroup {
  code: number;
  value: string;
  /** Line of the value. */
  line: number;
}

/** An object of the drawing with its groups; a POLYLINE also has those of its vertices. */
export interface DxfEntity {
  type: string;
  line: number;
  groups: readonly DxfGroup[];
  /** VERTEX entities of a POLYLINE. */
  vertices: readonly (readonly DxfGroup[])[];
}

export interface DxfFile {
  /** Value of `$INSUNITS`, where it is set. */
  units: { code: number; line: number } | null;
  entities: DxfEntity[];
}

/**
 * Splits a DXF text into what an outline needs: the unit and the entities. Tables, blocks and objects are passed over.
 *
 * @throws RimwrightError `input` where lines are no groups, or there are no entities
 */
export function readDxfGroups(text: string, file: string): DxfFile {
  if (text.includes('\0')) {
    throw inputError([{ file, found: 'a binary file', expected: 'a DXF in text form' }]);
  }
  const groups = splitGroups(text, file);
  const sections = new Map<string, DxfGroup[]>();
  let section: DxfGroup[] | null = null;
  groups.forEach(({ code, value }, k) => {
    if (code === 0 && value === 'SECTION') {
      const name = groups[k + 1]?.code === 2 ? groups[k + 1].value : '';
      section = sections.get(name) ?? [];
      sections.set(name, section);
    } else if (code === 0 && value === 'ENDSEC') section = null;
    else section?.push(groups[k]);
  });
  const entities = sections.get('ENTITIES');
  if (entities === undefined) {
    throw inputError([{ file, found: 'no ENTITIES section', expected: 'a DXF drawing' }]);
  }
  return { units: unitsOf(sections.get('HEADER') ?? [], file), entities: entitiesOf(entities, file) };
}

function splitGroups(text: string, file: string): DxfGroup[] {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  const groups: DxfGroup[] = [];
  for (let k = 0; k + 1 < lines.length; k += 2) {
    const code = lines[k].trim();
    if (!/^\d{1,4}$/.test(code)) {
      refuseAt(file, { line: k + 1 }, quoted(lines[k]), 'a group code of DXF, such as 0');
    }
    const group = { code: Number(code), value: lines[k + 1].trim(), line: k + 2 };
    if (group.code === 0 && group.value === 'EOF') return groups;
    groups.push(group);
  }
  return refuseAt(file, { line: lines.length }, 'the end of the file', 'a DXF that ends with EOF');
}

function unitsOf(header: readonly DxfGroup[], file: string): DxfFile['units'] {
  const at = header.findIndex(({ code, value }) => code === 9 && value === '$INSUNITS');
  const group = header[at + 1];
  if (at < 0 || group === undefined) return null;
  if (!/^\d{1,2}$/.test(group.value)) {
    refuseAt(file, { line: group.line }, quoted(group.value), 'a unit for $INSUNITS, such as 4 for mm');
  }
  return { code: Number(group.value), line: group.line };
}

function entitiesOf(groups: readonly DxfGroup[], file: string): DxfEntity[] {
  const entities: DxfEntity[] = [];
  let vertices: DxfGroup[][] | null = null;
  let current: DxfGroup[] | null = null;
  for (const group of groups) {
    if (group.code !== 0) {
      current?.push(group);
      continue;
    }
    current = [];
    if (vertices !== null && group.value === 'VERTEX') {
      vertices.push(current);
    } else if (vertices !== null && group.value === 'SEQEND') {
      vertices = null;
      current = null;
    } else if (vertices !== null) {
      refuseAt(
        file,
        { line: group.line },
        quoted(group.value),
        'a VERTEX or SEQEND of the POLYLINE before it',
      );
    } else {
      vertices = group.value === 'POLYLINE' ? [] : null;
      entities.push({ type: group.value, line: group.line, groups: current, vertices: vertices ?? [] });
    }
  }
  if (vertices !== null) {
    const { line } = entities[entities.length - 1];
    refuseAt(file, { line }, 'a POLYLINE without end', 'a SEQEND after its vertices');
  }
  return entities;
}
