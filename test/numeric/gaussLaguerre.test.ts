import { describe, expect, it } from 'vitest';
import { gaussLaguerre } from '../../src/numeric/gaussLaguerre.ts';

describe('gaussLaguerre', () => {
  it('has the nodes and weights of Abramowitz & Stegun (1964), table 25.9, n = 2 and 5', () => {
    const two = gaussLaguerre(2);
    expect(two.nodes[0]).toBeCloseTo(0.585786437627, 12);
    expect(two.weights[0]).toBeCloseTo(0.853553390593, 12);
    const five = gaussLaguerre(5);
    expect(five.nodes[0]).toBeCloseTo(0.26356031972, 11);
    expect(five.nodes[4]).toBeCloseTo(12.640800844276, 11);
    expect(five.weights[0]).toBeCloseTo(0.521755610583, 11);
  });

  it.each([1, 2, 5, 12, 20, 40, 60])('%i nodes ascend, and integrate u^n e^−u to n!', (count) => {
    const { nodes, weights } = gaussLaguerre(count);
    for (let i = 1; i < count; i++) expect(nodes[i]).toBeGreaterThan(nodes[i - 1]);
    let factorial = 1;
    for (let power = 0; power < Math.min(2 * count, 30); power++) {
      if (power > 0) factorial *= power;
      const sum = nodes.reduce((total, node, i) => total + weights[i] * node ** power, 0);
      expect(sum / factorial).toBeCloseTo(1, 12);
    }
  });
});
