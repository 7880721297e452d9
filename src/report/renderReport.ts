import { markupText } from '../draw/plainText.ts';
import { percentText, quantityText } from '../draw/quantityText.ts';
import { CAUTIONS } from './cautions.ts';
import { designSection } from './designSection.ts';
import { designTable } from './designTable.ts';
import type { ReportInput } from './reportInput.ts';
import { REPORT_STYLE } from './reportStyle.ts';
import { scatter } from './scatter.ts';
import { textList } from './textList.ts';

/**
 * The report as one HTML file that needs nothing else: no network, no script, no font. It is well-formed XML too, apart
 * from its first line. The same input always gives the same text.
 */
export function renderReport(input: ReportInput): string {
  // Ids in the page are made from the place in the list: a design's own id may hold any character.
  const anchors = input.designs.map((_, k) => `design-${k + 1}`);
  return [
    '<!DOCTYPE html>',
    '<html lang="en">',
    '<head>',
    '<meta charset="utf-8"/>',
    '<meta name="viewport" content="width=device-width, initial-scale=1"/>',
    `<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'"/>`,
    `<title>${markupText(input.title)}</title>`,
    `<style>${REPORT_STYLE}</style>`,
    '</head>',
    '<body>',
    header(input),
    '<main>',
    designs(input, anchors),
    briefSection(input),
    '<h2 id="run">The run</h2>',
    runList(input),
    endingSection(input),
    '</main>',
    `<footer><p>Written by Rimwright ${markupText(input.version)}.</p></footer>`,
    '</body>',
    '</html>',
    '',
  ].join('\n');
}

function header({ title, designs, targetCorrection, warnings }: ReportInput): string {
  const meeting = designs.filter(({ meetsTarget }) => meetsTarget).length;
  return [
    '<header>',
    `<h1>${markupText(title)}</h1>`,
    `<p>${meeting} of ${designs.length} designs meet the target; it allows a worst correction of ${percentText(targetCorrection)}.</p>`,
    '<nav aria-label="Parts of this report"><a href="#designs">Designs</a><a href="#one-by-one">One by one</a><a href="#brief">Brief</a><a href="#run">Run</a></nav>',
    warnings.length > 0 ? `<h2>Warnings</h2>\n${textList(warnings, '')}` : '',
    '<h2 id="cautions">Before you build</h2>',
    `<div class="caution">${textList(CAUTIONS, '')}</div>`,
    '</header>',
  ].join('\n');
}

function designs(input: ReportInput, anchors: readonly string[]): string {
  if (input.designs.length === 0) return '<h2 id="designs">Designs</h2>\n<p>The run found no design.</p>';
  return [
    '<h2 id="designs">Designs</h2>',
    scatter(input, anchors),
    designTable(input.designs, anchors),
    '<h2 id="one-by-one">The designs, one by one</h2>',
    ...input.designs.map((design, k) => designSection(design, input, anchors[k])),
  ].join('\n');
}

function briefSection({ briefText, defaults }: ReportInput): string {
  const lines = briefText.split(/\r\n|\r|\n/).map(markupText);
  return [
    '<h2 id="brief">The brief as read</h2>',
    `<pre>${lines.join('\n')}</pre>`,
    '<h3>Defaults used</h3>',
    textList(defaults, 'None: the brief gave every key.'),
  ].join('\n');
}

function endingSection({ ending, hints }: ReportInput): string {
  return [
    `<p>${markupText(ending)}</p>`,
    ...(hints.length > 0 ? ['<h3>To get further</h3>', textList(hints, '')] : []),
  ].join('\n');
}

function runList({ version, seed, candidates, evaluations, wavelengthMediumM }: ReportInput): string {
  const rows: [name: string, value: string][] = [
    ['Version', markupText(version)],
    ['Seed', String(seed)],
    ['Candidates asked for', String(candidates)],
    ['Evaluations', String(evaluations)],
    ['Wavelength in the medium', quantityText(wavelengthMediumM, 'm')],
  ];
  return `<dl>${rows.map(([name, value]) => `<div><dt>${name}</dt><dd>${value}</dd></div>`).join('')}</dl>`;
}
