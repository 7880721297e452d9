/** A polygon from points in micrometres. */
export function polygon(...pointsUm: [number, number][]): Float64Array {
  return Float64Array.from(pointsUm.flat(), (value) => value * 1e-6);
}

/** A regular polygon inscribed in a circle, counter-clockwise; lengths in micrometres. */
export function circle(
  vertices: number,
  radiusUm: number,
  centreUm: [number, number] = [0, 0],
): Float64Array {
  const turn = (2 * Math.PI) / vertices;
  return polygon(
    ...Array.from({ length: vertices }, (_, k): [number, number] => [
      centreUm[0] + radiusUm * Math.cos(0.1 + k * turn),
      centreUm[1] + radiusUm * Math.sin(0.1 + k * turn),
    ]),
  );
}

/** A closed curve ρ(φ) in micrometres, counter-clockwise. */
export function polar(vertices: number, radiusUm: (phi: number) => number): Float64Array {
  return polygon(
    ...Array.from({ length: vertices }, (_, k): [number, number] => {
      const phi = (2 * Math.PI * k) / vertices;
      return [radiusUm(phi) * Math.cos(phi), radiusUm(phi) * Math.sin(phi)];
    }),
  );
}

/** A star with sharp tips at one radius and notches at another, in micrometres. */
export function star(tips: number, outerUm: number, innerUm: number): Float64Array {
  return polygon(
    ...Array.from({ length: 2 * tips }, (_, k): [number, number] => {
      const radius = k % 2 === 0 ? outerUm : innerUm;
      return [radius * Math.cos((Math.PI * k) / tips), radius * Math.sin((Math.PI * k) / tips)];
    }),
  );
}

/** The sector between two radii over an angle, centred on the x axis; lengths in micrometres. */
export function sector(innerUm: number, outerUm: number, angle: number, pieces: number): Float64Array {
  const arc = (radius: number, sense: 1 | -1) =>
    Array.from({ length: pieces + 1 }, (_, k): [number, number] => {
      const phi = sense * angle * (k / pieces - 0.5);
      return [radius * Math.cos(phi), radius * Math.sin(phi)];
    });
  return polygon(...arc(outerUm, 1), ...(innerUm > 0 ? arc(innerUm, -1) : [[0, 0] as [number, number]]));
}

/** A slot with round ends along x: `lengthUm` between the centres of its ends. */
export function slot(lengthUm: number, widthUm: number, piecesAnEnd: number): Float64Array {
  const end = (sign: 1 | -1) =>
    Array.from({ length: piecesAnEnd + 1 }, (_, k): [number, number] => {
      const phi = Math.PI * (k / piecesAnEnd - 0.5) + (sign > 0 ? 0 : Math.PI);
      return [(sign * lengthUm) / 2 + (widthUm / 2) * Math.cos(phi), (widthUm / 2) * Math.sin(phi)];
    });
  return polygon(...end(1), ...end(-1));
}

/** The ring run the other way: a hole, or a piece of sheet inside an opening. */
export function reversed(ring: Float64Array): Float64Array {
  const out = new Float64Array(ring.length);
  for (let i = 0; i < ring.length; i += 2) {
    out[i] = ring[ring.length - 2 - i];
    out[i + 1] = ring[ring.length - 1 - i];
  }
  return out;
}

/** Every point moved by a map of the plane. */
export function mapped(ring: Float64Array, map: (x: number, y: number) => [number, number]): Float64Array {
  const out = new Float64Array(ring.length);
  for (let i = 0; i < ring.length; i += 2) out.set(map(ring[i], ring[i + 1]), i);
  return out;
}

/** The same polygon with every edge cut into pieces. */
export function cutEdges(ring: Float64Array, pieces: number): Float64Array {
  const points: number[] = [];
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    for (let k = 0; k < pieces; k++) {
      const share = k / pieces;
      points.push(ring[i] + share * (ring[j] - ring[i]), ring[i + 1] + share * (ring[j + 1] - ring[i + 1]));
    }
  }
  return Float64Array.from(points);
}
