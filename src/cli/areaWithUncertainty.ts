/** `8.50 µm² ± 0.21 µm²`: the uncertainty to two digits, and the value to the same place. */
export function areaWithUncertainty(valueM2: number, uncertaintyM2: number): string {
  const [unit, perUnit] = Math.max(Math.abs(valueM2), uncertaintyM2) < 1e-9 ? ['µm²', 1e12] : ['mm²', 1e6];
  const [value, uncertainty] = withUncertainty(valueM2 * perUnit, uncertaintyM2 * perUnit);
  return `${value} ${unit} ± ${uncertainty} ${unit}`;
}

/** A value and its uncertainty, written to two digits of that. */
export function withUncertainty(value: number, uncertainty: number): [value: string, uncertainty: string] {
  if (!(uncertainty > 0)) return [String(Number(value.toPrecision(5))), '0'];
  const exponent = Number(uncertainty.toExponential(1).split('e')[1]);
  const decimals = Math.min(12, Math.max(0, 1 - exponent));
  return [value.toFixed(decimals), uncertainty.toFixed(decimals)];
}
