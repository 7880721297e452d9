/** A complex number, for formulas that are read more often than they run. Kernels keep their parts apart. */
export type Complex = readonly [re: number, im: number];

export function add(a: Complex, b: Complex): Complex {
  return [a[0] + b[0], a[1] + b[1]];
}

export function subtract(a: Complex, b: Complex): Complex {
  return [a[0] - b[0], a[1] - b[1]];
}

export function scale(a: Complex, factor: number): Complex {
  return [a[0] * factor, a[1] * factor];
}

/** i a */
export function timesI(a: Complex): Complex {
  return [-a[1], a[0]];
}

export function multiply(a: Complex, b: Complex): Complex {
  return [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
}

export function square(a: Complex): Complex {
  return [(a[0] - a[1]) * (a[0] + a[1]), 2 * a[0] * a[1]];
}

/** a/b. The moduli of both must have squares within the range of doubles. */
export function divide(a: Complex, b: Complex): Complex {
  const norm = b[0] * b[0] + b[1] * b[1];
  return [(a[0] * b[0] + a[1] * b[1]) / norm, (a[1] * b[0] - a[0] * b[1]) / norm];
}

/** Principal square root: real part 0 or more. */
export function squareRoot([re, im]: Complex): Complex {
  const modulus = Math.sqrt(re * re + im * im);
  if (modulus === 0) return [0, 0];
  // The larger part first; the other follows by division and keeps its digits.
  const larger = Math.sqrt((modulus + Math.abs(re)) / 2);
  const smaller = im / (2 * larger);
  if (re >= 0) return [larger, smaller];
  return im < 0 ? [-smaller, -larger] : [smaller, larger];
}

export function exponential([re, im]: Complex): Complex {
  const modulus = Math.exp(re);
  return [modulus * Math.cos(im), modulus * Math.sin(im)];
}
