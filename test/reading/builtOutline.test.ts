import { describe, expect, it } from 'vitest';
import { LegendreRules } from '../../src/numeric/gaussLegendre.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { ringArea } from '../../src/outline/area.ts';
import { ringNodes } from '../../src/outline/ringNodes.ts';
import { boundaryReading } from '../../src/reading/boundaryReading.ts';
import { builtOutline, flatStretch, movedEdges } from '../../src/reading/builtOutline.ts';
import { buildRadialTable } from '../../src/reading/radialTable.ts';
import { buildScenarios } from '../../src/reading/scenario.ts';

const DRAWN = { shiftM: 0, xM: 0, yM: 0, tiltXRad: 0, tiltYRad: 0 };
const RECTANGLE = Float64Array.of(-2e-4, -1e-4, 2e-4, -1e-4, 2e-4, 1e-4, -2e-4, 1e-4);
const LIGHT = {
  ...{ wavelengthM: 635e-9, linewidthM: 0, driftM: 0, polarizationRad: null },
  ...{ irradianceWm2: 1, intensityNoisePerHz: 0 },
};

describe('builtOutline', () => {
  it('moves every edge outwards by the shift, corners with it', () => {
    expect([...movedEdges(RECTANGLE, 1e-5)].map((v) => Math.round(v * 1e7) / 1e7)).toEqual([
      -2.1e-4, -1.1e-4, 2.1e-4, -1.1e-4, 2.1e-4, 1.1e-4, -2.1e-4, 1.1e-4,
    ]);
    // A hole runs the other way round, and becomes smaller.
    const hole = Float64Array.of(...[-1, -1, -1, 1, 1, 1, 1, -1].map((v) => v * 1e-4));
    expect(Math.max(...movedEdges(hole, 1e-5))).toBeCloseTo(9e-5, 9);
  });

  it('adds the shift times the perimeter to the area, to first order', () => {
    const area = (ring: Float64Array) => ringArea(ring);
    const grown = area(movedEdges(RECTANGLE, 1e-8)) - area(RECTANGLE);
    expect(grown / 1e-8).toBeCloseTo(1.2e-3, 6);
  });

  it('moves the mask as a whole', () => {
    const { rings } = builtOutline(
      { weight: 1, rings: [RECTANGLE] },
      { ...DRAWN, xM: 3e-6, yM: -1e-6 },
      () => 1,
    );
    expect(rings[0][0]).toBeCloseTo(-1.97e-4, 12);
    expect(rings[0][1]).toBeCloseTo(-1.01e-4, 12);
  });

  // Independent of `flatStretch`: each node is read from a table for its own distance. The flux through a tilted mask is that
  // through any surface with the same rim, so its reading is the sum of G(ρ, z of the node) dφ.
  it('reads a tilted mask as nodes at their own distances do', () => {
    const distanceM = 0.004;
    const particle = { diameterM: 2e-6, index: constantIndex(1.59), material: '1.59' };
    const [scenario] = buildScenarios(LIGHT, constantIndex(1), [particle], [635e-9], 0.3, 400);
    const rules = new LegendreRules();
    const density = { kappa: Math.PI / (635e-9 * distanceM), offsetM: 0, perRadian: 1, least: 6 };
    const [tiltXRad, tiltYRad] = [0.15, -0.1];
    const built = builtOutline(
      { weight: 1, rings: [RECTANGLE] },
      { ...DRAWN, tiltXRad, tiltYRad },
      flatStretch(distanceM),
    );
    const table = (z: number) => buildRadialTable(scenario, z, 4e-4, 0);
    const fast = boundaryReading(table(distanceM), ringNodes(built.rings, density, rules), 0, 0);
    const flat = ringNodes([RECTANGLE], density, rules);
    const plain = boundaryReading(table(distanceM), flat, 0, 0);
    let slow = 0;
    for (let i = 0; i < flat.length; i += 4) {
      const turn = (x: number, y: number) => {
        const up = y * Math.sin(tiltXRad);
        return [
          x * Math.cos(tiltYRad) + up * Math.sin(tiltYRad),
          y * Math.cos(tiltXRad),
          up * Math.cos(tiltYRad) - x * Math.sin(tiltYRad),
        ];
      };
      const [x, y, behind] = turn(flat[i], flat[i + 1]);
      const [dx, dy] = turn(flat[i + 2], flat[i + 3]);
      slow += boundaryReading(table(distanceM + behind), Float64Array.of(x, y, dx, dy), 0, 0);
    }
    const per = (reading: number) => reading / scenario.extinctionM2;
    expect(Math.abs(per(slow) - per(plain))).toBeGreaterThan(2e-3);
    expect(Math.abs(per(fast) - per(slow))).toBeLessThan(2e-4);
  });
});
