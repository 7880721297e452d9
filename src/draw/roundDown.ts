/**
 * The largest of `steps` and their tens, tenths, … that does not exceed `value`: for scale bars and scales.
 *
 * @param value positive and finite
 * @param steps from 1 to below 10, growing, the first being 1
 */
export function roundDown(value: number, steps: readonly number[] = [1, 2, 5]): number {
  // The margins keep a value such as 0.999…, meant as 1, from falling a step.
  const power = Math.floor(Math.log10(value) + 1e-12);
  const step = steps.findLast((candidate) => candidate * 10 ** power <= value * (1 + 1e-9)) ?? 1;
  return power < 0 ? step / 10 ** -power : step * 10 ** power;
}
