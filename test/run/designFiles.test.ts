import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, it, onTestFinished } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { designHash } from '../../src/run/designHash.ts';
import { designToJson } from '../../src/run/designJson.ts';
import type { RankedDesign } from '../../src/run/ranking.ts';
import { readDesignFile } from '../../src/run/readDesignFile.ts';
import { readDesignJson } from '../../src/run/readDesignJson.ts';

const SQUARE: [number, number][] = [
  [-1, -1],
  [1, -1],
  [1, 1],
  [-1, 1],
];
const HOLE: [number, number][] = SQUARE.map(([x, y]) => [x / 2, y / 2]);
const DESIGN = { id: 'a-1', distance_m: 0.02, elements: [{ weight: 1, rings_mm: [SQUARE] }] };

const withRings = (...rings_mm: unknown[]) => ({ ...DESIGN, elements: [{ weight: 1, rings_mm }] });

function messageOf(read: () => unknown): string {
  try {
    read();
  } catch (error) {
    if (error instanceof RimwrightError && error.code === 'input') return error.message;
    throw error;
  }
  return 'no mistake found';
}

const messageFor = (value: unknown) => messageOf(() => readDesignJson(value, 'd.json'));

const SCORES = {
  gain: 1.5,
  correction: { worst: 0.01, rms: 0.005 },
  lobe: { ratio: 0.05 },
  snr: { required: 1e5, time_s: 1e-4 },
  area_m2: 1e-8,
  radius_m: 1e-4,
  areaOverFloor: 1.2,
};

describe('a design’s plain form', () => {
  it('comes back as it went, to the nanometre', () => {
    const nanometres = fc.integer({ min: 1, max: 1_000_000 });
    fc.assert(
      fc.property(
        nanometres,
        nanometres,
        fc.double({ min: 1e-3, max: 1, noNaN: true }),
        (w, h, distanceM) => {
          const ring = Float64Array.from([0, 0, w, 0, w, h, 0, h], (nm) => (nm - 500) / 1e9);
          const design: RankedDesign = {
            id: 'polygon-1',
            family: 'polygon',
            distanceM,
            elements: [{ weight: -0.5, rings: [ring] }],
            scores: SCORES,
            fields: 'far',
            shop: { fits: true, notes: ['cut it'], misfit: 0 },
            rank: 2,
            meetsTarget: true,
          };
          const text = JSON.stringify(designToJson(design));
          const read = readDesignJson(JSON.parse(text), 'd.json');
          expect(read).toMatchObject({ id: 'polygon-1', family: 'polygon', distanceM });
          expect(read.elements[0].weight).toBe(-0.5);
          const [back] = read.elements[0].rings;
          for (let i = 0; i < 8; i++) expect(Math.abs(back[i] - ring[i])).toBeLessThan(1e-15);
          // The same text again, and the same hash: nothing drifts from file to file.
          const again = designToJson({ ...design, elements: read.elements });
          expect(JSON.stringify(again)).toBe(text);
          expect(designHash(distanceM, read.elements)).toBe(designHash(distanceM, design.elements));
        },
      ),
    );
  });

  it('has the keys of front.json and at most six decimals', () => {
    const json = designToJson({
      id: 'disc-1',
      family: 'disc',
      distanceM: 0.02,
      elements: [{ weight: 1, rings: [Float64Array.of(1 / 3e3, 0, 0, 2 / 3e3, -1e-13, -1e-13)] }],
      scores: SCORES,
      fields: 'far',
      shop: { fits: false, notes: ['too thin'], misfit: 0.5 },
      rank: 1,
      meetsTarget: false,
    });
    expect(json.elements).toEqual([
      {
        weight: 1,
        rings_mm: [
          [
            [0.333333, 0],
            [0, 0.666667],
            [0, 0],
          ],
        ],
      },
    ]);
    expect(json.scores).toEqual({ ...SCORES, shop: { fits: false, notes: ['too thin'] } });
    expect(Object.keys(json)).toEqual([
      'id',
      'family',
      'distance_m',
      'elements',
      'fields',
      'scores',
      'rank',
      'meetsTarget',
    ]);
  });
});

