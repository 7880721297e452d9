import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { FIELD_NUMBERS, scatteredField } from '../../src/optics/scatteredField.ts';

/** A particle in a beam before a plane, metres; `focusM` and `z` from the nominal place, the plane at `planeM`. */
export interface Arrangement {
  wavenumber: number;
  waistM: number;
  focusM: number;
  planeM: number;
  place: readonly [x: number, y: number, z: number];
  sphere: MieCoefficients;
  /** Whether the sphere's exact fields are taken, at the plane's distance. */
  near?: boolean;
  /** Angle of the field from x, radians; unpolarised light without it. */
  polarizationRad?: number;
}

/** Points and weights of a plane rule: x, y, area. */
export type PlaneRule = number[];

/** Triangles from the origin to each edge; for outlines that can be seen whole from there, signed for the rest. */
export function polygonRule(ring: readonly number[], along: number, across: number): PlaneRule {
  const out: PlaneRule = [];
  const inward = gaussLegendre(along);
  const edgewise = gaussLegendre(across);
  for (let i = 0; i < ring.length; i += 2) {
    const j = (i + 2) % ring.length;
    const twice = ring[i] * ring[j + 1] - ring[i + 1] * ring[j];
    for (let a = 0; a < along; a++) {
      const t = (1 + inward.nodes[a]) / 2;
      for (let b = 0; b < across; b++) {
        const u = (1 + edgewise.nodes[b]) / 2;
        const x = ring[i] + u * (ring[j] - ring[i]);
        const y = ring[i + 1] + u * (ring[j + 1] - ring[i + 1]);
        out.push(t * x, t * y, (inward.weights[a] * edgewise.weights[b] * t * twice) / 4);
      }
    }
  }
  return out;
}

/** Between two circles about the origin. */
export function annulusRule(inner: number, outer: number, radial: number, around: number): PlaneRule {
  const out: PlaneRule = [];
  const { nodes, weights } = gaussLegendre(radial);
  for (let a = 0; a < radial; a++) {
    const rho = inner + ((outer - inner) * (1 + nodes[a])) / 2;
    for (let b = 0; b < around; b++) {
      const phi = (2 * Math.PI * (b + 0.5)) / around;
      const area = (rho * weights[a] * (outer - inner) * Math.PI) / around;
      out.push(rho * Math.cos(phi), rho * Math.sin(phi), area);
    }
  }
  return out;
}

/**
 * Reading by direct summation over the plane, over the irradiance on the axis at the particle's z.
 * The scattered field is a sum over the plane waves that make up the beam, each scattered in its own direction, S1 and S2 in the
 * plane of its own scattering; nothing is assumed of how the beam looks at the particle.
 */
export function quadratureReading(set: Arrangement, rule: PlaneRule): number {
  const { wavenumber: k, planeM, focusM, place } = set;
  const rayleighM = (k * set.waistM ** 2) / 2;
  const d = planeM - place[2];
  const axial = 1 / (1 + ((place[2] - focusM) / rayleighM) ** 2);
  let half = 0;
  for (let i = 0; i < rule.length; i += 3) half = Math.max(half, Math.abs(rule[i]), Math.abs(rule[i + 1]));
  const amplitude = scatteredAmplitude(set, half, d);
  let sum = 0;
  const f = new Float64Array(6);
  for (let i = 0; i < rule.length; i += 3) {
    const [x, y, area] = [rule[i], rule[i + 1], rule[i + 2]];
    const [uRe, uIm, cosRe, cosIm] = pointSource(k, rayleighM, planeM - focusM, x * x + y * y);
    const off2 = (x - place[0]) ** 2 + (y - place[1]) ** 2;
    const r = Math.sqrt(off2 + d * d);
    amplitude(x, y, f);
    const phase = (k * off2) / (r + d);
    const [c, s] = [Math.cos(phase), Math.sin(phase)];
    // Unpolarised: Sx and Sy average to the mean of S1 and S2, and what goes over into the other field counts as light.
    const { polarizationRad } = set;
    const [turnC, turnS] =
      polarizationRad === undefined ? [0, 0] : [Math.cos(2 * polarizationRad), Math.sin(2 * polarizationRad)];
    const [fRe, fIm] = [0, 1].map((c) => f[c] + turnC * f[2 + c] + turnS * f[4 + c]);
    const [otherRe, otherIm] = [0, 1].map((c) => turnC * f[4 + c] - turnS * f[2 + c]);
    const [waveRe, waveIm] = [fRe * c - fIm * s, fRe * s + fIm * c];
    // −Re{(cosθ + cosθ_u*) u* F e^{ik(r − d)}/(−ikr)}
    const [re, im] = [uRe * waveRe + uIm * waveIm, uRe * waveIm - uIm * waveRe];
    const crossed = ((d / r + cosRe) * im - cosIm * re) / (k * r);
    const power =
      polarizationRad === undefined
        ? f.reduce((sum, part) => sum + part * part, 0)
        : fRe ** 2 + fIm ** 2 + otherRe ** 2 + otherIm ** 2;
    const scattered = power / (k * r) ** 2;
    sum += area * (crossed - (d / r) * scattered);
  }
  return sum / axial;
}

