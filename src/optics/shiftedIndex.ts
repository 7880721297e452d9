import type { IndexModel } from './indexModel.ts';
import { constantIndex, refractiveIndex } from './indexModel.ts';

/** Wavelengths at which a model is tabled, for an index that is nearly linear between them. */
const POINTS = 9;

/**
 * An index whose real part is higher by the same amount at every wavelength.
 *
 * @param withinM vacuum wavelengths that it will be asked for, metres; elsewhere within the model's own range it keeps the end's value
 * @throws RimwrightError `input` where the model is not known there
 */
export function shiftedIndex(
  model: IndexModel,
  shift: number,
  [leastM, mostM]: readonly [number, number],
): IndexModel {
  if (shift === 0) return model;
  if (model.formula === 'constant')
    return { ...constantIndex(model.n + shift, model.k), rangeM: model.rangeM };
  const count = leastM === mostM ? 1 : POINTS;
  const tabled = Array.from(
    { length: count },
    (_, i) => leastM + ((mostM - leastM) * i) / Math.max(1, count - 1),
  );
  const indices = tabled.map((wavelengthM) => refractiveIndex(model, wavelengthM));
  if (count === 1) return { ...constantIndex(indices[0][0] + shift, indices[0][1]), rangeM: model.rangeM };
  return {
    formula: 'tabulated',
    rangeM: model.rangeM,
    wavelengthM: tabled,
    n: indices.map(([n]) => n + shift),
    k: indices.map(([, k]) => k),
  };
}
