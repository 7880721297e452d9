import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { judgeOutline } from '../../src/run/judgeOutline.ts';
import { readBrief } from '../../src/run/readBrief.ts';
import { readDesignFile } from '../../src/run/readDesignFile.ts';
import { scoreGiven } from '../../src/run/scoreGiven.ts';
import { folderWith, runHere } from './runCli.ts';

const RADIUS_MM = 0.1127;
const DISC = `x_mm,y_mm\n${Array.from({ length: 180 }, (_, i) => {
  const angle = (2 * Math.PI * i) / 180;
  return `${RADIUS_MM * Math.cos(angle)},${RADIUS_MM * Math.sin(angle)}\n`;
}).join('')}`;

const BRIEF = `light: { wavelength: 635 nm, irradiance: 5 W/cm^2 }
medium: 1.0
particles: [{ diameter: 1 um to 4 um, index: 1.59 }]
placement: { offset: 5 um }
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 3 %, gain: free }
uncertainties: { averaging: 5 ms, irradiance: 0 %, responsivity: 0 %, lightDrift: 0 %, nonlinearity: 0 %,
  distance: 0 um, wavelength: 0 nm }
`;
const HEADER = 'power_without_uW,power_with_uW,label,reference_diameter_um,reference_uncertainty_um\n';

interface Row {
  line: number;
  grade: string;
  reasons: string[];
  extinction_m2: number | null;
  expandedUncertainty_m2: number | null;
  diameters_m: number[];
  diameterInterval_m: [number, number] | null;
}

/** Rows as this instrument would see them: spheres of 40 sizes, each at 26 places at random, with the noise of its detector. */
async function madeByPhysics(folder: string, wrongGain: number, isReference = (_: number) => false) {
  const { task } = await readBrief(BRIEF, 'brief.yaml');
  const given = readDesignFile(join(folder, 'disc.csv'), undefined);
  const random = randomStream(7);
  const diametersM = Array.from({ length: 40 }, () => (1 + 3 * random.uniform()) * 1e-6);
  const positions = new Float64Array(52);
  for (let p = 0; p < positions.length; p += 2) {
    const [radius, angle] = [5e-6 * Math.sqrt(random.uniform()), 2 * Math.PI * random.uniform()];
    positions.set([radius * Math.cos(angle), radius * Math.sin(angle)], p);
  }
  const [sphere] = task.particles;
  const particles = diametersM.map((diameterM) => ({ ...sphere, diameterM }));
  const judged = judgeOutline({ ...task, particles } as typeof task, given, null);
  const { ratios } = judged.judge.outlineRatios(given.elements, judged.distanceM, positions);
  const { scores } = scoreGiven(task, given, judgeOutline(task, given, null));
  const irradiance = 5e4;
  const withoutW = irradiance * scores.area_m2;
  // Shot noise and the circuit's own, over a bandwidth of half of one over the averaging time.
  const noiseA = Math.sqrt((2 * 1.602176634e-19 * 0.42 * withoutW + 2e-12 ** 2) / (2 * 5e-3));
  const noise = () => (noiseA / 0.42) * random.normal();
  let text = HEADER;
  const truths: number[] = [];
  judged.judge.scenarios.forEach(({ extinctionM2 }, s) => {
    ratios[s].forEach((ratio) => {
      const withW = withoutW - irradiance * ratio * wrongGain * extinctionM2 + noise();
      const reference = isReference(s) ? `${diametersM[s] * 1e6},0` : ',';
      text += `${(withoutW + noise()) * 1e6},${withW * 1e6},sphere ${s},${reference}\n`;
      truths.push(extinctionM2);
    });
  });
  return { text, truths, diametersM, gain: scores.gain };
}

async function evaluate(files: Record<string, string>, ...args: string[]) {
  const folder = folderWith({ 'brief.yaml': BRIEF, 'disc.csv': DISC, ...files });
  const at = (name: string) => join(folder, name);
  const outcome = await runHere([
    ...['evaluate', at('brief.yaml'), '--outline', at('disc.csv'), '--data', at('data.csv')],
    ...args.map((arg) => arg.replace('DIR', folder)),
  ]);
  return { ...outcome, folder };
}

const coverageOf = (rows: readonly Row[], truths: readonly number[]) =>
  rows.filter(
    ({ extinction_m2, expandedUncertainty_m2 }, i) =>
      Math.abs((extinction_m2 ?? Number.NaN) - truths[i]) <= (expandedUncertainty_m2 ?? 0),
  ).length / rows.length;

