import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { TradeJson } from '../../src/run/trade.ts';
import { folderWith, QUICK_BRIEF, runCli, runHere } from './runCli.ts';

const BRIEF = QUICK_BRIEF.replace('200', '100').replace('[disc, rings]', '[disc]').replace('1 %', '5 %');

const TRADE = ['trade', 'quick.yaml', '--steps', '2', '--workers', '1', '--json', '--quiet'];
const OVER = ['--over', 'distance=20 mm..30 mm, offset=0 um..100 um'];
const FILES = ['run.json', 'trade.csv', 'trade.json', 'trade.svg'];

const withoutSeconds = (text: string) => text.replace(/"seconds": [\d.e-]+/, '');

describe('rimwright trade', () => {
  it('finds the fastest for each pair of values, and goes on where the disk was full', async () => {
    const folder = folderWith({ 'quick.yaml': BRIEF });
    const whole = await runCli([...TRADE, ...OVER], folder);
    expect([whole.code, whole.stderr]).toEqual([0, '']);
    const results = join(folder, 'results/quick-look-trade');
    expect(readdirSync(results).sort()).toEqual(FILES);
    expect(readFileSync(join(results, 'trade.json'), 'utf8')).toBe(whole.stdout);
    const { over, by, cells, evaluations } = JSON.parse(whole.stdout) as TradeJson;
    expect(by).toBe('time');
    expect(over.map(({ key }) => key)).toEqual(['detector.distance', 'placement.offset']);
    expect(cells.map(({ values }) => values.join(', '))).toEqual([
      '20 mm, 0 um',
      '20 mm, 100 um',
      '30 mm, 0 um',
      '30 mm, 100 um',
    ]);
    expect(evaluations).toBeGreaterThan(4 * 50);
    // On the axis a disc between two zones reads true; at 100 µm from it none does everywhere.
    expect(cells.map(({ design }) => design?.distance_m ?? null)).toEqual([0.02, null, 0.03, null]);
    expect(cells[1].misses.map(({ limit }) => limit)).toContain('target.correction');
    // A detector farther away is larger, and takes longer.
    const [near, far] = [cells[0], cells[2]].map(({ design }) => design?.scores.snr.time_s ?? 0);
    expect(far).toBeGreaterThan(near);
    const csv = readFileSync(join(results, 'trade.csv'), 'utf8').split('\r\n');
    expect(csv).toHaveLength(6);
    expect(csv[0]).toMatch(/^detector\.distance,placement\.offset,meets_target,/);
    expect(csv[2]).toMatch(/^20 mm,100 um,false,disc,/);

    // Files may hold 40 kB here, in blocks of 512 bytes: enough to begin, not to end.
    const other = folderWith({ 'quick.yaml': BRIEF });
    const limited = await runCli([...TRADE, ...OVER], other, {}, [
      'sh',
      '-c',
      'ulimit -f 80 && exec "$@"',
      'sh',
    ]);
    expect([limited.code, limited.stdout]).toEqual([3, '']);
    expect(limited.stderr.replaceAll('\n', ' ')).toContain(
      'rimwright trade --resume results/quick-look-trade goes on with it.',
    );
    const resume = ['trade', '--resume', 'results/quick-look-trade', '--json', '--quiet', '--workers', '2'];
    const resumed = await runCli(resume, other);
    expect(withoutSeconds(resumed.stdout)).toBe(withoutSeconds(whole.stdout));
    for (const name of ['trade.csv', 'trade.svg']) {
      const own = readFileSync(join(other, 'results/quick-look-trade', name), 'utf8');
      expect(own).toBe(readFileSync(join(results, name), 'utf8'));
    }
    expect(readdirSync(join(other, 'results/quick-look-trade')).sort()).toEqual(FILES);
    const search = await runCli(['search', '--resume', 'results/quick-look-trade'], other);
    expect([search.code, search.stderr]).toEqual([
      2,
      'results/quick-look-trade: found one that has ended, expected the results folder of a search that has not ended\n',
    ]);
  }, 120_000);

  it('refuses what it cannot go over, before anything is written', async () => {
    const folder = folderWith({ 'quick.yaml': BRIEF });
    const brief = join(folder, 'quick.yaml');
    const cases: [args: string[], message: string][] = [
      [[brief], '--over: found none'],
      [[brief, '--over', 'distance,offset'], '--over: found "placement.offset", expected its range'],
      [[brief, '--over', 'distance=0.01 mm..1 mm,offset=0 um..1 um'], 'detector.distance: found "0.01 mm"'],
      [['--resume', join(folder, 'none'), '--by', 'radius'], '--by: found radius, expected none'],
      [['--resume', join(folder, 'none')], 'found no such folder'],
    ];
    for (const [args, message] of cases) {
      const { code, stdout, stderr } = await runHere(
        ['trade', ...args, '--out', folder].slice(0, args.includes('--resume') ? -2 : undefined),
      );
      expect([args, code, stdout]).toEqual([args, 2, '']);
      expect(stderr).toContain(message);
    }
    expect(readdirSync(folder)).toEqual(['quick.yaml']);
  });
});
