import { inputError } from '../base/errors.ts';
import { nearestName } from '../base/nearestName.ts';
import { loadUnits } from '../base/quantity.ts';
import type { Tolerance, Tolerances } from '../score/tolerances.ts';
import { NO_TOLERANCE } from '../score/tolerances.ts';
import type { ShopRules } from '../shop/shopRules.ts';
import type { BriefTolerances } from './briefTolerances.ts';
import { toleranceKeys } from './toleranceKeys.ts';

/** The keys of a brief's `tolerances`, every one filled. */
type ToleranceValues = Omit<BriefTolerances, 'averagingS'> & { averaging: number | null };

export function fillTolerances({ averaging, ...values }: ToleranceValues): BriefTolerances {
  return { ...values, averagingS: averaging };
}

const WRITTEN = /^\s*(\w+)\s*=\s*(.*?)\s*$/;

/**
 * A brief's tolerances with some of them replaced, each written as `place = 1 um rms`.
 *
 * @throws RimwrightError `input` that names the option, for a key or a value that cannot be used
 */
export async function replaceTolerances(
  own: BriefTolerances,
  written: readonly string[],
  option: string,
): Promise<BriefTolerances> {
  if (written.length === 0) return own;
  const keys = toleranceKeys(await loadUnits());
  const names = Object.keys(keys);
  const changed = written.map((text) => {
    const refused = (found: string, expected: string) =>
      inputError([{ key: option, found: JSON.stringify(found.slice(0, 60)), expected }]);
    const [, name, value] = WRITTEN.exec(text) ?? [];
    if (name === undefined) throw refused(text, 'a key and its tolerance, such as "place = 1 um rms"');
    const key = Object.entries(keys).find(([known]) => known === name)?.[1];
    if (key === undefined) {
      const nearest = nearestName(name, names);
      const hint = nearest === undefined ? '' : ` (did you mean ${nearest}?)`;
      throw refused(name, `one of ${names.join(', ')}${hint}`);
    }
    const checked = key.rule.check(value);
    if ('value' in checked) return [name, checked.value];
    throw refused(value, `for ${name} ${checked.mistakes[0].expected}`);
  });
  const { averagingS, ...rest } = own;
  const values = { ...rest, averaging: averagingS, ...Object.fromEntries(changed) };
  return fillTolerances(values as ToleranceValues);
}

/** Our own estimate: shops state a kerf's range over all sheets and powers, not how well one job keeps it. */
const KERF_SHARE = 0.1;

/**
 * The tolerances of one design.
 *
 * @param shop whose edge tolerance, and a tenth of whose kerf, are meant by `shop`; without one there are none
 * @param target the largest correction allowed
 * @param timeS in which the noise of one measurement is as large as the target
 */
export function resolveTolerances(
  { averagingS, ...asked }: BriefTolerances,
  shop: ShopRules | null,
  target: number,
  timeS: number,
): Tolerances {
  const ofShop = (sizeM: number): Tolerance => ({ law: 'limits', size: sizeM });
  const noise: Tolerance =
    averagingS === null ? NO_TOLERANCE : { law: 'rms', size: target * Math.sqrt(timeS / averagingS) };
  return {
    ...asked,
    edge: asked.edge === 'shop' ? ofShop(shop?.edgeToleranceM ?? 0) : asked.edge,
    kerf: asked.kerf === 'shop' ? ofShop(KERF_SHARE * (shop?.kerfM ?? 0)) : asked.kerf,
    noise,
  };
}
