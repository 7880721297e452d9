import { describe, expect, it } from 'vitest';
import { nearestName } from '../../src/base/nearestName.ts';

describe('nearestName', () => {
  const known = ['air', 'dry-air', 'water', 'polystyrene'];

  it('finds the name that fewest changes turn it into', () => {
    expect(nearestName('watr', known)).toBe('water');
    expect(nearestName('Polystyrol', known)).toBe('polystyrene');
    expect(nearestName('dryair', known)).toBe('dry-air');
    expect(nearestName('arr', known)).toBe('air');
    expect(nearestName('water', known)).toBe('water');
  });

  it('suggests nothing where nothing is near', () => {
    expect(nearestName('gold', known)).toBeUndefined();
    expect(nearestName('', known)).toBeUndefined();
    expect(nearestName('air', [])).toBeUndefined();
    expect(nearestName('a'.repeat(1e6), known)).toBeUndefined();
  });

  it('counts changes as Wagner & Fischer do: kitten becomes sitting by three', () => {
    expect(nearestName('kitten', ['sitting'])).toBeUndefined();
    expect(nearestName('kitten sofa', ['sitting sofa'])).toBe('sitting sofa');
  });
});
