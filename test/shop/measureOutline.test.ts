import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import type { OutlineMeasures } from '../../src/shop/measureOutline.ts';
import { measureOutline } from '../../src/shop/measureOutline.ts';
import { narrowestByRays } from './rayWidth.ts';
import { circle, cutEdges, mapped, polar, polygon, reversed, sector, slot, star } from './rings.ts';

/** Width of the narrowest opening and web in µm, null where there is none. */
function widthsUm(...rings: Float64Array[]): [opening: number | null, web: number | null] {
  const { smallestOpening, smallestWeb } = measureOutline(rings);
  return [toUm(smallestOpening?.widthM), toUm(smallestWeb?.widthM)];
}

function toUm(metres: number | undefined): number | null {
  return metres === undefined ? null : metres * 1e6;
}

const square = (sizeUm: number, x = 0, y = 0) =>
  polygon([x, y], [x + sizeUm, y], [x + sizeUm, y + sizeUm], [x, y + sizeUm]);

const lShape = polygon([0, 0], [40, 0], [40, 10], [12, 10], [12, 50], [0, 50]);
const uShape = polygon([0, 0], [50, 0], [50, 40], [32, 40], [32, 10], [20, 10], [20, 40], [0, 40]);
const triangle = polygon([0, 0], [60, 0], [30, 30 * Math.sqrt(3)]);
const trapezoid = polygon([0, 0], [100, 0], [100, 30], [0, 1]);

/** Symmetric, sides 0.1 rad off the axis either way, 2 µm wide at its narrow end. */
const wedge = polygon([0, -1], [100, -1 - 100 * Math.tan(0.1)], [100, 1 + 100 * Math.tan(0.1)], [0, 1]);

