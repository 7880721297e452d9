import type { Command } from './commander.ts';
import { lengthUnit } from './optionRules.ts';
import type { Done } from './optionTexts.ts';
import { AS_JSON, UNIT } from './optionTexts.ts';

/** Commands that hand out files: drawings, and what is on the shelf. */
export function declareFiles(program: Command, done: Done): void {
  program
    .command('draw')
    .summary('drawings for the shop')
    .description(
      'Draws a design for the shop: DXF and GDSII at true size, and an SVG sheet to read. CSV and JSON keep its points.',
    )
    .argument(
      '<design>',
      "a design's JSON, front.json#ID, an outline with --distance, or a brief with --design",
    )
    .option('--design <id>', "a design of that front.json, or of the brief's own results")
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--distance <length>', 'distance from particle to mask, for the notes on the sheet')
    .option('--out <dir>', 'folder to draw into', '.')
    .option('--formats <list>', 'any of dxf, svg, gds, csv and json', 'dxf,svg')
    .option('--force', 'replace drawings that are there')
    .addHelpText(
      'after',
      `
Example:
  $ rimwright draw results/my/front.json#rings-1 --out shop --formats dxf
  $ rimwright draw my.yaml --design rings-1 --out shop
  $ rimwright draw mask.gds --distance "20 mm" --formats svg,csv`,
    )
    .action(async (design, options) => done(await (await import('./drawCommand.ts')).run(design, options)));

  program
    .command('mend')
    .summary('the nearest outline that a shop can cut')
    .description(
      'Changes an outline as little as its shop asks for: bridges for islands, slots and webs wide enough, corners and vertices as cut. Says what was changed, where, and what it does to the correction.',
    )
    .argument('<brief>', "a brief's path, or a name on the shelf")
    .option('--outline <file>', "an outline's file, or front.json#ID")
    .option('--design <id>', "a design of that front.json, or of the brief's own results")
    .option('--unit <unit>', UNIT, lengthUnit)
    .option('--shop <name>', "a shop on the shelf, in place of the brief's")
    .option('--distance <length>', 'distance from particle to mask, for outlines without one')
    .option('--out <file>', "the mended design's own JSON; draw makes drawings of it")
    .option('--force', 'replace a file that is there')
    .option('--json', AS_JSON)
    .addHelpText(
      'after',
      `
Example:
  $ rimwright mend my.yaml --outline ring.csv --distance "20 mm" \\
      --shop photo-etching --out ring-mended.json
  $ rimwright draw ring-mended.json

Exit code 1 where no outline nearby can be cut.`,
    )
    .action(async (brief, options) => done(await (await import('./mendCommand.ts')).run(brief, options)));

  program
    .command('presets')
    .summary('what is on the shelf')
    .description('Lists media, materials, shops and briefs that briefs can name, or prints one of them.')
    .argument('[shelf]', 'media, materials, shops or briefs')
    .argument('[name]', 'print this one')
    .option('--json', AS_JSON)
    .option(
      '--schema [of]',
      'print a JSON Schema: of a brief, by which editors complete it, or of what search, smallest, reading or response print',
    )
    .addHelpText(
      'after',
      `
Example:
  $ rimwright presets media
  $ rimwright presets briefs road-dust > my.yaml
  $ rimwright presets --schema > brief.schema.json
  $ rimwright presets --schema search > front.schema.json`,
    )
    .action(async (shelf, name, options) =>
      done(await (await import('./presetsCommand.ts')).run(shelf, name, options)),
    );
}
