import { gaussLegendre } from '../numeric/gaussLegendre.ts';
import { slopeAtStart } from '../numeric/uniformTable.ts';

/** What a column of samples over s = ρ² is multiplied with: ν^order, where ν grows like ρ along a ray, and cos 2φ if twofold. */
export interface RayColumn {
  order: number;
  /** 1 for what goes with cos 2φ, and so starts with s at the axis; 0 for the rest. */
  twofold: 0 | 1;
}

/** Gauss nodes a cell; with the six-point interpolation between samples the error is near 1e-7 at 1/8 radian a cell. */
const NODES = 4;

/**
 * Radial primitives of several densities, as cubic pieces over s,
 *
 *   V(s) = s^−twofold ∫₀¹ density(t² s) t^{order + 1} dt,
 *
 * so that density · ν^order integrates over an outline to ∮ V ν^order (x dy − y dx), and with cos 2φ to the same times ρ² cos 2φ.
 * With I = s^{1 + order/2} ∫ …, dI/ds = s^{order/2} density/2: it runs from cell to cell, and gives the slopes.
 *
 * @param samples densities at s = 0, step, 2·step …, row by row, one number a column; cells + 5 rows
 * @returns for each cell and column four numbers: the piece at t in [0, 1] is a + bt + ct² + dt³
 */
export function rayIntegrals(
  samples: Float64Array,
  columns: readonly RayColumn[],
  stepM2: number,
  cells: number,
): Float64Array {
  const width = columns.length;
  const orders = Math.max(...columns.map(({ order }) => order)) + 1;
  const rays: Rays = {
    orders: Int32Array.from(columns, ({ order }) => order),
    twofold: Uint8Array.from(columns, ({ twofold }) => twofold),
    rules: new Float64Array(6 * orders),
    carry: new Float64Array(orders),
    integral: new Float64Array(width),
    value: Float64Array.from(columns, (column, c) => valueOnAxis(samples, width, c, column, stepM2)),
    slope: Float64Array.from(columns, (column, c) => slopeOnAxis(samples, width, c, column)),
  };
  const out = new Float64Array(4 * width * cells);
  for (let i = 0; i < cells; i++) {
    cellRules(i, rays.rules, rays.carry);
    addCell(rays, samples, i, stepM2, out);
  }
  return out;
}

/** Where the integration along the rays has come to, column by column. */
interface Rays {
  orders: Int32Array;
  twofold: Uint8Array;
  /** Of the cell in hand, by order: see `cellRules`. */
  rules: Float64Array;
  carry: Float64Array;
  /** I/s^{1 + order/2}, V, and dV/ds times the step, at the cell's inner end. */
  integral: Float64Array;
  value: Float64Array;
  slope: Float64Array;
}

/** Carries every column over cell i, and writes its pieces. */
function addCell(rays: Rays, samples: Float64Array, i: number, stepM2: number, out: Float64Array): void {
  const { orders, twofold, rules, carry, integral, value, slope } = rays;
  const width = orders.length;
  const first = Math.max(0, i - 2) * width;
  const last = i + 1;
  for (let c = 0; c < width; c++) {
    const order = orders[c];
    let sum = integral[c] * carry[order];
    for (let k = 0; k < 6; k++) sum += rules[6 * order + k] * samples[first + k * width + c];
    integral[c] = sum;
    const over = twofold[c] === 1 ? 1 / (last * stepM2) : 1;
    const next = sum * over;
    const fall = order / 2 + 1 + twofold[c];
    const nextSlope = (samples[last * width + c] * over * 0.5 - fall * next) / last;
    const before = value[c];
    const rise = next - before;
    // At the axis the twofold part has no slope of its own to go by.
    const slopeBefore = i === 0 && twofold[c] === 1 ? rise : slope[c];
    const at = 4 * (i * width + c);
    out[at] = before;
    out[at + 1] = slopeBefore;
    out[at + 2] = 3 * rise - 2 * slopeBefore - nextSlope;
    out[at + 3] = slopeBefore + nextSlope - 2 * rise;
    value[c] = next;
    slope[c] = nextSlope;
  }
}

/**
 * Weights of ∫ density(ρ²) (ρ/ρ_{i+1})^{order + 1} dρ/ρ_{i+1} over cell i, six for each order, and the factors
 * (ρ_i/ρ_{i+1})^{order + 2} that carry the integral over.
 */
function cellRules(i: number, rules: Float64Array, carry: Float64Array): void {
  const { nodes, weights } = RULE;
  const inner = Math.sqrt(i / (i + 1));
  const first = Math.max(0, i - 2);
  let carried = inner;
  for (let order = 0; order < carry.length; order++) {
    carried *= inner;
    carry[order] = carried;
  }
  rules.fill(0);
  const lagrange = new Float64Array(6);
  for (let j = 0; j < NODES; j++) {
    // In ρ, since odd orders have √s.
    const ratio = (1 + inner) / 2 + ((1 - inner) / 2) * nodes[j];
    sixPoint((i + 1) * ratio * ratio - first, lagrange);
    let moment = (weights[j] * (1 - inner)) / 2;
    for (let at = 0; at < rules.length; at += 6) {
      moment *= ratio;
      for (let k = 0; k < 6; k++) rules[at + k] += moment * lagrange[k];
    }
  }
}

const RULE = gaussLegendre(NODES);

function valueOnAxis(
  samples: Float64Array,
  width: number,
  c: number,
  { order, twofold }: RayColumn,
  stepM2: number,
): number {
  if (twofold === 0) return samples[c] / (order + 2);
  return axisSlope(samples, width, c) / stepM2 / (order + 4);
}

function slopeOnAxis(samples: Float64Array, width: number, c: number, { order }: RayColumn): number {
  return axisSlope(samples, width, c) / (order + 4);
}

function axisSlope(samples: Float64Array, width: number, c: number): number {
  return slopeAtStart(Float64Array.from({ length: 6 }, (_, row) => samples[row * width + c]));
}

/** Lagrange polynomials of the nodes 0 … 5 at t. */
function sixPoint(t: number, out: Float64Array): void {
  const [a, b, c, d, e, f] = [t, t - 1, t - 2, t - 3, t - 4, t - 5];
  out[0] = (b * c * d * e * f) / -120;
  out[1] = (a * c * d * e * f) / 24;
  out[2] = (a * b * d * e * f) / -12;
  out[3] = (a * b * c * e * f) / 12;
  out[4] = (a * b * c * d * f) / -24;
  out[5] = (a * b * c * d * e) / 120;
}
