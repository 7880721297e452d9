import { ringLoop } from '../ring.ts';
import type { Shape } from '../shape.ts';
import type { PhaseLimits, Variant } from './family.ts';

/** A full disc about the axis. One parameter: the phase of its rim. */
export function discVariants(limits: PhaseLimits): Variant[] {
  const half = Math.PI / 2;
  return [
    {
      family: 'disc',
      id: 'disc',
      parameters: [{ name: 'rim', low: limits.low, high: limits.high }],
      draw(values, unitM): Shape {
        const loops = [ringLoop(Math.sqrt(values[0]) * unitM, 1)];
        return { elements: [{ weight: 1, loops }], folds: Number.POSITIVE_INFINITY, mirror: true };
      },
      start(random) {
        // Quarter waves are where a disc reads the extinction or twice it.
        const rim = half * Math.ceil(8 * random.uniform() ** 2);
        return { values: [Math.min(Math.max(rim, limits.low), limits.high)], spreads: [0.5] };
      },
    },
  ];
}