// All expected values are plane geometry.
describe('widths of polygons', () => {
  it.each([
    ['a square is as wide as its side', [square(20)], 20, null],
    ['a rectangle as its shorter side', [polygon([0, 0], [90, 0], [90, 14], [0, 14])], 14, null],
    ['an L as its thinner leg', [lShape], 10, null],
    ['a U as its foot, with the tongue of sheet as web', [uShape], 10, 12],
    ['a tapered slot as its narrow end', [trapezoid], 1, null],
    [
      'a taper cut off blunt as the line upright at its end',
      [wedge],
      2 * (Math.cos(0.1) / Math.cos(0.2)),
      null,
    ],
    ['a triangle as its inscribed circle', [triangle], 20 * Math.sqrt(3), null],
    ['a hexagon from side to side', [circle(6, 10)], 10 * Math.sqrt(3), null],
    ['two squares side by side leave a web', [square(20), square(20, 23, 5)], 20, 3],
    ['two squares corner to corner as well', [square(20), square(20, 23, 24)], 20, 5],
    [
      'triangles tip to tip too',
      [triangle, mapped(triangle, (x, y) => [60e-6 - x, 107e-6 - y])],
      20 * Math.sqrt(3),
      107 - 60 * Math.sqrt(3),
    ],
    ['squares that touch leave none', [square(20), square(20, 20, 20)], 20, 0],
    ['a frame has its bar, and its island for web', [square(20), reversed(square(10, 4, 5))], 4, 10],
    ['a triangular island is a web too', [square(90, -10, -20), reversed(triangle)], 10, 20 * Math.sqrt(3)],
  ])('%s', (_, rings, openingUm, webUm) => {
    const [opening, web] = widthsUm(...rings);
    expect(opening).toBeCloseTo(openingUm, 9);
    if (webUm === null) expect(web).toBeNull();
    else expect(web).toBeCloseTo(webUm, 9);
  });

  it('tell a tip whose sides face each other from a corner', () => {
    // Tips of 360°/n less twice the rest: the pentagram's 36° is a corner, a needle of 10° is not.
    expect(widthsUm(star(5, 100, 100 * 0.381966))[0]).toBeGreaterThan(50);
    const needle = polygon([0, 0], [100, -100 * Math.tan(Math.PI / 36)], [100, 100 * Math.tan(Math.PI / 36)]);
    const { smallestOpening } = measureOutline([needle]);
    expect(smallestOpening).toEqual({ widthM: 0, at: [0, 0] });
    expect(measureOutline([star(12, 100, 40)]).smallestOpening?.widthM).toBe(0);
    // A spike of sheet is as thin.
    const notched = polygon([-50, 0], [0, 40], [50, 0], [50, 60], [0, 42], [-50, 60]);
    expect(measureOutline([notched]).smallestWeb).toBeNull();
    const spiked = polygon([-50, 0], [-5, 0], [0, 40], [5, 0], [50, 0], [50, 90], [-50, 90]);
    expect(measureOutline([spiked]).smallestWeb?.widthM).toBe(0);
  });

  it('do not look through walls', () => {
    // Bottom and top face each other, but the diagonal bar hides them: each half is a triangle of its own.
    const halves = [polygon([0, 0], [100, 0], [100, 100]), polygon([-2, 2], [98, 102], [-2, 102])];
    const [opening, web] = widthsUm(...halves);
    expect(opening).toBeCloseTo(100 * (2 - Math.SQRT2), 9);
    expect(web).toBeCloseTo(2 * Math.SQRT2, 9);
    // Found by untangling random polygons: its notch has two sides that face each other through the opening alone.
    const folded = polygon([67, 72], [74, 43], [74, 36], [5, 94], [21, 52], [21, 70], [82, 21], [93, 59]);
    expect(widthsUm(folded)[1]).toBeNull();
  });

  it('do not run along an edge from beyond an acute corner', () => {
    const acute = polygon([-60, 0], [0, 0], [-60, 70]);
    const above = polygon([0, 25], [0, 20], [60, -40], [120, 10], [60, 53]);
    const mirrored = [acute, above].map((ring) => reversed(mapped(ring, (x, y) => [-x, y])));
    for (const rings of [[acute, above], mirrored]) {
      expect(widthsUm(...rings)[0]).toBeCloseTo((4 * 2100) / (130 + Math.hypot(60, 70)), 9);
    }
  });

  it('reach around acute corners', () => {
    // Two tips point past each other, 55° off their axes, farther apart than the narrowest opening is wide.
    const [dx, dy] = [100 * Math.cos(Math.PI / 5), 100 * Math.sin(Math.PI / 5)];
    const apex = 30e-6 * Math.sqrt(3);
    const opposite = mapped(triangle, (x, y) => [60e-6 - x + dx * 1e-6, 2 * apex - y + dy * 1e-6]);
    const narrow = polygon([0, -900], [90, -900], [90, -895], [0, -895]);
    const [opening, web] = widthsUm(narrow, triangle, opposite);
    expect(opening).toBeCloseTo(5, 9);
    expect(web).toBeCloseTo(100, 9);
  });

  it('leave no web where corners or sides touch, whichever way rounding goes', () => {
    const below = mapped(triangle, (x, y) => [x, y - 30e-6 * Math.sqrt(3)]);
    for (const angle of [0, 0.1, 0.7, 1.3, 2.9, 4.4]) {
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const turn = (ring: Float64Array) => mapped(ring, (x, y) => [c * x - s * y, s * x + c * y]);
      const tip = widthsUm(turn(below), turn(square(70)));
      expect(tip).toEqual([expect.closeTo(20 * Math.sqrt(3), 6), expect.closeTo(0, 6)]);
      const side = widthsUm(turn(square(20)), turn(square(20, 20, 5)));
      expect(side[0]).toBeGreaterThan(14);
      expect(side[1]).toBeCloseTo(0, 6);
    }
  });

  it('agree with rays cast across, a second way, on jagged outlines', () => {
    const random = randomStream(3);
    const jagged = (x: number, y: number, points: number) =>
      polygon(
        ...Array.from({ length: points }, (_, k): [number, number] => {
          const phi = (2 * Math.PI * (k + 0.7 * random.uniform())) / points;
          const radius = 100 * (0.35 + 0.65 * random.uniform());
          return [x + radius * Math.cos(phi), y + radius * Math.sin(phi)];
        }),
      );
    const excesses: number[] = [];
    for (let trial = 0; trial < 100; trial++) {
      const points = () => 5 + Math.floor(30 * random.uniform());
      const rings = [jagged(0, 0, points()), jagged(205, 30, points()), jagged(100, 200, points())];
      const { smallestOpening, smallestWeb } = measureOutline(rings);
      excesses.push((smallestOpening?.widthM ?? Infinity) / narrowestByRays(rings, 1) - 1);
      excesses.push((smallestWeb?.widthM ?? Infinity) / narrowestByRays(rings, -1) - 1);
    }
    // Rays find no less, but for the few narrow ends that a corner half hides.
    expect(excesses.filter((excess) => excess > 1e-9).length).toBeLessThanOrEqual(4);
    expect(Math.max(...excesses)).toBeLessThan(0.05);
  });

  it('come with their place', () => {
    const { smallestOpening, smallestWeb } = measureOutline([square(20), reversed(square(10, 4, 5))]);
    expect(smallestOpening?.at[0]).toBeCloseTo(2e-6, 12);
    expect(smallestWeb?.at[0]).toBeGreaterThanOrEqual(4e-6);
    expect(smallestWeb?.at[0]).toBeLessThanOrEqual(14e-6);
  });
});

