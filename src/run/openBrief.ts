import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import { presetNames, presetText } from '../base/presetFiles.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import { MAX_YAML_BYTES } from '../base/yamlFile.ts';
import type { Brief } from './brief.ts';
import { readBrief } from './readBrief.ts';
import { readTextFile } from './readTextFile.ts';

/** A brief with the text that it was read from. */
export interface OpenedBrief {
  brief: Brief;
  text: string;
  /** As the user named it. */
  file: string;
}

/** What stands in place of a brief's own `search` keys. */
export interface SearchOverrides {
  candidates?: number;
  seed?: number;
}

/**
 * Opens a brief by its path, or where there is no such file by its name on the shelf.
 *
 * @throws RimwrightError `input` where there is neither, or as `readBrief`; `machine` where the disk fails
 */
export async function openBrief(place: string, overrides: SearchOverrides = {}): Promise<OpenedBrief> {
  const presets = presetsFolder();
  const text = briefText(place, presets);
  const folder = existsSync(place) ? dirname(place) : join(presets, 'briefs');
  const brief = await readBrief(text, place, presets, folder);
  return { brief: overridden(brief, overrides), text, file: place };
}

function briefText(place: string, presets: string): string {
  if (existsSync(place)) return readTextFile(place, MAX_YAML_BYTES);
  const names = presetNames('briefs', presets);
  if (names.includes(place)) return presetText('briefs', place, presets).text;
  const nearest = nearestName(place, names);
  const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
  const expected = `a brief's path, or one of the briefs on the shelf: ${names.join(', ')}${hint}`;
  throw inputError([{ file: place, found: 'no such file', expected }]);
}

function overridden(brief: Brief, overrides: SearchOverrides): Brief {
  const keys = Object.keys(overrides);
  const isOverridden = (line: string) => keys.some((key) => line.startsWith(`search.${key}: `));
  return {
    ...brief,
    search: { ...brief.search, ...overrides },
    defaults: brief.defaults.filter((line) => !isOverridden(line)),
  };
}
