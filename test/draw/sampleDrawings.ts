import type { Drawing } from '../../src/draw/drawing.ts';

/** A regular polygon about (centreX, centreY); clockwise where `sense` is −1. Lengths in metres. */
export function regularRing(
  radius: number,
  count: number,
  sense: 1 | -1 = 1,
  [centreX, centreY]: readonly [number, number] = [0, 0],
): Float64Array {
  const ring = new Float64Array(2 * count);
  for (let k = 0; k < count; k++) {
    const angle = (sense * 2 * Math.PI * k) / count;
    ring.set([centreX + radius * Math.cos(angle), centreY + radius * Math.sin(angle)], 2 * k);
  }
  return ring;
}

/** A star of `points` points, turned a little so that nothing is symmetric about the axes. */
function starRing(outer: number, inner: number, points: number): Float64Array {
  const ring = new Float64Array(4 * points);
  for (let k = 0; k < 2 * points; k++) {
    const angle = 0.1 + (Math.PI * k) / points;
    const radius = k % 2 === 0 ? outer : inner;
    ring.set([radius * Math.cos(angle), radius * Math.sin(angle)], 2 * k);
  }
  return ring;
}

function drawing(title: string, elements: Drawing['elements']): Drawing {
  const facts = [
    { label: 'Sheet', text: 'Chrome on glass' },
    { label: 'Edges', text: 'within 0.5 µm of where they are drawn, all around and on both sides' },
  ];
  return {
    title,
    elements,
    facts,
    notes: ['Critical edge: the outer rim.'],
    distanceM: 0.02,
    hash: '0f3a9c',
  };
}

/** Outlines of the sizes that briefs ask for: 60 µm to 2 mm. */
export const SAMPLES: Record<'disc' | 'annulus' | 'star' | 'zones', Drawing> = {
  disc: drawing('Disc of 512 corners', [{ weight: 1, rings: [regularRing(1.234567e-3, 512)] }]),
  annulus: drawing('Ring off the axis', [
    {
      weight: 1,
      rings: [regularRing(92e-6, 48, 1, [3e-6, -7e-6]), regularRing(60.6e-6, 48, -1, [3e-6, -7e-6])],
    },
  ]),
  star: drawing('Star', [{ weight: 1, rings: [starRing(2e-3, 0.9e-3, 7)] }]),
  zones: drawing('Three zones', [
    { weight: 1, rings: [regularRing(112.7e-6, 24)] },
    { weight: -1, rings: [regularRing(159.4e-6, 24), regularRing(112.7e-6, 24, -1)] },
    { weight: 0.5, rings: [regularRing(195.2e-6, 24), regularRing(159.4e-6, 24, -1)] },
  ]),
};