describe('widths of curves', () => {
  it.each([16, 17, 64, 200, 512])(
    'of a circle with %i vertices: its diameter, but for a small share',
    (vertices) => {
      const [opening, web] = widthsUm(circle(vertices, 50));
      expect(opening).toBeLessThanOrEqual(100);
      expect(opening).toBeGreaterThanOrEqual(100 * (1 - 1.5 * (Math.PI / vertices) ** 2));
      expect(web).toBeNull();
    },
  );

  it.each([
    ['a ring', [circle(400, 90), reversed(circle(300, 60))], 30, 120],
    ['two discs at a gap', [circle(300, 40), circle(200, 30, [60, 45])], 60, 5],
    ['a disc in a ring', [circle(400, 90), reversed(circle(300, 60)), circle(300, 55)], 30, 5],
    ['a slot with round ends', [slot(200, 24, 40)], 24, null],
    ['a sector of a ring', [sector(60, 90, 1, 60)], 30, null],
    // Upright on one flank at its inner end, where the arc bulges too far for the straight line between the ends.
    ['a narrow sector', [sector(100, 200, 0.2, 30)], 100 * Math.tan(0.2), null],
    // The shortest chord upright on an ellipse with a² > 2b² is 3√3 a²b²/(a² + b²)^1.5; for 8:5 its ends are 23° off parallel.
    ['an ellipse', [polar(3000, ellipse(80, 50))], (3 * Math.sqrt(3) * 4000 ** 2) / 8900 ** 1.5, null],
    ['half a disc, where its sides stop facing', [sector(0, 80, Math.PI, 400)], 0.86 * 80, null],
  ])('of %s', (_, rings, openingUm, webUm) => {
    const [opening, web] = widthsUm(...rings);
    expect(Math.abs((opening ?? 0) / openingUm - 1)).toBeLessThan(2e-3);
    if (webUm === null) expect(web).toBeNull();
    else expect(Math.abs((web ?? 0) / webUm - 1)).toBeLessThan(5e-3);
  });

  it('of a disc with a wavy rim: its diameter, or less by up to the cosine of the flanks', () => {
    const [opening] = widthsUm(polar(2400, (phi) => 100 + 0.5 * Math.cos(60 * phi)));
    expect(opening).toBeLessThan(200);
    expect(opening).toBeGreaterThan(200 * Math.cos(Math.atan(0.3)) - 3);
  });

  it('agree with rays cast across, a second way, on random outlines', () => {
    const random = randomStream(5);
    let webs = 0;
    for (let trial = 0; trial < 30; trial++) {
      const depths = [0.25, 0.2, 0.12].map((depth) => depth * random.uniform());
      const phases = depths.map(() => 2 * Math.PI * random.uniform());
      const folds = [2, 5, 9].map((most) => 1 + Math.floor(most * random.uniform()));
      const outer = polar(
        220,
        (phi) => 100 * (1 + depths.reduce((sum, d, k) => sum + d * Math.cos(folds[k] * phi + phases[k]), 0)),
      );
      const inner = reversed(mapped(outer, (x, y) => [0.3 * x + 4e-6, 0.3 * y]));
      const beside = mapped(outer, (x, y) => [x + 260e-6, -y]);
      const rings = trial % 2 === 0 ? [outer, beside] : [outer, inner];
      const { smallestOpening, smallestWeb } = measureOutline(rings);
      const opening = narrowestByRays(rings, 1);
      expect(Math.abs((smallestOpening?.widthM ?? 0) / opening - 1)).toBeLessThan(0.01);
      const web = narrowestByRays(rings, -1);
      if (smallestWeb === null) continue;
      webs++;
      expect(Math.abs(smallestWeb.widthM / web - 1)).toBeLessThan(0.01);
    }
    expect(webs).toBeGreaterThan(20);
  });
});

function ellipse(aUm: number, bUm: number) {
  return (phi: number) => 1 / Math.hypot(Math.cos(phi) / aUm, Math.sin(phi) / bUm);
}

