import { presetNames, presetText } from '../base/presetFiles.ts';
import { parseYaml } from '../base/yamlFile.ts';

/** A brief on the shelf, as tables show it. */
export interface ShelfBrief {
  /** The file's name without `.yaml`. */
  name: string;
  title: string;
  /** What it is an example of: the comment at its head. */
  about: string;
}

/** Every brief on the shelf, by name in alphabetical order. */
export function listBriefs(presetsFolder: string): ShelfBrief[] {
  return presetNames('briefs', presetsFolder).map((name) => {
    const { text } = presetText('briefs', name, presetsFolder);
    const { title } = parseYaml(text, `${name}.yaml`).value as { title: string };
    const [about] = /^(?:#.*\n)*/.exec(text) ?? [''];
    return { name, title, about: about.replace(/^# ?/gm, '').trim().replaceAll('\n', ' ') };
  });
}