describe('designHash', () => {
  it('tells designs apart', () => {
    const element = (weight: number, ...values: number[]) => ({ weight, rings: [Float64Array.from(values)] });
    const hashes = [
      designHash(0.02, [element(1, 0, 0, 1, 0, 0, 1)]),
      designHash(0.021, [element(1, 0, 0, 1, 0, 0, 1)]),
      designHash(0.02, [element(-1, 0, 0, 1, 0, 0, 1)]),
      designHash(0.02, [element(1, 0, 0, 1, 0, 0, 1.001)]),
      designHash(0.02, [element(1, 0, 0, 1, 0, 0, 1), element(1, 0, 0, 1, 0, 0, 1)]),
    ];
    expect(new Set(hashes).size).toBe(hashes.length);
    for (const hash of hashes) expect(hash).toMatch(/^[0-9a-f]{12}$/);
  });
});

describe('readDesignJson', () => {
  it('turns rings by their nesting, and lets elements overlap', () => {
    const read = readDesignJson(
      {
        ...DESIGN,
        elements: [
          { weight: 1, rings_mm: [SQUARE.toReversed(), HOLE] },
          { weight: -1, rings_mm: [SQUARE] },
        ],
      },
      'd.json',
    );
    const [outer, hole] = read.elements[0].rings;
    expect(Array.from(outer.subarray(0, 4))).toEqual([-1e-3, 1e-3, -1e-3, -1e-3]);
    expect(Array.from(hole.subarray(0, 4))).toEqual([-5e-4, -5e-4, -5e-4, 5e-4]);
    expect(read.family).toBe('given');
  });

  it('passes over scores: they belong to another brief', () => {
    expect(readDesignJson({ ...DESIGN, scores: { gain: 'any' }, rank: null }, 'd.json').id).toBe('a-1');
  });

  it.each([
    [[], 'd.json: found [], expected an object with the keys id, family'],
    [null, 'd.json: found null, expected an object'],
    [{ ...DESIGN, id: '../a' }, 'd.json: id: found "../a", expected a name of up to 60 letters'],
    [{ ...DESIGN, id: 7 }, 'd.json: id: found 7'],
    [{ ...DESIGN, family: 'circle' }, 'd.json: family: found "circle", expected one of disc, rings'],
    [{ ...DESIGN, distance_m: -1 }, 'd.json: distance_m: found -1, expected a distance from 0.0001 to 10 m'],
    [{ ...DESIGN, elements: [] }, 'd.json: elements: found [], expected a list with at least one element'],
    [
      { ...DESIGN, elements: [7] },
      'd.json: elements[0]: found 7, expected an object with the keys weight, distance_m, share, rings_mm, curves_mm',
    ],
    [
      { ...DESIGN, elements: [{ wieght: 1, rings_mm: [SQUARE] }] },
      'd.json: elements[0].wieght: found an unknown key',
    ],
    [{ ...DESIGN, elements: [{ weight: 0, rings_mm: [SQUARE] }] }, 'd.json: elements[0].weight: found 0'],
    [{ ...DESIGN, elements: [{ weight: 1, rings_mm: [] }] }, 'd.json: elements[0].rings_mm: found []'],
    [
      withRings(SQUARE.slice(0, 2)),
      'd.json: elements[0].rings_mm[0]: found [[-1,-1],[1,-1]], expected a list of at least three',
    ],
    [
      withRings([...SQUARE, [0, 0, 0]]),
      'd.json: elements[0].rings_mm[0][4]: found [0,0,0], expected a point [x, y]',
    ],
    [withRings([...SQUARE, [0, '1']]), 'd.json: elements[0].rings_mm[0][4]: found [0,"1"]'],
    [
      withRings([...SQUARE, [0, Number.POSITIVE_INFINITY]]),
      'd.json: elements[0].rings_mm[0][4]: found [0,null]',
    ],
    [withRings([...SQUARE, [0, 1000.5]]), 'd.json: elements[0].rings_mm[0][4]: found [0,1000.5]'],
    [
      withRings([...SQUARE, [-1, -1]]),
      'd.json: elements[0].rings_mm[0]: found the first point again at the end',
    ],
    [withRings([[-1, -1], ...SQUARE]), 'd.json: elements[0].rings_mm[0][1]: found the same point as [0]'],
    [
      withRings(
        SQUARE,
        SQUARE.map(([x, y]) => [x + 1, y]),
      ),
      'd.json: elements[0].rings_mm[0]: found edge 0 meeting edge 0 of ring 1',
    ],
    [
      withRings([SQUARE[0], SQUARE[2], SQUARE[1], SQUARE[3]]),
      'd.json: elements[0].rings_mm[0]: found edge 0 meeting edge 2 at x = 0 mm, y = 0 mm',
    ],
    [
      withRings([
        [0, 0],
        [1, 0],
        [2, 0],
      ]),
      'expected rings that do not cross or touch themselves',
    ],
  ])('refuses %j', (value, message) => {
    expect(messageFor(value)).toContain(message);
  });

  it('names every mistake at once, ten at the most', () => {
    const lines = messageFor({ id: '', distance_m: 'x', elements: Array(20).fill({ weight: 'w' }) }).split(
      '\n',
    );
    expect(lines).toHaveLength(10);
    expect(lines[0]).toContain('id:');
    expect(lines[2]).toContain('elements[0].weight: found "w"');
  });

  it('keeps to 100 000 points and 1000 rings', () => {
    const circle = Array.from({ length: 100_001 }, (_, k) => [Math.cos(k / 16000), Math.sin(k / 16000)]);
    expect(messageFor(withRings(circle))).toBe(
      'd.json: elements: found 100001 points, expected at most 100000 points',
    );
    const small = Array.from({ length: 1001 }, (_, k) =>
      SQUARE.map(([x, y]) => [x / 10 + (k % 32), y / 10 + (k >> 5)]),
    );
    expect(messageFor(withRings(...small))).toBe(
      'd.json: elements: found 1001 rings, expected at most 1000 rings',
    );
  });

  it('never fails in another way, whatever the file holds', () => {
    fc.assert(fc.property(fc.json(), (text) => void messageFor(JSON.parse(text))));
    const key = fc.constantFrom('id', 'family', 'distance_m', 'elements');
    fc.assert(
      fc.property(key, fc.jsonValue(), (name, value) => void messageFor({ ...DESIGN, [name]: value })),
    );
    fc.assert(fc.property(fc.jsonValue(), (value) => void messageFor(withRings(value))));
  });
});

