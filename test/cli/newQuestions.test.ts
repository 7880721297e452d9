import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it, vi } from 'vitest';
import { readBrief } from '../../src/run/readBrief.ts';
import { folderWith, runHere } from './runCli.ts';

const asked: string[] = [];
let answers: string[] = [];

// Somebody at a terminal: tests have none.
vi.mock('../../src/cli/askAtTerminal.ts', () => ({
  openQuestions: () => ({
    ask: (question: string) => {
      asked.push(question);
      return Promise.resolve(answers.shift() ?? '');
    },
    close: () => undefined,
  }),
}));

describe('rimwright new at a terminal', () => {
  it('asks what no option answers, again after a mistake, and offers defaults', async () => {
    const file = join(folderWith(), 'bench.yaml');
    answers = ['2 um 1.59', '20', ' 20 mm ', '', '2 %', '', 'photomask', ''];
    const { code, stderr } = await runHere(['new', file, '--wavelength', '532 nm']);
    expect(code).toBe(0);
    expect(asked.map((question) => question.split(',')[0])).toEqual([
      'particles',
      'distance',
      'distance',
      'radius',
      'target',
      'medium',
      'shop',
      'title',
    ]);
    expect(asked[0]).toMatch(/\[1 um to 4 um polystyrene\] $/);
    expect(asked.at(-1)).toMatch(/\[bench\] $/);
    expect(stderr).toContain('Found "20", expected a length with its unit');
    const brief = await readBrief(readFileSync(file, 'utf8'), file);
    const { light, detector, target, particles } = brief.task;
    expect(light.wavelengthM).toBe(532e-9);
    expect(particles).toHaveLength(1);
    expect([detector.distanceM, detector.radiusM]).toEqual([
      [0.02, 0.02],
      [5e-5, 2e-3],
    ]);
    expect([target.correction, brief.shopName, brief.title]).toEqual([0.02, 'photomask', 'bench']);
    expect(brief.defaults).toContain('medium: air');
    expect(brief.defaults).toContain('title: bench');
  });
});
