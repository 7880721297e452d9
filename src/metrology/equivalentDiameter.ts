import type { Interval } from './coverageIntervals.ts';

/** What an instrument shows of spheres against their diameter: reading over gain. */
export interface DiameterCurve {
  /** Of the spheres, for tables. */
  material: string;
  /** Ascending, metres. */
  diametersM: Float64Array;
  /** m², as an instrument with the design's gain shows it. */
  shownM2: Float64Array;
  /** Diameters that the design was made for; the curve reaches a little beyond. */
  rangeM: Interval;
}

/** Every diameter whose sphere shows that area, ascending, metres: several where the curve ripples. */
export function equivalentDiameters({ diametersM, shownM2 }: DiameterCurve, areaM2: number): number[] {
  const found: number[] = [];
  for (let i = 1; i < diametersM.length; i++) {
    const [before, after] = [shownM2[i - 1] - areaM2, shownM2[i] - areaM2];
    // A node itself is counted once, with the piece that ends in it.
    if (after === 0 || (before < 0 && after > 0) || (before > 0 && after < 0)) {
      const share = after === 0 ? 1 : before / (before - after);
      found.push(diametersM[i - 1] + share * (diametersM[i] - diametersM[i - 1]));
    } else if (i === 1 && before === 0) found.push(diametersM[0]);
  }
  return found;
}

/** From the smallest to the largest diameter whose sphere shows an area within an interval; null where none does. */
export function diametersWithin(curve: DiameterCurve, [leastM2, mostM2]: Interval): Interval | null {
  const { diametersM, shownM2 } = curve;
  const ends = [...equivalentDiameters(curve, leastM2), ...equivalentDiameters(curve, mostM2)];
  const inside = diametersM.filter((_, i) => shownM2[i] >= leastM2 && shownM2[i] <= mostM2);
  const all = [...ends, ...[inside.at(0) ?? [], inside.at(-1) ?? []].flat()];
  return all.length === 0 ? null : [Math.min(...all), Math.max(...all)];
}

/** Least and most area that spheres of the design's range show, m². */
export function shownRange({ diametersM, shownM2, rangeM }: DiameterCurve): Interval {
  const [leastM, mostM] = rangeM;
  const slack = 1e-9;
  const within = shownM2.filter(
    (_, i) => diametersM[i] >= leastM * (1 - slack) && diametersM[i] <= mostM * (1 + slack),
  );
  return [Math.min(...within), Math.max(...within)];
}
