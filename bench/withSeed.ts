import { randomStream } from '../src/base/random.ts';

/** optimization-js draws from Math.random: it is lent a seeded source. */
export function withSeed<Result>(seed: number, run: () => Result): Result {
  const original = Math.random;
  const source = randomStream(seed);
  Math.random = () => source.uniform();
  try {
    return run();
  } finally {
    Math.random = original;
  }
}
