import type { Shelf } from '../base/presetFiles.ts';
import { presetNames, presetText, SHELVES } from '../base/presetFiles.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import { formatQuantity } from '../base/quantity.ts';
import { wrapText } from '../draw/plainText.ts';
import { listIndexModels } from '../optics/shelf.ts';
import { briefJsonSchema } from '../run/briefJsonSchema.ts';
import { jsonText } from '../run/jsonText.ts';
import { listBriefs } from '../run/presetShelf.ts';
import { RESULT_SCHEMAS } from '../run/resultSchemas.ts';
import { listShops } from '../shop/shelf.ts';
import { coloursFor } from './colour.ts';
import { EXIT } from './exit.ts';
import { print } from './notes.ts';
import { oneOf } from './optionRules.ts';
import { TERMINAL_WIDTH } from './table.ts';

/** A preset as the list shows it. */
interface Entry {
  name: string;
  title: string;
  /** What stands under the title. */
  details: string;
}

/** What `--schema` describes. */
const SCHEMAS = ['brief', ...(Object.keys(RESULT_SCHEMAS) as (keyof typeof RESULT_SCHEMAS)[])] as const;

/** Runs `rimwright presets` and gives its exit code. */
export async function run(
  shelfName: string | undefined,
  name: string | undefined,
  options: { json?: true; schema?: true | string },
): Promise<number> {
  if (options.schema !== undefined) {
    const document = options.schema === true ? 'brief' : oneOf('--schema', SCHEMAS)(options.schema);
    print(jsonText(document === 'brief' ? await briefJsonSchema() : RESULT_SCHEMAS[document]()));
    return EXIT.done;
  }
  const folder = presetsFolder();
  const shelf = shelfName === undefined ? undefined : oneOf('presets', SHELVES)(shelfName);
  if (shelf !== undefined && name !== undefined) {
    print(presetText(shelf, oneOf(`presets ${shelf}`, presetNames(shelf, folder))(name), folder).text);
    return EXIT.done;
  }
  const shelves = shelf === undefined ? SHELVES : [shelf];
  if (options.json) {
    print(jsonText(Object.fromEntries(shelves.map((one) => [one, LISTS[one](folder)]))));
    return EXIT.done;
  }
  for (const one of shelves) printShelf(one, folder, one !== shelves[0]);
  return EXIT.done;
}

const LISTS = {
  media: (folder: string) => listIndexModels('media', folder),
  materials: (folder: string) => listIndexModels('materials', folder),
  shops: (folder: string) => listShops(folder),
  briefs: (folder: string) => listBriefs(folder),
} satisfies Record<Shelf, (folder: string) => unknown>;

function entriesOf(shelf: Shelf, folder: string): Entry[] {
  switch (shelf) {
    case 'media':
    case 'materials':
      return LISTS[shelf](folder).map(({ name, title, rangeM, source }) => {
        const [least, most] = rangeM.map((metres) => formatQuantity(metres, 'length'));
        return { name, title, details: `Light from ${least} to ${most}. Source: ${source}` };
      });
    case 'shops':
      return LISTS.shops(folder).map(({ name, title, smallestOpeningM, smallestWebM, source }) => {
        const [opening, web] = [smallestOpeningM, smallestWebM].map((metres) =>
          formatQuantity(metres, 'length'),
        );
        return { name, title, details: `Openings from ${opening}, webs from ${web}. Source: ${source}` };
      });
    case 'briefs':
      return LISTS.briefs(folder).map(({ name, title, about }) => ({ name, title, details: about }));
  }
}

function printShelf(shelf: Shelf, folder: string, isLater: boolean): void {
  const { bold, dim } = coloursFor(process.stdout);
  print(`${isLater ? '\n' : ''}${bold(shelf.toUpperCase())}`);
  for (const { name, title, details } of entriesOf(shelf, folder)) {
    print(`  ${bold(name)}  ${title}`);
    for (const line of wrapText(details, TERMINAL_WIDTH - 6)) print(dim(`      ${line}`));
  }
}