describe('corners', () => {
  it('of polygons are sharp, inside and outside', () => {
    const { tightestInsideCorner: inside, tightestOutsideCorner: outside } = measureOutline([lShape]);
    expect(inside?.radiusM).toBe(0);
    expect(inside?.turnRad).toBeCloseTo(Math.PI / 2, 12);
    expect(outside?.radiusM).toBe(0);
    expect(outside?.at.map((value) => value * 1e6)).toEqual(
      [12, 10].map((value) => expect.closeTo(value, 9)),
    );
    expect(measureOutline([square(20)]).tightestOutsideCorner).toBeNull();
  });

  it('are the sharpest where several are sharp', () => {
    const kite = polygon([0, 0], [30, 20], [120, 0], [30, -20]);
    expect(measureOutline([reversed(reversed(kite))]).tightestOutsideCorner?.at[0]).toBeCloseTo(120e-6, 12);
  });

  it.each([16, 64, 512])('of a circle with %i vertices have its radius', (vertices) => {
    const disc = measureOutline([circle(vertices, 50)]);
    expect((disc.tightestInsideCorner?.radiusM ?? 0) / 50e-6).toBeCloseTo(1, 3);
    expect(disc.tightestOutsideCorner).toBeNull();
    const ring = measureOutline([circle(vertices, 200), reversed(circle(vertices, 50))]);
    expect((ring.tightestOutsideCorner?.radiusM ?? 0) / 50e-6).toBeCloseTo(1, 3);
    expect((ring.tightestInsideCorner?.radiusM ?? 0) / 200e-6).toBeCloseTo(1, 3);
  });

  it('of a rounded slot have the radius of its ends, however dense the vertices', () => {
    for (const pieces of [10, 40, 160]) {
      const { tightestInsideCorner } = measureOutline([slot(200, 24, pieces)]);
      expect(Math.abs((tightestInsideCorner?.radiusM ?? 0) / 12e-6 - 1)).toBeLessThan(0.01);
      expect(Math.abs(tightestInsideCorner?.at[0] ?? 0)).toBeGreaterThan(100e-6);
    }
  });

  it('of a smooth wave have its radius of curvature', () => {
    // ρ = 100 + 40 cos 4φ: at the crests 1/R = (ρ − ρ'')/ρ² with ρ'' = −640, in the troughs ρ'' = 640.
    const wave = measureOutline([polar(4000, (phi) => 100 + 40 * Math.cos(4 * phi))]);
    const [crest, trough] = [140 ** 2 / (140 + 640), 60 ** 2 / (640 - 60)];
    expect(Math.abs((wave.tightestInsideCorner?.radiusM ?? 0) / (crest * 1e-6) - 1)).toBeLessThan(0.05);
    expect(Math.abs((wave.tightestOutsideCorner?.radiusM ?? 0) / (trough * 1e-6) - 1)).toBeLessThan(0.05);
  });

  it('hardly notice coordinates that were rounded to a nanometre', () => {
    const fine = mapped(circle(512, 10), (x, y) => [Math.round(x * 1e9) / 1e9, Math.round(y * 1e9) / 1e9]);
    const { tightestInsideCorner, tightestOutsideCorner } = measureOutline([fine]);
    expect(tightestOutsideCorner).toBeNull();
    expect(Math.abs((tightestInsideCorner?.radiusM ?? 0) / 10e-6 - 1)).toBeLessThan(0.1);
  });

  it('do not count where the boundary turns by less than 23°', () => {
    const bowed = polygon([0, 0], [50, -5], [100, 0], [100, 40], [50, 30], [0, 40]);
    expect(measureOutline([bowed]).tightestOutsideCorner).toBeNull();
  });
});

describe('pieces and islands', () => {
  it('are counted, the largest island with its centre', () => {
    const rings = [
      circle(100, 90),
      reversed(circle(80, 60)),
      circle(80, 40),
      reversed(circle(50, 20, [5, -3])),
      square(10, 200, 0),
    ];
    const { pieces, islands, islandAt } = measureOutline(rings);
    expect([pieces, islands]).toEqual([3, 2]);
    expect(Math.hypot(...(islandAt ?? [1, 1]))).toBeLessThan(1e-12);
    const hole = measureOutline([square(200, -100, -100), reversed(square(10, 30, 40))]);
    expect(hole.islandAt?.map((value) => value * 1e6)).toEqual([
      expect.closeTo(35, 9),
      expect.closeTo(45, 9),
    ]);
    expect(measureOutline([lShape]).islandAt).toBeNull();
  });
});

