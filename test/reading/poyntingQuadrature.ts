import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { forwardAmplitude, scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';

/** A sphere by its Mie coefficients alone: no table, no series. */
export interface PlainSphere {
  coefficients: MieCoefficients;
  /** In the medium, 1/m. */
  wavenumber: number;
}

/** What a detector sees: a disc, or rings [x0, y0, …] counter-clockwise outside and clockwise around holes. Metres. */
export type Region = { disc: { x: number; y: number; radiusM: number } } | { rings: number[][] };

/** A 3-D complex vector: x, y, z, each re, im. */
type Vector = Float64Array;

/**
 * The reading by the slow road: fields as 3-D complex vectors, their Poynting vectors by E × H*, integrated over the
 * area of the detector. It shares with the fast one the Mie coefficients and amplitudes, and nothing after them.
 *
 * Far fields after Bohren & Huffman (1983), section 3.2 and eq. 4.75: E_s = e^{ik(r−z)}/(−ikr) (S2 E_∥ ê_∥ + S1 E_⊥ ê_⊥).
 *
 * @param polarizationRad field's angle from x, or null for the mean of two fields at right angles
 * @param px,py the particle's place; the detector plane is `distanceM` behind it
 * @returns m²
 */
export function poyntingReading(
  sphere: PlainSphere,
  distanceM: number,
  polarizationRad: number | null,
  [px, py]: readonly [number, number],
  region: Region,
): number {
  const angles = polarizationRad === null ? [0.2, 0.2 + Math.PI / 2] : [polarizationRad];
  const flux = fluxAt(sphere, distanceM, angles);
  const kappa = sphere.wavenumber / (2 * distanceM);
  const at = (x: number, y: number) => flux(x - px, y - py);
  if ('disc' in region) {
    const { x, y, radiusM } = region.disc;
    const far = Math.hypot(x - px, y - py);
    return discIntegral(at, region.disc, 14 + 0.6 * kappa * radiusM * (radiusM + 2 * far), [
      16 + 2.4 * kappa * radiusM * far,
    ]);
  }
  return ringsIntegral(at, region.rings, px, py, kappa);
}

/** Extinction cross-section by the optical theorem, m². */
export function extinction({ coefficients, wavenumber }: PlainSphere): number {
  return (4 * Math.PI * forwardAmplitude(coefficients)[0]) / wavenumber ** 2;
}

/** Flux missing from a unit area at (x, y) from the particle's axis, for unit irradiance. */
function fluxAt({ coefficients, wavenumber: k }: PlainSphere, z: number, angles: readonly number[]) {
  const s = new Float64Array(4);
  const [incidentE, incidentH, scatteredE, scatteredH] = [0, 0, 0, 0].map(() => new Float64Array(6));
  return (x: number, y: number): number => {
    const rho = Math.hypot(x, y);
    const r = Math.hypot(rho, z);
    // On the axis any plane of scattering serves.
    const [cx, cy] = rho > 0 ? [x / rho, y / rho] : [1, 0];
    scatteringAmplitudes(coefficients, z / r, s);
    // e^{ik(r−z)}/(−ikr) = i e^{ik(r−z)}/(kr)
    const phase = k * ((rho * rho) / (r + z));
    const [waveRe, waveIm] = [-Math.sin(phase) / (k * r), Math.cos(phase) / (k * r)];
    const along = [(cx * z) / r, (cy * z) / r, -rho / r];
    const across = [cy, -cx, 0];
    const direction = [x / r, y / r, z / r];
    let missing = 0;
    for (const angle of angles) {
      const [ex, ey] = [Math.cos(angle), Math.sin(angle)];
      setReal(incidentE, [ex, ey, 0]);
      crossReal([0, 0, 1], incidentE, incidentH);
      const parallel = ex * cx + ey * cy;
      const perpendicular = ex * cy - ey * cx;
      for (let j = 0; j < 3; j++) {
        const re = s[2] * parallel * along[j] + s[0] * perpendicular * across[j];
        const im = s[3] * parallel * along[j] + s[1] * perpendicular * across[j];
        scatteredE[2 * j] = re * waveRe - im * waveIm;
        scatteredE[2 * j + 1] = re * waveIm + im * waveRe;
      }
      crossReal(direction, scatteredE, scatteredH);
      missing -= normalFlux(incidentE, scatteredH) + normalFlux(scatteredE, incidentH);
      missing -= normalFlux(scatteredE, scatteredH);
    }
    return missing / angles.length;
  };
}

function setReal(out: Vector, [x, y, z]: readonly number[]): void {
  out.set([x, 0, y, 0, z, 0]);
}

/** a × b with a real: the magnetic field of a wave that travels along a. */
function crossReal(a: readonly number[], b: Vector, out: Vector): void {
  for (let part = 0; part < 2; part++) {
    out[part] = a[1] * b[4 + part] - a[2] * b[2 + part];
    out[2 + part] = a[2] * b[part] - a[0] * b[4 + part];
    out[4 + part] = a[0] * b[2 + part] - a[1] * b[part];
  }
}

/** z component of Re(E × H*). */
function normalFlux(e: Vector, h: Vector): number {
  return e[0] * h[2] + e[1] * h[3] - (e[2] * h[0] + e[3] * h[1]);
}

function discIntegral(
  f: (x: number, y: number) => number,
  disc: { x: number; y: number; radiusM: number },
  radial: number,
  [azimuthal]: readonly number[],
): number {
  const { nodes, weights } = gaussLegendre(Math.ceil(radial));
  const turns = Math.ceil(azimuthal);
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const radius = (disc.radiusM * (1 + nodes[i])) / 2;
    for (let j = 0; j < turns; j++) {
      const phi = (2 * Math.PI * (j + 0.3)) / turns;
      sum += weights[i] * radius * f(disc.x + radius * Math.cos(phi), disc.y + radius * Math.sin(phi));
    }
  }
  return (sum * disc.radiusM * Math.PI) / turns;
}

