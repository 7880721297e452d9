import { describe, expect, it } from 'vitest';
import { boundsOf } from '../../src/run/bound.ts';
import { presetTask } from '../score/presetTasks.ts';

const offset = await presetTask('offset-range');
const small = { ...offset, detector: { ...offset.detector, radiusM: [20e-6, 0.2e-3] as [number, number] } };
const polarised = { ...small.light, polarizationRad: 0 };

describe('boundsOf', () => {
  it('tells of stars only where nothing has a direction', async () => {
    const [round] = await boundsOf(small, [0.02], [1]);
    const [directed] = await boundsOf({ ...small, light: polarised }, [0.02], [1]);
    expect(round.star?.areaOverFloor).toBeGreaterThan(round.any?.areaOverFloor ?? 9);
    expect('star' in directed).toBe(false);
    expect(directed.any?.area_m2).toBeGreaterThan(0);
  });

  it('refuses a focused beam with a direction, by the key that gives it one', async () => {
    const beam = { waistM: 60e-6, focusM: 0 };
    const crossing = { spanM: 20e-6, headingRad: 0 };
    const polarisedBeam = { ...small, light: { ...polarised, beam } };
    const crossedBeam = {
      ...small,
      light: { ...small.light, beam },
      placement: { ...small.placement, crossing },
    };
    await expect(boundsOf(polarisedBeam, [0.02], [1])).rejects.toThrow(/light\.polarization/);
    await expect(boundsOf(crossedBeam, [0.02], [1])).rejects.toThrow(/placement\.crossing/);
  });
});
