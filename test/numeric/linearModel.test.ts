import { describe, expect, it } from 'vitest';
import { LinearModels } from '../../src/numeric/linearModel.ts';

describe('LinearModel', () => {
  it('solves the diet problem of a textbook by hand', async () => {
    // minimise 2x + 3y under x + y ≥ 4, x + 3y ≥ 6, x ≤ 3: at x = 3, y = 1 the first two rows are both tight.
    const models = await LinearModels.load();
    const model = models.open(Float64Array.of(2, 3), Float64Array.of(3, Infinity));
    model.addRow(Float64Array.of(1, 1), 4, Infinity);
    model.addRow(Float64Array.of(1, 3), 6, Infinity);
    const optimum = model.solve();
    expect(optimum?.objective).toBeCloseTo(9, 9);
    expect(optimum?.values[0]).toBeCloseTo(3, 9);
    expect(optimum?.values[1]).toBeCloseTo(1, 9);
    // Weak duality, with the bound x ≤ 3 priced at its reduced cost: the prices prove the optimum.
    const [a, b] = optimum?.prices ?? [];
    expect(4 * a + 6 * b + 3 * Math.min(0, 2 - a - b)).toBeCloseTo(9, 9);
    model.dispose();
  });

  it('goes on from where it stood, and tells what cannot be kept', async () => {
    const models = await LinearModels.load();
    const model = models.open(Float64Array.of(1, 1), Float64Array.of(1, 1));
    model.addRow(Float64Array.of(1, 2), 1, Infinity);
    expect(model.solve()?.objective).toBeCloseTo(0.5, 9);
    model.addRow(Float64Array.of(1, -1), 0, 0);
    expect(model.solve()?.objective).toBeCloseTo(2 / 3, 9);
    model.setRow(0, 4, Infinity);
    expect(model.solve()).toBeNull();
    model.dispose();
  });
});
