import { scaleLog } from 'd3-scale';

/** A logarithmic axis: where values stand, and which of them carry a tick. */
export interface LogAxis {
  place(value: number): number;
  ticks: readonly number[];
}

/**
 * @param values positive and finite; the axis covers them all, with a little room
 * @param range where the axis begins and ends, user units; it may run downwards
 */
export function logAxis(values: readonly number[], range: readonly [number, number]): LogAxis {
  const low = values.length > 0 ? Math.min(...values) : 1;
  const high = values.length > 0 ? Math.max(...values) : 1;
  const room = Math.max(1.4, (high / low) ** 0.05);
  const scale = scaleLog([low / room, high * room], range);
  const decades = Math.log10((high / low) * room ** 2);
  return { place: (value) => scale(value), ticks: thinOut(scale.ticks(), decades) };
}

/** Over several decades only 1, 2, 5 or only the powers of ten keep their tick, so that labels do not run together. */
function thinOut(ticks: readonly number[], decades: number): readonly number[] {
  if (decades < 0.7) return ticks.filter((_, k) => k % Math.ceil(ticks.length / 6) === 0);
  const leading = decades < 2.2 ? ['1', '2', '5'] : ['1'];
  const kept = ticks.filter((tick) => leading.includes(tick.toExponential(1).replace(/\..*/, '')));
  return kept.filter((_, k) => k % Math.ceil(kept.length / 8) === 0);
}
