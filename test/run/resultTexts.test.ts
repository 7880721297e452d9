import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { frontCsv } from '../../src/run/frontCsv.ts';
import { jsonText } from '../../src/run/jsonText.ts';
import type { RankedDesign } from '../../src/run/ranking.ts';

const DESIGN: RankedDesign = {
  id: 'disc-1',
  family: 'disc',
  distanceM: 0.02,
  elements: [],
  scores: {
    gain: 2,
    correction: { worst: 0.01, rms: 0.005 },
    lobe: { ratio: 0.05 },
    snr: { required: 1e5, time_s: 1e-7 },
    area_m2: 1e-8,
    radius_m: 1e-4,
    areaOverFloor: 1.2,
  },
  fields: 'far',
  shop: { fits: true, notes: [], misfit: 0 },
  rank: 1,
  meetsTarget: true,
};

describe('jsonText', () => {
  it('is JSON of the same value', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 6 }), (value) => {
        expect(JSON.parse(jsonText(value))).toEqual(JSON.parse(JSON.stringify(value)));
      }),
    );
  });

  it('puts a ring of coordinates into one line, and long lists into many', () => {
    const ring = Array.from({ length: 100 }, (_, k) => [k, k + 0.5]);
    const text = jsonText({ rings: [ring, ring], notes: ['a'.repeat(60), 'b'.repeat(60)], gain: 1 });
    const lines = text.split('\n');
    expect(lines.filter((line) => line.includes('[99,99.5]'))).toHaveLength(2);
    expect(lines).toContain(`    "${'b'.repeat(60)}"`);
    expect(text.endsWith('}\n')).toBe(true);
  });

  it('keeps short objects in one line', () => {
    expect(jsonText({ a: 1, b: { c: [1, 2], d: undefined } })).toBe('{ "a": 1, "b": { "c": [1,2] } }\n');
  });
});

describe('frontCsv', () => {
  const cellsOf = (design: RankedDesign) => frontCsv([design]).split('\r\n')[1];

  it('has one row a design under a header with units', () => {
    const [header, row, rest] = frontCsv([DESIGN]).split('\r\n');
    expect(header).toBe(
      'id,family,rank,meets_target,distance_m,radius_m,area_m2,gain,correction_worst,correction_certified,correction_rms,correction_population,certified_diameter_m,certified_wavelength_m,certified_depth_m,certified_x_m,certified_y_m,lobe_ratio,snr_required,time_s,area_over_floor,least_area_over_floor,shop_fits,shop_notes',
    );
    expect(row).toBe('disc-1,disc,1,true,0.02,0.0001,1e-8,2,0.01,,0.005,,,,,,,0.05,100000,1e-7,1.2,,true,');
    expect(rest).toBe('');
    const certifiedAt = {
      diameter_m: 2e-6,
      material: 'a',
      wavelength_m: 6e-7,
      depth_m: 0,
      position_m: [1e-6, 0] as const,
    };
    const correction = { worst: 0.01, rms: 0.005, certified: 0.02, certifiedAt };
    expect(cellsOf({ ...DESIGN, scores: { ...DESIGN.scores, correction } })).toContain(
      ',0.01,0.02,0.005,,0.000002,6e-7,0,0.000001,0,0.05,',
    );
  });

  it.each([
    ['=1+1', "'=1+1"],
    ['+1', "'+1"],
    ['-1', "'-1"],
    ['@SUM(A1)', "'@SUM(A1)"],
    [' =1', "' =1"],
    ['\t=1', "'\t=1"],
    ['say "no", twice', '"say ""no"", twice"'],
    ['=a\n=b', '"\'=a\n=b"'],
    ['smallest opening 1 µm', 'smallest opening 1 µm'],
  ])('writes the note %j so that no spreadsheet runs it', (note, cell) => {
    expect(
      cellsOf({ ...DESIGN, shop: { fits: true, notes: [note], misfit: 0 } }).endsWith(`,true,${cell}`),
    ).toBe(true);
  });
});
