import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readDesignFile } from '../../src/run/readDesignFile.ts';
import type { Scores } from '../../src/score/scores.ts';
import { worstOf } from '../../src/score/scores.ts';
import { folderWith, QUICK_BRIEF, runCli } from './runCli.ts';

const SCORES = [
  'gain',
  'correction',
  'lobe',
  'snr',
  'area_m2',
  'radius_m',
  'areaOverFloor',
  'leastAreaOverFloor',
  'shop',
];

/** Discs cannot keep this target for particles off the axis: their best is near 5 %. (For all sizes between it is near 30 %.) */
const DISCS = QUICK_BRIEF.replace('[disc, rings]', '[disc]')
  .replace('1 %', '3 %')
  .replace('[{ diameter: 2 um,', '[{ diameter: 1 um, index: 1.59 }, { diameter: 2 um,')
  .concat('placement: { offset: 20 um }\n');

/** front.json without what depends on the machine. */
function withoutSeconds(front: string): string {
  return front.replace(/"seconds": [\d.e-]+/, '');
}

describe('rimwright search', () => {
  it('writes the same front for any number of workers, each run into a folder of its own', async () => {
    const folder = folderWith({ 'quick.yaml': QUICK_BRIEF });
    const args = ['search', 'quick.yaml', '--candidates', '400', '--seed', '5'];
    const first = await runCli([...args, '--workers', '2'], folder);
    const second = await runCli([...args, '--workers', '1', '--quiet'], folder);
    expect([first.code, second.code]).toEqual([0, 0]);
    expect(readdirSync(join(folder, 'results')).sort()).toEqual(['quick-look', 'quick-look-2']);
    expect(first.stdout).toContain('results/quick-look/\n');
    expect(second.stdout).toContain('results/quick-look-2/\n');
    const [one, two] = ['', '-2'].map((suffix) =>
      readFileSync(join(folder, `results/quick-look${suffix}/front.json`), 'utf8'),
    );
    expect(withoutSeconds(two)).toBe(withoutSeconds(one));
    expect(one).not.toContain('workers');
    // Notes and progress go to standard error; --quiet keeps them back.
    expect(first.stderr).toContain('Defaults used: light.linewidth: 0 nm');
    expect(first.stderr).not.toContain('search.seed');
    expect(second.stderr).toBe('');
    for (const line of first.stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('prints with --json what front.json holds, and fills the folder', async () => {
    const folder = folderWith({ 'quick.yaml': QUICK_BRIEF });
    const { code, stdout } = await runCli(
      ['search', 'quick.yaml', '--json', '--workers', '1', '--out', 'runs/mine'],
      folder,
    );
    expect(code).toBe(0);
    const results = join(folder, 'runs/mine/quick-look');
    expect(readFileSync(join(results, 'front.json'), 'utf8')).toBe(stdout);
    const front = JSON.parse(stdout);
    expect(front.brief.title).toBe('Quick look');
    expect(front.brief.search).toEqual({ candidates: 200, seed: 3 });
    expect(front.evaluations).toBeGreaterThan(0);
    expect(front.seconds).toBeGreaterThan(0);
    expect(front.warnings).toEqual([]);
    for (const design of front.designs) {
      expect(Object.keys(design.scores)).toEqual(SCORES);
      expect(Object.keys(design.scores.correction)).toEqual(['worst', 'rms', 'certified', 'certifiedAt']);
      expect(Object.keys(design.scores.snr)).toEqual(['required', 'time_s']);
      const read = readDesignFile(join(results, `front.json#${design.id}`));
      expect(read.distanceM).toBe(0.02);
      const own = readDesignFile(join(results, `drawings/${design.id}.json`));
      expect(own.elements).toEqual(read.elements);
      for (const format of ['dxf', 'svg', 'gds']) {
        expect(existsSync(join(results, `drawings/${design.id}.${format}`))).toBe(true);
      }
    }
    expect(readdirSync(results).sort()).toEqual([
      'drawings',
      'front.csv',
      'front.json',
      'report.html',
      'run.json',
    ]);
    expect(readdirSync(join(results, 'drawings'))).toHaveLength(4 * front.designs.length);
    const run = JSON.parse(readFileSync(join(results, 'run.json'), 'utf8'));
    expect(run.brief).toEqual({ file: 'quick.yaml', text: QUICK_BRIEF });
    expect(run).toMatchObject({ seed: 3, candidates: 200, node: process.version, stopped: false });
    expect(readFileSync(join(results, 'front.csv'), 'utf8').split('\r\n')).toHaveLength(
      front.designs.length + 2,
    );
    expect(readFileSync(join(results, 'report.html'), 'utf8')).toContain('<title>Quick look</title>');
  });

  it('exits 1 and says what stands in the way where no design meets the target', async () => {
    const folder = folderWith({
      'discs.yaml': DISCS,
      'lobe.yaml': QUICK_BRIEF.replace('correction: 1 %', 'correction: 1 %, lobe: 0.01 %'),
    });
    const correction = await runCli(['search', 'discs.yaml', '--json', '--workers', '1', '--quiet'], folder);
    expect(correction.code).toBe(1);
    const { designs, nearest } = JSON.parse(correction.stdout);
    expect(designs.length).toBeGreaterThan(0);
    const { worst, certified } = nearest.design.scores.correction;
    expect(certified).toBe(Math.min(...designs.map(({ scores }: { scores: Scores }) => worstOf(scores))));
    // The exact fields must meet the target as well; they are read at the samples alone.
    const farther = certified + Math.max(0, nearest.design.otherFields.worst - worst);
    expect(nearest.misses).toEqual([{ limit: 'target.correction', factor: farther / 0.03 }]);
    // No outline here has so small a lobe ratio: the front is empty, and a second search looks for the nearest.
    const lobe = await runCli(['search', 'lobe.yaml', '--workers', '1', '--quiet'], folder);
    expect(lobe.code).toBe(1);
    expect(lobe.stdout).toMatch(/No design meets the target. The nearest is [a-z]+-\d+; in its way stand:/);
    expect(lobe.stdout).toMatch(/- target\.lobe allows 0\.01 %, it has [\d.]+ % \([\d.]+ times\)/);
  });

  it('writes nothing outside of the results folder, whatever the title', async () => {
    const folder = folderWith({
      'evil.yaml': QUICK_BRIEF.replace('Quick look', '"../../../evil/..\\\\=cmd|x"'),
    });
    const { code, stdout } = await runCli(['search', 'evil.yaml', '--workers', '1', '--quiet'], folder);
    expect(code).toBe(0);
    expect(stdout).toContain('results/evil-cmd-x/');
    expect(readdirSync(folder).sort()).toEqual(['evil.yaml', 'results']);
    expect(readdirSync(join(folder, 'results'))).toEqual(['evil-cmd-x']);
  });

  it('does not start where its results cannot go', async () => {
    const folder = folderWith({ results: 'a file', 'quick.yaml': QUICK_BRIEF });
    const { code, stdout, stderr } = await runCli(
      ['search', 'quick.yaml', '--workers', '1', '--quiet'],
      folder,
    );
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toBe(
      'results: found something of that name already, expected a place that can be written\n',
    );
  });
});

describe('rimwright smallest', () => {
  it('prints the design and writes it for the other commands', async () => {
    const folder = folderWith({ 'quick.yaml': QUICK_BRIEF });
    const args = [
      'smallest',
      'quick.yaml',
      '--workers',
      '1',
      '--by',
      'radius',
      '--out',
      'best.json',
      '--json',
    ];
    const { code, stdout } = await runCli(args, folder);
    expect(code).toBe(0);
    const { design, nearest, brief, evaluations, seconds } = JSON.parse(stdout);
    expect(nearest).toBeNull();
    expect(design.scores.correction.worst).toBeLessThanOrEqual(0.01);
    expect([brief.title, evaluations > 0, seconds > 0]).toEqual(['Quick look', true, true]);
    expect(JSON.parse(readFileSync(join(folder, 'best.json'), 'utf8'))).toEqual(design);
    const again = await runCli(args, folder);
    expect(again.code).toBe(2);
    expect(again.stderr).toContain('best.json: found a file of that name');
  });

  it('exits 1 and shows the nearest where none meets the target', async () => {
    const folder = folderWith({ 'lobe.yaml': QUICK_BRIEF.replace('1 %', '1 %, lobe: 0.01 %') });
    const { code, stdout } = await runCli(
      ['smallest', 'lobe.yaml', '--workers', '1', '--json', '--out', 'none.json'],
      folder,
    );
    expect(code).toBe(1);
    const { design, nearest, misses } = JSON.parse(stdout);
    expect(design).toBeNull();
    expect(nearest.scores.lobe.ratio).toBeGreaterThan(1e-4);
    expect(misses[0].limit).toBe('target.lobe');
    expect(existsSync(join(folder, 'none.json'))).toBe(false);
  });
});