/** −i z_R e^{ik(R − Q)}/R with R² = Q² + ρ², Q = z − i z_R, and Q/R, by polar numbers: re, im, re, im. */
function pointSource(k: number, rayleighM: number, z: number, s: number): [number, number, number, number] {
  const re2 = z * z - rayleighM * rayleighM + s;
  const im2 = -2 * z * rayleighM;
  const modulus = Math.hypot(re2, im2) ** 0.5;
  // Q lies in the lower half plane, and so does R.
  let angle = Math.atan2(im2, re2) / 2;
  if (angle > 0) angle -= Math.PI;
  if (im2 === 0) angle = -Math.PI / 2;
  const rRe = modulus * Math.cos(angle);
  const rIm = modulus * Math.sin(angle);
  const sumRe = rRe + z;
  const sumIm = rIm - rayleighM;
  const norm = sumRe ** 2 + sumIm ** 2;
  const pathRe = (s * sumRe) / norm;
  const pathIm = (-s * sumIm) / norm;
  const size = (Math.exp(-k * pathIm) * rayleighM) / modulus;
  const turn = k * pathRe - Math.PI / 2 - angle;
  const [ratio, lean] = [Math.hypot(z, rayleighM) / modulus, Math.atan2(-rayleighM, z) - angle];
  return [size * Math.cos(turn), size * Math.sin(turn), ratio * Math.cos(lean), ratio * Math.sin(lean)];
}

/**
 * (S1 + S2)/2, and (S2 − S1)/2 times cos 2ψ and sin 2ψ, ψ the azimuth of the scattering, each with the beam's field in it: over a square
 * of the plane, by Chebyshev interpolation between directions.
 */
function scatteredAmplitude(set: Arrangement, half: number, d: number) {
  const { wavenumber: k, place, sphere } = set;
  const lobes = (half / d) * sphere.x;
  const count = Math.ceil(10 + 1.5 * lobes);
  const at = Array.from({ length: count }, (_, i) => Math.cos((Math.PI * (i + 0.5)) / count));
  const waves = spectrum(set);
  const values = new Float64Array(6 * count * count);
  const table = amplitudeTable(sphere, set.near ? k * d : null);
  const s = new Float64Array(4);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < count; j++) {
      const nx = half * at[i] - place[0];
      const ny = half * at[j] - place[1];
      const r = Math.hypot(nx, ny, d);
      const o = 6 * (i * count + j);
      for (let w = 0; w < waves.length; w += 4) {
        const [qx, qy] = [waves[w] / k, waves[w + 1] / k];
        const qz = Math.sqrt(1 - qx * qx - qy * qy);
        // 1 − cosΘ = |n − q|²/2
        const [tx, ty] = [nx / r - qx, ny / r - qy];
        const versine = (tx ** 2 + ty ** 2 + (d / r - qz) ** 2) / 2;
        table(versine, s);
        const across = tx ** 2 + ty ** 2 + 1e-300;
        const [turnC, turnS] = [(tx ** 2 - ty ** 2) / across, (2 * tx * ty) / across];
        const [re, im] = [waves[w + 2], waves[w + 3]];
        const mean = [(s[0] + s[2]) / 2, (s[1] + s[3]) / 2];
        const half = [(s[2] - s[0]) / 2, (s[3] - s[1]) / 2];
        const parts = [mean, half.map((part) => part * turnC), half.map((part) => part * turnS)];
        parts.forEach(([sRe, sIm], c) => {
          values[o + 2 * c] += re * sRe - im * sIm;
          values[o + 2 * c + 1] += re * sIm + im * sRe;
        });
      }
    }
  }
  const sign = (i: number) => (i % 2 === 0 ? 1 : -1) * Math.sin((Math.PI * (i + 0.5)) / count);
  const weigh = (x: number) => {
    const raw = at.map((node, i) => sign(i) / (x / half - node + 1e-300));
    const total = raw.reduce((sum, value) => sum + value, 0);
    return raw.map((value) => value / total);
  };
  return (x: number, y: number, out: Float64Array) => {
    const wx = weigh(x);
    const wy = weigh(y);
    out.fill(0);
    for (let i = 0; i < count; i++) {
      for (let j = 0; j < count; j++) {
        const weight = wx[i] * wy[j];
        for (let c = 0; c < 6; c++) out[c] += weight * values[6 * (i * count + j) + c];
      }
    }
  };
}