describe('readDesignFile', () => {
  function fileWith(name: string, content: string | Uint8Array): string {
    const folder = mkdtempSync(join(tmpdir(), 'rimwright-test-'));
    onTestFinished(() => rmSync(folder, { recursive: true }));
    writeFileSync(join(folder, name), content);
    return join(folder, name);
  }

  it('takes a clockwise CSV for the same outline, and names it after its file', () => {
    const lines = SQUARE.toReversed().map((point) => point.join(','));
    const read = readDesignFile(fileWith('Out Line.CSV', `x_mm,y_mm\n${lines.join('\n')}\n`));
    expect(read).toMatchObject({ id: 'out-line', family: 'given', distanceM: null });
    expect(Array.from(read.elements[0].rings[0])).toEqual(
      [-1, 1, -1, -1, 1, -1, 1, 1].map((mm) => mm / 1000),
    );
  });

  it('takes the design of `smallest --json`, and a front of one', () => {
    expect(readDesignFile(fileWith('s.json', JSON.stringify({ design: DESIGN }))).id).toBe('a-1');
    expect(readDesignFile(fileWith('f.json', JSON.stringify({ designs: [DESIGN] }))).id).toBe('a-1');
    const two = fileWith('f#2.json', JSON.stringify({ designs: [DESIGN, { ...DESIGN, id: 'b' }] }));
    expect(readDesignFile(two, 'b').id).toBe('b');
    expect(readDesignFile(`${two}#b`).id).toBe('b');
  });

  it('refuses what is too long, not text, or not there', () => {
    const long = fileWith('long.csv', 'x'.repeat(20_000_001));
    expect(messageOf(() => readDesignFile(long))).toBe(
      `${long}: found more than 20000000 bytes, expected at most 20000000 bytes`,
    );
    const bytes = fileWith('bytes.csv', Uint8Array.of(0x78, 0xff, 0xfe));
    expect(messageOf(() => readDesignFile(bytes))).toContain('found bytes that are not UTF-8');
    expect(messageOf(() => readDesignFile('/no/such.csv'))).toContain('found no such file');
    expect(messageOf(() => readDesignFile(tmpdir()))).toContain('found a folder where a file is needed');
    // A device that never ends: only as much is read as a file may hold.
    expect(messageOf(() => readDesignFile('/dev/zero'))).toContain('found more than 20000000 bytes');
  });
});