/** Triangles between one common point and every edge, counted with their sense of rotation, add up to the enclosed area. */
function ringsIntegral(
  f: (x: number, y: number) => number,
  rings: readonly number[][],
  px: number,
  py: number,
  kappa: number,
): number {
  const [ax, ay] = [mean(rings[0], 0), mean(rings[0], 1)];
  const phaseAt = (x: number, y: number) => kappa * ((x - px) ** 2 + (y - py) ** 2);
  let sum = 0;
  for (const ring of rings) {
    for (let i = 0; i < ring.length; i += 2) {
      const [x0, y0] = [ring[i], ring[i + 1]];
      const [x1, y1] = [ring[(i + 2) % ring.length], ring[(i + 3) % ring.length]];
      const far = Math.max(phaseAt(x0, y0), phaseAt(x1, y1)) + phaseAt(ax, ay);
      const length = Math.hypot(x1 - x0, y1 - y0);
      const along = 2 * kappa * length * Math.max(Math.hypot(x0 - px, y0 - py), Math.hypot(x1 - px, y1 - py));
      const us = gaussLegendre(Math.ceil(16 + 0.6 * far));
      const ts = gaussLegendre(Math.ceil(14 + 0.35 * along));
      const twiceArea = (x0 - ax) * (y1 - ay) - (y0 - ay) * (x1 - ax);
      for (let m = 0; m < us.nodes.length; m++) {
        const u = (1 + us.nodes[m]) / 2;
        let inner = 0;
        for (let n = 0; n < ts.nodes.length; n++) {
          const t = (1 + ts.nodes[n]) / 2;
          inner += ts.weights[n] * f(ax + u * (x0 + t * (x1 - x0) - ax), ay + u * (y0 + t * (y1 - y0) - ay));
        }
        sum += (us.weights[m] * u * inner * twiceArea) / 4;
      }
    }
  }
  return sum;
}

function mean(ring: readonly number[], part: 0 | 1): number {
  let sum = 0;
  for (let i = part; i < ring.length; i += 2) sum += ring[i];
  return (2 * sum) / ring.length;
}