/** Plane waves of the beam at the particle, those of a point source at a complex place (Deschamps 1971): qx, qy, re, im. */
function spectrum({ wavenumber: k, waistM, focusM, place }: Arrangement): number[] {
  const rayleighM = (k * waistM ** 2) / 2;
  const [px, py, z] = place;
  const zeta = Math.abs(z - focusM) / rayleighM;
  const reach = 6;
  const fastest = zeta * reach + (Math.SQRT2 * Math.hypot(px, py)) / waistM + 6;
  const count = Math.ceil((2 * reach * fastest) / (2 * Math.PI)) + 1;
  const step = (2 * reach) / (count - 1);
  const out: number[] = [];
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < count; j++) {
      const [a, b] = [i * step - reach, j * step - reach];
      const [qx, qy] = [(Math.SQRT2 * a) / waistM, (Math.SQRT2 * b) / waistM];
      const q2 = qx * qx + qy * qy;
      const kz = Math.sqrt(k * k - q2);
      const weight = ((k / kz) * Math.exp((-rayleighM * q2) / (k + kz)) * step * step) / (2 * Math.PI);
      if (weight < 1e-9 * step * step) continue;
      const phase = qx * px + qy * py - (q2 / (k + kz)) * (z - focusM);
      out.push(qx, qy, weight * Math.cos(phase), weight * Math.sin(phase));
    }
  }
  return out;
}

/**
 * S1 and S2 from a fine table in √(1 − cosΘ). At a finite kr what stands for them in the crossed flux: the mean of the transverse
 * electric and magnetic fields, for light that runs along r.
 */
function amplitudeTable(sphere: MieCoefficients, kr: number | null) {
  const cells = 4000;
  const most = 1;
  const known = new Float64Array(4 * (cells + 4));
  const field = new Float64Array(FIELD_NUMBERS);
  for (let i = 0; i < cells + 4; i++) {
    const versine = ((i - 1) / cells) ** 2 * most;
    if (kr === null) scatteringAmplitudes(sphere, 1 - versine, known, 4 * i);
    else {
      scatteredField(sphere, kr, versine, field);
      for (let c = 0; c < 2; c++) {
        known[4 * i + c] = (field[2 + c] + field[6 + c]) / 2;
        known[4 * i + 2 + c] = (field[c] + field[8 + c]) / 2;
      }
    }
  }
  return (versine: number, out: Float64Array) => {
    const position = Math.sqrt(versine / most) * cells + 1;
    const cell = Math.floor(position);
    const t = position - cell;
    for (let c = 0; c < 4; c++) {
      const at = (n: number) => known[4 * (cell + n) + c];
      const [a, b, d, e] = [at(-1), at(0), at(1), at(2)];
      out[c] = b + 0.5 * t * (d - a + t * (2 * a - 5 * b + 4 * d - e + t * (3 * (b - d) + e - a)));
    }
  };
}
