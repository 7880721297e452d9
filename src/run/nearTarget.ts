import { wilsonInterval } from '../numeric/wilsonInterval.ts';

/** Builds that the surface puts about as near the target, of which some are read in full. */
export interface Zone {
  builds: number;
  /** Which ones are read. */
  read: readonly number[];
  /** For each of these, meeting the target in full (1 or 0) less what the surface says. */
  changes: number[];
}

export interface NearCounts {
  builds: number;
  read: number;
  changed: number;
}

/**
 * Zones of builds by how far their worst correction is from the target.
 *
 * @param ends farthest of each zone, rising or not: a build is in the first that it is within
 * @param most builds of a zone that are read: the first, which are as good as any
 */
export function zonesOf(worsts: Float64Array, target: number, ends: readonly number[], most: number): Zone[] {
  const members: number[][] = ends.map(() => []);
  worsts.forEach((worst, build) => {
    const zone = ends.findIndex((end) => Math.abs(worst - target) <= end);
    if (zone >= 0) members[zone].push(build);
  });
  return members.map((builds) => ({ builds: builds.length, read: builds.slice(0, most), changes: [] }));
}

/**
 * The share of builds that meet the target, and its 95 % interval: what the surface says of all, and in each zone the mean change
 * among those that were read in full (a difference estimator in strata: Cochran, 1977, chapters 5 and 7). The interval is that of as many plain
 * trials as have the same variance.
 *
 * @param said builds that meet the target as the surface says
 */
export function shareMeeting(
  said: number,
  zones: readonly Zone[],
  builds: number,
): { share: number; interval: [low: number, high: number] } {
  let sum = said;
  let added = 0;
  for (const { builds: size, changes } of zones) {
    const read = changes.length;
    if (read === 0) continue;
    const mean = changes.reduce((total, change) => total + change, 0) / read;
    sum += size * mean;
    // Of a zone that is read to the end nothing is open; elsewhere none changed does not mean that none would.
    const changed = changes.filter((change) => change !== 0).length;
    const variance = (changed + 1) / (read + 2) - mean * mean;
    added += (size / builds) ** 2 * variance * ((1 - read / size) / read);
  }
  const share = Math.min(1, Math.max(0, sum / builds));
  const plain = share * (1 - share);
  const trials = plain === 0 ? builds : plain / (plain / builds + added);
  return { share, interval: wilsonInterval(share * trials, trials) };
}

export function nearCounts(zones: readonly Zone[]): NearCounts {
  const all = zones.flatMap(({ changes }) => changes);
  return {
    builds: zones.reduce((sum, zone) => sum + zone.builds, 0),
    read: all.length,
    changed: all.filter((change) => change !== 0).length,
  };
}