describe('measures stay the same', () => {
  const wavy = polar(240, (phi) => 100 * (1 + 0.2 * Math.cos(3 * phi + 1) + 0.15 * Math.cos(7 * phi)));
  const shapes: [name: string, rings: Float64Array[]][] = [
    ['an L', [lShape]],
    ['a U', [uShape]],
    ['a triangle', [triangle]],
    ['a star', [star(5, 100, 45)]],
    ['squares corner to corner', [square(20), square(20, 23, 24)]],
    ['a wave', [wavy]],
    ['a disc', [circle(41, 70)]],
    ['a ring beside a disc', [circle(90, 90), reversed(circle(60, 60)), circle(50, 30, [125, 10])]],
  ];

  /** Widths and radii in units of the shape's scale, and the counts. */
  function numbers(m: OutlineMeasures, scale = 1): number[] {
    const { smallestOpening, smallestWeb, tightestInsideCorner, tightestOutsideCorner, pieces, islands } = m;
    const lengths = [
      smallestOpening?.widthM,
      smallestWeb?.widthM,
      tightestInsideCorner?.radiusM,
      tightestOutsideCorner?.radiusM,
    ];
    return [
      ...lengths.map((length) => (length === undefined ? -1 : (length * 1e6) / scale)),
      pieces,
      islands,
    ];
  }

  it.each(shapes)('%s turned, mirrored, moved and scaled', (_, rings) => {
    const before = numbers(measureOutline(rings)).map((value) => expect.closeTo(value, 6));
    for (const angle of [0.3, 1.234, 2.5, Math.PI / 2]) {
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const turned = rings.map((ring) => mapped(ring, (x, y) => [c * x - s * y, s * x + c * y]));
      expect(numbers(measureOutline(turned))).toEqual(before);
    }
    const mirrored = rings.map((ring) => reversed(mapped(ring, (x, y) => [-x, y])));
    expect(numbers(measureOutline(mirrored))).toEqual(before);
    const moved = rings.map((ring) => mapped(ring, (x, y) => [x + 1e-3, y - 2e-3]));
    expect(numbers(measureOutline(moved))).toEqual(before);
    const larger = rings.map((ring) => mapped(ring, (x, y) => [1000 * x, 1000 * y]));
    expect(numbers(measureOutline(larger), 1000)).toEqual(before);
  });

  it.each(shapes)('%s begun at another vertex, rings in another order, a vertex given twice', (_, rings) => {
    const before = numbers(measureOutline(rings)).map((value) => expect.closeTo(value, 6));
    const begunElsewhere = rings.map((ring) => Float64Array.from([...ring.slice(4), ...ring.slice(0, 4)]));
    expect(numbers(measureOutline(begunElsewhere.reverse()))).toEqual(before);
    const twice = rings.map((ring) => Float64Array.from([...ring.slice(0, 2), ...ring]));
    expect(numbers(measureOutline(twice))).toEqual(before);
  });

  it.each(
    shapes.slice(0, 5).flatMap(([name, rings]) => [2, 7, 60].map((pieces) => ({ name, rings, pieces }))),
  )('$name with every edge cut into $pieces', ({ rings, pieces }) => {
    const cut = rings.map((ring) => cutEdges(ring, pieces));
    expect(numbers(measureOutline(cut))).toEqual(
      numbers(measureOutline(rings)).map((value) => expect.closeTo(value, 6)),
    );
  });

  it('a wave drawn with more vertices, within a hundredth', () => {
    const draw = (n: number) =>
      polar(n, (phi) => 100 * (1 + 0.2 * Math.cos(3 * phi) + 0.15 * Math.cos(7 * phi)));
    const fine = numbers(measureOutline([draw(4000)]));
    numbers(measureOutline([draw(500)]))
      .slice(0, 4)
      .forEach((value, k) => {
        expect(Math.abs(value / fine[k] - 1)).toBeLessThan(k < 2 ? 0.01 : 0.05);
      });
  });
});

describe('bad rings are refused', () => {
  it('not finite', () => {
    const ring = square(20);
    ring[3] = Number.NaN;
    expect(() => measureOutline([square(20, 50), ring])).toThrow(
      /^rings\[1\], point 1: found .*, NaN, expected/,
    );
  });

  it('fewer than three points', () => {
    expect(() => measureOutline([polygon([0, 0], [1, 0], [1, 0], [0, 0])])).toThrow(
      'found 2 different points',
    );
  });

  it('none at all has no measures', () => {
    expect(measureOutline([])).toEqual({
      smallestOpening: null,
      smallestWeb: null,
      tightestInsideCorner: null,
      tightestOutsideCorner: null,
      islands: 0,
      pieces: 0,
      islandAt: null,
    });
  });
});
