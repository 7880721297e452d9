import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { briefToJson } from '../../src/run/briefJson.ts';
import { openBrief } from '../../src/run/openBrief.ts';
import { folderWith, QUICK_BRIEF, runCli } from './runCli.ts';

const SQUARE_MM = [
  [-0.1, -0.1],
  [0.1, -0.1],
  [0.1, 0.1],
  [-0.1, 0.1],
];

const design = (id: string, distance_m = 0.02) => ({
  id,
  family: 'polygon',
  distance_m,
  elements: [{ weight: 1, rings_mm: [SQUARE_MM] }],
});

/** A folder with a brief and the front of its search, as `rimwright search` would leave them. */
async function searched(runs = 1): Promise<string> {
  const folder = folderWith({ 'brief.yaml': QUICK_BRIEF });
  const { brief } = await openBrief(join(folder, 'brief.yaml'));
  for (let run = 1; run <= runs; run++) {
    const results = join(folder, 'results', run === 1 ? 'quick-look' : `quick-look-${run}`);
    mkdirSync(results, { recursive: true });
    const front = { brief: briefToJson(brief), designs: [design('polygon-1'), design('polygon-2')] };
    writeFileSync(join(results, 'front.json'), JSON.stringify(front));
  }
  return folder;
}

const RESPONSE = ['response', 'brief.yaml', '--from', '1 um', '--to', '2 um', '--count', '2'];

describe('--design without --outline', () => {
  it('takes the design from the brief’s own results, in every command that reads one', async () => {
    const folder = await searched();
    const wanted = ['--design', 'polygon-2'];
    const response = await runCli([...RESPONSE, ...wanted], folder);
    expect(response.code).toBe(0);
    expect(response.stderr).not.toContain('Warning');
    expect(response.stdout).toContain('results/quick-look/front.json#polygon-2, 20 mm behind');
    const reading = await runCli(['reading', 'brief.yaml', ...wanted], folder);
    expect([reading.code, reading.stdout.split(',')[0]]).toEqual([
      0,
      'results/quick-look/front.json#polygon-2',
    ]);
    const both = ['--design', 'polygon-1', '--design', 'polygon-2', '--json'];
    const compared = JSON.parse((await runCli(['compare', 'brief.yaml', ...both], folder)).stdout);
    expect(compared.designs.map(({ id }: { id: string }) => id).sort()).toEqual(['polygon-1', 'polygon-2']);
    expect(compared.warnings).toEqual([]);
    const drawn = await runCli(['draw', 'brief.yaml', ...wanted, '--formats', 'svg'], folder);
    expect([drawn.code, drawn.stdout]).toEqual([0, 'polygon-2.svg\n']);
    const again = ['draw', 'results/quick-look/front.json', ...wanted, '--formats', 'svg', '--out', 'two'];
    expect((await runCli(again, folder)).code).toBe(0);
    // With the brief at hand the sheet tells of the shop and of critical edges as well.
    const [own, plain] = ['polygon-2.svg', 'two/polygon-2.svg'].map((file) =>
      readFileSync(join(folder, file), 'utf8'),
    );
    const pathOf = (svg: string) => /<path [^>]*>/.exec(svg)?.[0];
    expect(pathOf(own)).toContain('data-element="1"');
    expect(pathOf(own)).toBe(pathOf(plain));
    expect(own).toContain('Critical edge');
    expect(plain).not.toContain('Critical edge');
  });

  it('says where it looked, and which designs there are', async () => {
    const folder = await searched();
    const missing = await runCli([...RESPONSE, '--design', 'polygon-9'], folder);
    expect([missing.code, missing.stdout]).toEqual([2, '']);
    expect(missing.stderr).toContain(
      'results/quick-look/front.json: found the id "polygon-9", expected one of the ids polygon-1, polygon-2',
    );
    const elsewhere = folderWith({ 'brief.yaml': QUICK_BRIEF });
    const none = await runCli([...RESPONSE, '--design', 'polygon-1'], elsewhere);
    expect([none.code, none.stdout]).toEqual([2, '']);
    expect(none.stderr).toContain(
      'results/quick-look/front.json: found no such file, expected the results of rimwright search brief.yaml',
    );
    const neither = await runCli(RESPONSE, folder);
    expect([neither.code, neither.stdout]).toEqual([2, '']);
    expect(neither.stderr).toContain('--outline: found no outline, expected --outline FILE, or --design ID');
  });

  it('warns of results of another brief, and of later runs', async () => {
    const folder = await searched(3);
    const changed = QUICK_BRIEF.replace('635 nm', '532 nm').replace('1 %', '2 %');
    writeFileSync(join(folder, 'brief.yaml'), changed);
    const { code, stderr } = await runCli([...RESPONSE, '--design', 'polygon-1'], folder);
    const said = stderr.replace(/\s+/g, ' ');
    expect(code).toBe(0);
    expect(said).toContain(
      'results/quick-look/front.json was made from another brief than brief.yaml is now: light, target differ.',
    );
    expect(said).toContain(
      'results/quick-look is the first of 3 runs: --outline results/quick-look-3/front.json',
    );
  });
});
