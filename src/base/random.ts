import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';

/** Seeded random numbers: the same seed and stream give the same numbers on every machine. */
export interface RandomSource {
  /** The next number, uniform on [0, 1). */
  uniform(): number;
  /** The next number of the standard normal distribution. */
  normal(): number;
}

/**
 * Opens one of many independent streams of a seed.
 *
 * @param seed any whole number from 0 to 2^31 − 1
 * @param stream 0, 1, 2 …; streams of one seed never overlap (each is 2^64 draws long)
 */
export function randomStream(seed: number, stream = 0): RandomSource {
  const generator = xoroshiro128plus(seed | 0);
  // The first draws of small seeds are near 1: every stream starts at least one jump away from them.
  for (let k = 0; k <= stream; k++) generator.jump();
  let spare: number | undefined;
  const uniform = () => uniformFloat64(generator);
  return {
    uniform,
    normal() {
      if (spare !== undefined) {
        const value = spare;
        spare = undefined;
        return value;
      }
      // Box & Muller (1958): two normal numbers from two uniform ones.
      const radius = Math.sqrt(-2 * Math.log(1 - uniform()));
      const angle = 2 * Math.PI * uniform();
      spare = radius * Math.sin(angle);
      return radius * Math.cos(angle);
    },
  };
}
