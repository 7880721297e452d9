import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { folderWith, runHere } from './runCli.ts';

/** A disc of η = π reads twice the extinction; a square of many zones would do as well, and costs more. */
const RADIUS_MM = 0.1127;
const DISC = `x_mm,y_mm\n${Array.from({ length: 180 }, (_, i) => {
  const angle = (2 * Math.PI * i) / 180;
  return `${RADIUS_MM * Math.cos(angle)},${RADIUS_MM * Math.sin(angle)}\n`;
}).join('')}`;

const BRIEF = `light: { wavelength: 635 nm, irradiance: 5 W/cm^2 }
medium: 1.0
particles: [{ diameter: 1 um to 4 um, index: 1.59 }]
placement: { offset: 2 um }
detector: { distance: 20 mm, radius: 20 um to 0.4 mm }
target: { correction: 3 %, gain: free }
`;
const EXACT = `uncertainties: { averaging: 1 s, irradiance: 0 %, responsivity: 0 %, gain: 0 %, lightDrift: 0 %,
  nonlinearity: 0 %, distance: 0 um, wavelength: 0 nm }
`;

async function budget(brief: string, ...args: string[]) {
  const folder = folderWith({ 'brief.yaml': brief, 'disc.csv': DISC });
  const files = [join(folder, 'brief.yaml'), '--outline', join(folder, 'disc.csv')];
  const outcome = await runHere(['budget', ...files, ...args.map((arg) => arg.replace('DIR', folder))]);
  return { ...outcome, folder };
}

const json = async (brief: string, ...args: string[]) => {
  const { code, stdout, stderr } = await budget(brief, ...args, '--json');
  expect([code, stderr]).toEqual([0, '']);
  return JSON.parse(stdout);
};

describe('rimwright budget', () => {
  it('adds up, and stands beside a Monte Carlo run', async () => {
    const found = await json(BRIEF, '--diameter', '2 um');
    const { inputs, value_m2, standardUncertainty_m2, coverageFactor, monteCarlo } = found;
    const squares = inputs.reduce(
      (sum: number, { contribution_m2 }: { contribution_m2: number }) => sum + contribution_m2 ** 2,
      0,
    );
    expect(Math.sqrt(squares) / standardUncertainty_m2).toBeCloseTo(1, 9);
    expect(found.expandedUncertainty_m2).toBeCloseTo(coverageFactor * standardUncertainty_m2, 20);
    expect(coverageFactor).toBeCloseTo(1.95996, 4);
    expect(value_m2 / found.shown_m2).toBeCloseTo(1, 9);
    expect(value_m2 / found.extinction_m2).toBeCloseTo(1, 1);
    expect(monteCarlo.mean_m2 / value_m2).toBeCloseTo(1, 2);
    expect(monteCarlo.standardUncertainty_m2 / standardUncertainty_m2).toBeCloseTo(1, 1);
    const parts = Object.fromEntries(
      inputs.map((input: { name: string; contribution_m2: number }) => [input.name, input.contribution_m2]),
    );
    // One per cent of scale is one per cent of the result.
    expect(parts.irradiance / (0.01 * value_m2)).toBeCloseTo(1, 3);
    expect(parts.responsivity / (0.01 * value_m2)).toBeCloseTo(1, 3);
    // A disc of the first zone hardly feels its distance: its reading is flat there.
    expect(parts.distance).toBeLessThan(0.002 * value_m2);
    expect(parts['light drift']).toBeGreaterThan(0);
  });

  it('has nothing but noise and correction where all else is exact, and noise falls with the time', async () => {
    const [slow, fast] = [
      await json(BRIEF + EXACT, '--diameter', '2 um'),
      await json(BRIEF + EXACT.replace('1 s', '1 ms'), '--diameter', '2 um'),
    ];
    const used = slow.inputs.filter(
      ({ contribution_m2 }: { contribution_m2: number }) => contribution_m2 > 0,
    );
    expect(used.map(({ name }: { name: string }) => name)).toEqual([
      'power without',
      'power with',
      'correction',
    ]);
    expect(fast.inputs[0].standardUncertainty / slow.inputs[0].standardUncertainty).toBeCloseTo(
      Math.sqrt(1000),
      6,
    );
    // After design.md: two readings averaged over the target's time are uncertain by the target itself.
    const time = await json(BRIEF + EXACT.replace('1 s', '1 ms'), '--diameter', '1 um');
    const noise = Math.SQRT2 * time.inputs[0].contribution_m2;
    const { stdout } = await runHere(['reading', ...(await filesOf(BRIEF)), '--json']);
    const { scores } = JSON.parse(stdout).design;
    const atTarget = noise * Math.sqrt(1e-3 / scores.snr.time_s);
    expect(atTarget / (0.03 * time.extinction_m2)).toBeCloseTo(1, 3);
  });

  it('prints a table within 80 columns and writes it as CSV', async () => {
    const { code, stdout, stderr, folder } = await budget(BRIEF, '--csv', 'DIR/budget.csv');
    expect(code).toBe(0);
    for (const line of stdout.split('\n')) expect(line.length).toBeLessThanOrEqual(80);
    expect(stdout).toMatch(/Measured extinction [\d.]+ µm² ± [\d.]+ µm²/);
    expect(stdout).toMatch(/Monte Carlo check, \d+ trials/);
    expect(stderr).toContain('uncertainties.irradiance: 1 %');
    const rows = readFileSync(join(folder, 'budget.csv'), 'utf8').trimEnd().split('\r\n');
    expect(rows[0]).toBe(
      'input,unit,value,standard_uncertainty,degrees_of_freedom,distribution,sensitivity_m2_per_unit,contribution_m2,share',
    );
    expect(rows.length).toBe(12);
    expect(rows.at(-1)).toMatch(/^extinction,m²,/);
  });

  it.each([
    [['--diameter', '2'], '--diameter: found "2", expected a length with its unit'],
    [['--diameter', '1 nm', '--material', 'nothing'], '"nothing"'],
    [['--material', 'polystyrene'], '--material: found polystyrene, expected --diameter beside it'],
    [['--coverage', '100 %'], '--coverage: found "100 %", expected a probability from 50 % to 99.99 %'],
    [['--digits', '3'], '--digits: found "3", expected a whole number from 1 to 2'],
    [['--diameter', '0.1 nm'], '--diameter: found 0.1 nm, expected diameters from'],
  ])('refuses %j', async (args, message) => {
    const { code, stdout, stderr } = await budget(BRIEF, ...args);
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain(message);
  });

  it('names a mistake in the brief’s uncertainties by its line', async () => {
    const { code, stderr } = await budget(`${BRIEF}uncertainties: { irradiance: 1 W, averaging: 1 }\n`);
    expect(code).toBe(2);
    expect(stderr).toContain('brief.yaml:7: uncertainties.irradiance: found "1 W", expected a ratio');
    expect(stderr).toContain('brief.yaml:7: uncertainties.averaging: found 1, expected a time with its unit');
  });
});

async function filesOf(brief: string): Promise<string[]> {
  const folder = folderWith({ 'brief.yaml': brief, 'disc.csv': DISC });
  return [join(folder, 'brief.yaml'), '--outline', join(folder, 'disc.csv')];
}
