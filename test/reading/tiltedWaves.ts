import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';

type Triple = readonly [x: number, y: number, z: number];

/**
 * What a centred disc reads of a sphere on the axis in light that comes evenly, without coherence, from a disc of directions: plane
 * waves tilted by every angle up to `sourceAngleRad`, each with its own far field and the Poynting vectors of both, unpolarised.
 * Nothing is taken for small.
 *
 * @returns m²
 */
export function tiltedReading(
  coefficients: MieCoefficients,
  wavenumber: number,
  distanceM: number,
  radiusM: number,
  sourceAngleRad: number,
): number {
  const eta = (wavenumber * radiusM * radiusM) / (2 * distanceM);
  const swing = wavenumber * radiusM * Math.sin(sourceAngleRad);
  const fresnel = (wavenumber * distanceM * Math.sin(sourceAngleRad) ** 2) / 2;
  const tilts = gaussLegendre(Math.ceil(10 + 0.4 * (swing + fresnel)));
  const radii = gaussLegendre(Math.ceil(16 + 0.6 * (eta + swing)));
  const turns = 2 * Math.ceil(12 + 0.7 * swing);
  let sum = 0;
  tilts.nodes.forEach((node, t) => {
    // Evenly in solid angle: evenly in the cosine.
    const share = (1 + node) / 2;
    const halfSine = Math.sin(sourceAngleRad / 2) * Math.sqrt(share);
    const tilt = 2 * Math.asin(halfSine);
    const flux = fluxOf(coefficients, wavenumber, tilt);
    radii.nodes.forEach((place, i) => {
      const rho = (radiusM * (1 + place)) / 2;
      let ring = 0;
      // Half a turn: the other half mirrors it.
      for (let j = 0; j < turns; j++) {
        const phi = (Math.PI * (j + 0.5)) / turns;
        ring += flux([rho * Math.cos(phi), rho * Math.sin(phi), distanceM]);
      }
      sum +=
        (((tilts.weights[t] / 2) * radii.weights[i] * radiusM) / 2) * rho * ring * ((2 * Math.PI) / turns);
    });
  });
  return sum;
}

/** Flux missing from a unit area of the plane at a place relative to the sphere, for a wave of unit irradiance tilted towards x. */
function fluxOf(coefficients: MieCoefficients, k: number, tilt: number) {
  const [sin, cos] = [Math.sin(tilt), Math.cos(tilt)];
  // Into the frame in which the wave travels along z.
  const turned = ([x, y, z]: Triple): Triple => [x * cos - z * sin, y, x * sin + z * cos];
  const normal = turned([0, 0, 1]);
  const s = new Float64Array(4);
  return (place: Triple): number => {
    const [x, y, z] = turned(place);
    const rho = Math.hypot(x, y);
    const r = Math.hypot(rho, z);
    const [cx, cy] = rho > 0 ? [x / rho, y / rho] : [1, 0];
    scatteringAmplitudes(coefficients, z / r, s);
    const phase = (k * rho * rho) / (r + z);
    const [waveRe, waveIm] = [-Math.sin(phase) / (k * r), Math.cos(phase) / (k * r)];
    const direction: Triple = [x / r, y / r, z / r];
    const along: Triple = [(cx * z) / r, (cy * z) / r, -rho / r];
    const across: Triple = [cy, -cx, 0];
    let missing = 0;
    for (const incident of [
      [1, 0, 0],
      [0, 1, 0],
    ] as const) {
      const parallel = incident[0] * cx + incident[1] * cy;
      const perpendicular = incident[0] * cy - incident[1] * cx;
      const [re, im] = [0, 1].map((part) =>
        along.map((a, j) => s[2 + part] * parallel * a + s[part] * perpendicular * across[j]),
      ) as unknown as [Triple, Triple];
      const waved = (a: number, b: number) => (v: number, j: number) => a * v + b * im[j];
      const fieldRe = re.map(waved(waveRe, -waveIm)) as unknown as Triple;
      const fieldIm = re.map(waved(waveIm, waveRe)) as unknown as Triple;
      // The incident field is real here, so that its products take the real part of the scattered one.
      missing -= dot(cross(incident, cross(direction, fieldRe)), normal);
      missing -= dot(cross(fieldRe, cross([0, 0, 1], incident)), normal);
      for (const part of [fieldRe, fieldIm]) missing -= dot(cross(part, cross(direction, part)), normal);
    }
    return missing / 2;
  };
}

function cross([a, b, c]: Triple, [d, e, f]: Triple): Triple {
  return [b * f - c * e, c * d - a * f, a * e - b * d];
}

function dot([a, b, c]: Triple, [d, e, f]: Triple): number {
  return a * d + b * e + c * f;
}
