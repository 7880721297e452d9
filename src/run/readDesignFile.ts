import { existsSync } from 'node:fs';
import { basename, extname } from 'node:path';
import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import type { ReadOutline } from '../outline/files/drawnOutline.ts';
import { MOST_FILE_BYTES } from '../outline/files/drawnPath.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { readDxf } from '../outline/files/readDxf.ts';
import { readGds } from '../outline/files/readGds.ts';
import { readSvg } from '../outline/files/readSvg.ts';
import { orientByNesting } from '../outline/nesting.ts';
import { readOutlineCsv } from '../outline/readOutlineCsv.ts';
import { hasRingColumn, readRingsCsv } from '../outline/readRingsCsv.ts';
import type { GivenDesign } from './givenDesign.ts';
import { readDesignJson } from './readDesignJson.ts';
import { readFileBytes, readTextFile } from './readTextFile.ts';
import { slug } from './slug.ts';

const MOST_BYTES = 20_000_000;

/**
 * Reads an outline from a file: CSV, DXF, SVG, GDSII, a design's own JSON, or one of the designs of a front.json. The name's ending says which it
 * is, in capitals or not; a text that begins with a brace is JSON, and all else CSV.
 *
 * @param place a path, or a path and a design's id: `front.json#rings-2`
 * @param id which design of a front, unless `place` says so; not needed where there is only one
 * @param unit of a drawing that states none
 * @throws RimwrightError `input` for what is missing, too long or broken; `machine` where the disk fails
 */
export function readDesignFile(place: string, id?: string, unit: LengthUnit | null = null): GivenDesign {
  const { path, wanted } = splitPlace(place, id);
  const ending = extname(path).toLowerCase();
  if (DRAWING_ENDINGS.includes(ending)) {
    if (wanted !== undefined) refuseId(place, wanted);
    return givenOutline(place, path, readDrawing(path, ending, unit));
  }
  const text = readTextFile(path, MOST_BYTES);
  const isJson = ending === '.json' || /^\s*\{/.test(text);
  if (isJson) return readDesignJson(oneDesign(parseJson(text, path), wanted, path), place);
  if (wanted !== undefined) refuseId(place, wanted);
  const elements = hasRingColumn(text)
    ? readRingsCsv(text, path)
    : [{ weight: 1, rings: orientByNesting([readOutlineCsv(text, path)]) }];
  return givenOutline(place, path, { elements, notes: [] });
}

const DRAWING_ENDINGS = ['.dxf', '.svg', '.gds', '.gdsii', '.gds2'];

function readDrawing(path: string, ending: string, unit: LengthUnit | null): ReadOutline {
  if (ending === '.svg') return readSvg(readTextFile(path, MOST_FILE_BYTES), path, unit);
  const bytes = readFileBytes(path, MOST_FILE_BYTES);
  if (ending !== '.dxf') return readGds(bytes, path);
  // Older drawings have other encodings, which only touches remarks and the names of layers.
  return readDxf(new TextDecoder().decode(bytes), path, unit);
}

function givenOutline(place: string, path: string, { elements, notes }: ReadOutline): GivenDesign {
  return {
    id: slug(basename(path, extname(path))),
    family: 'given',
    distanceM: null,
    elements,
    file: place,
    ...(notes.length > 0 && { notes }),
  };
}

function refuseId(place: string, id: string): never {
  throw inputError([
    { file: place, found: `the id ${JSON.stringify(id)}`, expected: 'a front.json with it' },
  ]);
}

/** A file's name may hold a `#` of its own. */
function splitPlace(place: string, id: string | undefined): { path: string; wanted: string | undefined } {
  const at = place.lastIndexOf('#');
  if (at <= 0 || existsSync(place)) return { path: place, wanted: id };
  return { path: place.slice(0, at), wanted: place.slice(at + 1) };
}

function parseJson(text: string, file: string): unknown {
  try {
    return JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    // The parser quotes the file, which may hold line breaks.
    const reason = (error as Error).message.replace(/\s+/g, ' ').slice(0, 200);
    throw inputError([
      { file, found: `text that is not JSON (${reason})`, expected: 'a design or a front.json' },
    ]);
  }
}

/** The design itself, one of a front's, or that of `rimwright smallest --json`. */
function oneDesign(value: unknown, id: string | undefined, file: string): unknown {
  const { designs, design } = (value ?? {}) as { designs?: unknown; design?: unknown };
  if (!Array.isArray(designs)) return design ?? value;
  const ids = designs.map((one: unknown) => String((one as { id?: unknown } | null)?.id));
  if (id === undefined && designs.length === 1) return designs[0];
  const at = id === undefined ? -1 : ids.indexOf(id);
  if (at >= 0) return designs[at];
  const nearest = id === undefined ? undefined : nearestName(id, ids);
  const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
  const found = id === undefined ? `${designs.length} designs and no id` : `the id ${JSON.stringify(id)}`;
  const known =
    ids.length === 0 ? 'a front with designs' : `one of the ids ${ids.slice(0, 30).join(', ')}${hint}`;
  throw inputError([{ file, found, expected: known }]);
}
