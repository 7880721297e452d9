import { inputError } from '../base/errors.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import { areaText, percentText } from '../draw/quantityText.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import { designToJson } from '../run/designJson.ts';
import { jsonText } from '../run/jsonText.ts';
import { judgeOutline } from '../run/judgeOutline.ts';
import type { MendedDesign } from '../run/mendDesign.ts';
import { mendDesign } from '../run/mendDesign.ts';
import { openBrief } from '../run/openBrief.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { scoreGiven } from '../run/scoreGiven.ts';
import { present } from '../run/warnings.ts';
import { writeWhole } from '../run/writeWhole.ts';
import { worstOf } from '../score/scores.ts';
import { loadShop } from '../shop/shelf.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readDistance } from './quantityOptions.ts';

interface Options {
  outline?: string;
  design?: string;
  shop?: string;
  distance?: string;
  unit?: LengthUnit;
  out?: string;
  force?: true;
  json?: true;
}

/** Runs `rimwright mend` and gives its exit code: 1 where the outline cannot be mended. */
export async function run(place: string, options: Options): Promise<number> {
  const distance = await readDistance(options.distance);
  const opened = await openBrief(place);
  const { brief } = opened;
  const shop = options.shop === undefined ? brief.task.shop : loadShop(options.shop, presetsFolder());
  if (shop === null) {
    const expected = 'a shop in the brief, or --shop NAME; rimwright presets shops lists them';
    throw inputError([{ file: place, key: 'shop', found: 'none', expected }]);
  }
  const { given, warnings } = chooseDesign(opened, options);
  if (!options.json) noteDefaults(brief.defaults);
  warn(present(warnings));
  const task = { ...brief.task, shop };
  const before = scoreGiven({ ...task, shop: null }, given, judgeOutline(task, given, distance));
  const mended = mendDesign(given, shop);
  if (!mended.fits) {
    if (options.json) print(jsonText({ shop: shop.name, design: null, ...factsOf(mended) }));
    else {
      print(`${given.file} cannot be mended for ${shop.name}:`);
      for (const note of mended.notes) printWrapped(`${note}.`, '  - ');
    }
    return EXIT.target;
  }
  const after = scoreGiven(task, mended.given, judgeOutline(task, mended.given, distance));
  const text = jsonText(designToJson(after));
  if (options.out !== undefined) {
    const file = { path: options.out, text };
    uninterrupted(() => writeWhole([file], options.force ?? false));
  }
  if (options.json) {
    const correction = { before: worstOf(before.scores), after: worstOf(after.scores) };
    print(jsonText({ shop: shop.name, design: designToJson(after), correction, ...factsOf(mended) }));
  } else tell(given.file, shop.name, mended, before, after);
  if (options.out !== undefined && !options.json) print(`\nWritten to ${options.out}`);
  return EXIT.done;
}

function factsOf({ changes, areaM2, notes }: MendedDesign): object {
  const { before, after, difference } = areaM2;
  return { changes, area_m2: { before, after, difference }, notes };
}

function tell(
  file: string,
  shop: string,
  { changes, areaM2, notes }: MendedDesign,
  before: RankedDesign,
  after: RankedDesign,
): void {
  if (changes.length === 0) print(`${file}: nothing to mend, ${shop} can cut it.`);
  else {
    print(`${file}, mended for ${shop}:`);
    for (const change of changes) printWrapped(`${change}.`, '  - ');
  }
  print('');
  const share = areaM2.after / areaM2.before - 1;
  printWrapped(
    `Area ${areaText(areaM2.before)} before, ${areaText(areaM2.after)} after (${signed(share)}); ` +
      `${areaText(areaM2.difference)} belong to only one of the two outlines. ` +
      `Worst correction ${percentText(worstOf(before.scores))} as drawn before, ${percentText(worstOf(after.scores))} as cut after.`,
  );
  for (const note of notes) printWrapped(`${note}.`, '  - ');
}

function signed(share: number): string {
  return `${share < 0 ? '−' : '+'}${percentText(Math.abs(share))}`;
}