describe('rimwright evaluate', () => {
  it('recovers the extinctions and diameters of 1040 spheres within what it states', async () => {
    const { text, truths, diametersM, gain } = await madeByPhysics(folderWith({ 'disc.csv': DISC }), 1);
    const { code, stdout, folder } = await evaluate({ 'data.csv': text }, '--json');
    expect(code).toBe(0);
    const found = JSON.parse(stdout);
    const rows: Row[] = found.rows;
    expect([rows.length, found.calibration]).toEqual([1040, null]);
    expect(found.gain.value).toBeCloseTo(gain, 9);
    // Noise and places are drawn afresh for each row; their correction is known by its worst alone, so somewhat more are held.
    const held = coverageOf(rows, truths);
    expect(held).toBeGreaterThan(0.95 - 3.5 * Math.sqrt((0.95 * 0.05) / 1040));
    expect(rows.filter(({ grade }) => grade === 'good').length).toBeGreaterThan(1030);
    const ofDiameters = rows.filter(({ diameterInterval_m }, i) => {
      const [least, most] = diameterInterval_m ?? [0, 0];
      const diameterM = diametersM[Math.floor(i / 26)];
      return diameterM >= least && diameterM <= most;
    }).length;
    expect(ofDiameters / 1040).toBeGreaterThan(0.99);
    // The data stay as they were.
    expect(readFileSync(join(folder, 'data.csv'), 'utf8')).toBe(text);
  });

  it('finds a gain that is 7 % off by reference spheres, and an outlier among them', async () => {
    const made = await madeByPhysics(folderWith({ 'disc.csv': DISC }), 1.07, (s) => s % 4 === 0);
    const lines = made.text.split('\n');
    // Line 5 is a reference sphere's: a third of its signal is lost.
    const [without, other, ...rest] = lines[4].split(',');
    lines[4] = [without, Number(other) + (Number(without) - Number(other)) / 3, ...rest].join(',');
    const data = { 'data.csv': lines.join('\n') };
    const asItIs = JSON.parse((await evaluate(data, '--json')).stdout);
    const omitted = JSON.parse((await evaluate(data, '--json', '--omit', 'outliers')).stdout);
    const [first, second] = [asItIs.calibration, omitted.calibration];
    expect([first.used, second.used, first.readings.length]).toEqual([260, 259, 260]);
    const outliers = first.readings.filter(({ isOutlier }: { isOutlier: boolean }) => isOutlier);
    expect(outliers.map(({ line }: { line: number }) => line)).toEqual([5]);
    expect(outliers[0].isUsed).toBe(true);
    expect(outliers[0].residual).toBeLessThan(-3);
    expect(first.withoutOutliers.gain).toBeCloseTo(second.gain, 12);
    expect(second.birge).toBeLessThan(1.3);
    expect(Math.abs(second.gain / (1.07 * made.gain) - 1)).toBeLessThan(
      (3 * second.standardUncertainty) / second.gain,
    );
    expect(second.standardUncertainty / second.gain).toBeLessThan(0.01);
    expect(omitted.gain).toMatchObject({ value: second.gain, isFitted: true });
    const others = omitted.rows.filter((_: Row, i: number) => i !== 3);
    const truths = made.truths.filter((_, i) => i !== 3);
    expect(coverageOf(others, truths)).toBeGreaterThan(0.95 - 3.5 * Math.sqrt((0.95 * 0.05) / 1040));
    // With the design's gain most of them are wrong by 7 %.
    const kept = JSON.parse((await evaluate(data, '--json', '--keep-gain')).stdout);
    expect(kept.gain.isFitted).toBe(false);
    expect(coverageOf(kept.rows, made.truths)).toBeLessThan(0.5);
    expect(kept.calibration.gain).toBeCloseTo(first.gain, 12);
  });

  const MIXED = `${HEADER}1995,1993,good one,,
overload,12,=HYPERLINK("x"),,
-1,2,+neg,,
1995,1995.5,@swap,,
1995,1993,good one,,
3000,3000,-sat,,
`.replace('=HYPERLINK("x")', '"=HYPERLINK(""x"")"');

  it('marks rows with the reason, in their order, and makes labels harmless on output', async () => {
    const { code, stdout, folder } = await evaluate(
      { 'data.csv': MIXED },
      ...['--saturation', '2.5 mW', '--csv', 'DIR/out.csv'],
    );
    expect(code).toBe(0);
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    const cells = readFileSync(join(folder, 'out.csv'), 'utf8').trimEnd().split('\r\n');
    expect(cells[0]).toBe(
      'line,label,extinction_um2,standard_uncertainty_um2,expanded_uncertainty_um2,diameters_um,diameter_least_um,diameter_most_um,grade,reasons',
    );
    expect(cells.length).toBe(7);
    expect(cells[2]).toBe(
      `3,"'=HYPERLINK(""x"")",,,,,,,unusable,"power_without_uW is not a number: ""overload"""`,
    );
    expect(cells[3]).toBe("4,'+neg,,,,,,,unusable,negative power without the particle");
    expect(cells[4]).toMatch(
      /^5,'@swap,-[\d.]+,.*,doubtful,more light with the particle than without; outside of/,
    );
    expect(cells[5]).toMatch(/^6,good one,.*,doubtful,the same as line 2$/);
    expect(cells[6]).toBe("7,'-sat,,,,,,,unusable,saturated without the particle");
    expect(readFileSync(join(folder, 'data.csv'), 'utf8')).toBe(MIXED);
    const again = await evaluate({ 'data.csv': MIXED, 'out.csv': 'mine' }, '--csv', 'DIR/out.csv');
    expect([again.code, readFileSync(join(again.folder, 'out.csv'), 'utf8')]).toEqual([2, 'mine']);
  });

  it('says what a table cannot show, and which columns it did not use', async () => {
    const rows = Array.from({ length: 50 }, (_, i) => `${1995 + i / 100},1993,${i}\n`).join('');
    const data = `power_without_uW,power_with_uW,weather\n${rows}`;
    const { stdout, stderr } = await evaluate({ 'data.csv': data });
    expect(stdout).toContain('… and 10 more: --csv FILE writes them all.');
    expect(stderr).toContain('Columns that were not used: weather');
    expect(stderr).toContain('uncertainties.gain: 0 %');
  });

  it('doubts rows in other light than the reference spheres were in', async () => {
    const rows = [2, 2.01, 2.02].map((signal) => `1995,${1995 - signal},ref,3,0.01\n`).join('');
    const data = `${HEADER}${rows}1900,1898,dim,,\n1996,1994,like them,,\n`;
    const found: Row[] = JSON.parse((await evaluate({ 'data.csv': data }, '--json')).stdout).rows;
    expect(found[3].reasons).toEqual(["light 4.8 % below the references'"]);
    expect(found[4].reasons).toEqual([]);
  });

  it('leaves named lines out of the fit, and says what to do without a material', async () => {
    const rows = [2, 2.01, 2.02].map((signal) => `1995,${1995 - signal},ref,3,0.01\n`).join('');
    const { stdout, stderr } = await evaluate({ 'data.csv': HEADER + rows }, '--omit', '3');
    expect(stdout).toMatch(/Gain from 2 readings of reference spheres/);
    expect(stdout).toMatch(/left out/);
    // These spheres of 3 µm should take 1.86 µW.
    expect(stderr).not.toContain('The fitted gain is');
    const wild = await evaluate({ 'data.csv': `${HEADER}1995,1990,ref,3,0.01\n` });
    expect(wild.stderr.replaceAll(/\s+/g, ' ')).toMatch(/The fitted gain is 1\d0 % above the design's/);
    const unusable = await evaluate({ 'data.csv': `${HEADER}x,1,ref,3,0.01\n` });
    expect(unusable.stderr.replaceAll(/\s+/g, ' ')).toContain('No row with a reference sphere can be used');
    const stray = await evaluate({ 'data.csv': HEADER + rows }, '--omit', '3, 9');
    expect([stray.code, stray.stdout]).toEqual([2, '']);
    expect(stray.stderr).toContain('--omit: found 9, expected lines of reference spheres that can be used');
    const all = await evaluate({ 'data.csv': HEADER + rows }, '--omit', '2,3,4');
    expect(all.stderr).toContain('--omit: found every line with a reference sphere, expected one at least');
    const far = await evaluate({ 'data.csv': `${HEADER}1995,1993,ref,9000,0.01\n` });
    expect([far.code, far.stdout]).toEqual([2, '']);
    expect(far.stderr).toContain('reference_diameter: found 9 mm, expected diameters from');
  });

  it.each<[Record<string, string>, string[], RegExp]>([
    [{}, [], /data\.csv: found no such file/],
    [{ 'data.csv': 'power_without_uW,power_with_uW\n1\n' }, [], /data\.csv:2: found 1 cell, expected 2/],
    [{ 'data.csv': MIXED }, ['--without', 'label'], /--with: found nothing, expected --without COLUMN/],
    [
      { 'data.csv': MIXED },
      ['--without', 'label', '--with', 'label', '--column-unit', 'furlong'],
      /--column-unit: found "furlong", expected one of W, mW/,
    ],
    [{ 'data.csv': MIXED }, ['--omit', 'some'], /--omit: found "some", expected outliers, or lines/],
    [
      { 'data.csv': MIXED },
      ['--saturation', '3 mm'],
      /--saturation: found "3 mm", expected a power or a current/,
    ],
    [{ 'data.csv': MIXED }, ['--coverage', '5'], /--coverage: found "5", expected a probability/],
    [{ 'data.csv': MIXED }, ['--material', 'polystirene'], /did you mean polystyrene/],
  ])('refuses %j with %j', async (files, args, message) => {
    const { code, stdout, stderr } = await evaluate(files, ...args);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toMatch(message);
  });
});
