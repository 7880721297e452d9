import type { Scenario } from '../reading/scenario.ts';

/** One distribution of sizes in one light: its scenarios, each with its share of the whole extinction. */
export type Population = readonly { scenario: number; share: number }[];

/** The distributions of the brief, each once for every wavelength. */
export function populationsOf(scenarios: readonly Scenario[]): Population[] {
  const groups = new Map<string, { scenario: number; share: number }[]>();
  scenarios.forEach(({ particle, wavelengthM, extinctionM2 }, scenario) => {
    if (particle.population === undefined) return;
    const { of, share } = particle.population;
    const key = `${of} ${wavelengthM}`;
    groups.set(key, [...(groups.get(key) ?? []), { scenario, share: share * extinctionM2 }]);
  });
  return [...groups.values()].map((members) => {
    const total = members.reduce((sum, { share }) => sum + share, 0);
    return members.map(({ scenario, share }) => ({ scenario, share: share / total }));
  });
}

/**
 * Largest |Σ share · reading/(gain · Σ share · extinction) − 1|: how far the mean over a whole distribution strays, at the worst
 * wavelength and place.
 *
 * @param ratios reading/extinction, a row for each scenario
 * @returns null where there is no distribution
 */
export function populationCorrection(
  populations: readonly Population[],
  ratios: readonly Float64Array[],
  gain: number,
): number | null {
  if (populations.length === 0) return null;
  let worst = 0;
  for (const members of populations) {
    const places = ratios[members[0].scenario].length;
    for (let place = 0; place < places; place++) {
      const mean = members.reduce((sum, { scenario, share }) => sum + share * ratios[scenario][place], 0);
      worst = Math.max(worst, Math.abs(mean / gain - 1));
    }
  }
  return worst;
}
