import { describe, expect, it } from 'vitest';
import type { TabledParticle } from '../../src/optics/particle.ts';
import { readingWarnings } from '../../src/run/warnings.ts';
import type { Task } from '../../src/score/task.ts';
import { presetTask } from '../score/presetTasks.ts';

const TASK = await presetTask('nominal-sphere');
const OUTLINE = { radiusM: 4e-4, distanceM: 0.02 };
const TABLED: TabledParticle = {
  diameterM: 5e-5,
  material: 'chain.csv',
  amplitudes: { angles: Float64Array.of(0, 1) } as unknown as TabledParticle['amplitudes'],
};

describe('readingWarnings', () => {
  it('has nothing to say of a brief’s own sphere and distance', () => {
    expect(readingWarnings(TASK, 'far', [OUTLINE])).toEqual([]);
    expect(readingWarnings(TASK, 'exact', [OUTLINE])).toEqual([]);
  });

  it('says once what holds for several outlines', () => {
    const far = { ...OUTLINE, distanceM: 0.03 };
    expect(readingWarnings(TASK, 'far', [far, far])).toEqual(["The distance 30 mm is not the brief's 20 mm"]);
  });

  it('says of diffusion what a search says', () => {
    const diffusion = { durationS: 10, temperatureK: 293.15, medium: 'air' } as const;
    const task: Task = { ...TASK, placement: { ...TASK.placement, diffusion } };
    expect(readingWarnings(task, 'far', [OUTLINE])[0]).toMatch(/^Diffusion moves particles of 2 µm by/);
  });

  it('says that --exact does not help a particle given by amplitudes', () => {
    const task: Task = { ...TASK, particles: [...TASK.particles, TABLED] };
    const [far, ...others] = readingWarnings(task, 'far', [OUTLINE]);
    expect(others).toEqual([]);
    expect(far).toMatch(/^The far-zone form may be off by about 7.7 % .* particles of 50 µm at 20 mm/);
    expect(far).not.toContain('--exact tells');
    const exact = readingWarnings(task, 'exact', [OUTLINE]);
    expect(exact[0]).toBe(
      "Exact fields are not known of particles given by amplitudes, chain.csv: theirs are the far zone's",
    );
    expect(exact[1]).toBe(far);
    const large: Task = { ...TASK, particles: [{ ...TASK.particles[0], diameterM: 5e-5 } as never] };
    expect(readingWarnings(large, 'far', [OUTLINE])[0]).toContain(': --exact tells');
    expect(readingWarnings(large, 'exact', [OUTLINE])).toEqual([]);
  });
});
