import { gaussLegendre } from '../numeric/gaussLegendre.ts';
import { forwardAmplitude, scatteringAmplitudes } from '../optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../optics/mieModes.ts';
import { emptyCoefficients } from '../optics/mieModes.ts';

/** A line over the coordinate u: its profile, and the evenly spaced colours that are to stand for it. */
export interface LineProfile {
  /** Light at u, in any unit. */
  profile: (u: number) => number;
  /** u of the colours, ascending and evenly spaced, 16 or more; the line reaches from the first to the last. */
  nodes: Float64Array;
}

/** A colour with what its sphere does to the light that it stands for. */
interface ResonantColour {
  u: number;
  /** The weights of a line add up to 1. */
  weight: number;
  coefficients: MieCoefficients;
}

/** A line's colours, and what they leave out. */
export interface ResonantLine {
  colours: ResonantColour[];
  /** Writes at cosθ the mean over the line of |S1|² and |S2|², less that over the colours. */
  variance: (cosTheta: number, out: [s1: number, s2: number]) => void;
}

/** Points of the polynomials through the colours. */
const STENCIL = 16;
/** Of the Gauss–Legendre rule on each piece of the line. */
const RULE = 8;
/** Allowed error of the mean S(0), of itself: a guess on the safe side, for most errors come out ten times smaller. */
const TOLERANCE = 1e-5;
/** Solutions that are spent on one line: a tenth of a second for a sphere of 4 µm. */
const MOST_SOLUTIONS = 6000;

/** A piece of the line with the sphere's solutions on it. */
interface Piece {
  from: number;
  to: number;
  solutions: MieCoefficients[];
  /** ∫ S(0) · profile du. */
  forward: [re: number, im: number];
  /** Guess at its error: what halving the piece that it is a half of has changed. */
  change: number;
}

/**
 * Stands for a line by few colours where a clear sphere's resonances are far narrower than their spacing.
 *
 * What a detector reads is ∫ profile(u) S(u) P(u) du with S linear in Mie's coefficients, which have resonances, and P, the phase of
 * the path and powers of the wavenumber, which is smooth. With P by the polynomials L_j through its values at the colours,
 *
 *     ∫ profile S P du ≈ Σ_j P(u_j) ∫ profile S L_j du
 *
 * so each colour gets coefficients averaged with profile · L_j (product integration: Davis & Rabinowitz, Methods of Numerical
 * Integration, 1984, section 2.5.6). The averages are taken on pieces that are halved where halving still changes S(0).
 * The scattered flux is not linear in S: the averages lack the variance of S about them, which comes beside the colours.
 *
 * @param solve Mie's coefficients of the sphere at u
 */
export function resonantColours(
  { profile, nodes }: LineProfile,
  solve: (u: number) => MieCoefficients,
): ResonantLine {
  const pieces = halvedPieces(nodes, profile, solve);
  const order = Math.max(...pieces.flatMap(({ solutions }) => solutions.map((one) => one.order)));
  const weights = new Float64Array(nodes.length);
  const sums = Array.from(nodes, (u) => emptyCoefficients(solve(u).x, order));
  const shares = new Float64Array(STENCIL);
  for (const { from, to, solutions } of pieces) {
    // Pieces never reach across a colour, so that one set of polynomials serves a piece.
    const cell = cellOf(nodes, (from + to) / 2);
    const first = Math.min(Math.max(0, cell - STENCIL / 2 + 1), nodes.length - STENCIL);
    for (const [i, { u, du }] of pointsOf(from, to).entries()) {
      lagrange(nodes, first, u, shares);
      const light = du * profile(u);
      for (let j = 0; j < STENCIL; j++) {
        weights[first + j] += light * shares[j];
        addCoefficients(sums[first + j], solutions[i], light * shares[j]);
      }
    }
  }
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const colours = Array.from(nodes, (u, j) => {
    divideCoefficients(sums[j], weights[j]);
    return { u, weight: weights[j] / total, coefficients: sums[j] };
  });
  const solved = pieces.flatMap(({ from, to, solutions }) =>
    pointsOf(from, to).map(({ u, du }, i) => ({
      weight: (du * profile(u)) / total,
      coefficients: solutions[i],
    })),
  );
  return { colours, variance: varianceOf(solved, colours) };
}

type Weighted = Pick<ResonantColour, 'weight' | 'coefficients'>;

function varianceOf(solved: readonly Weighted[], colours: readonly Weighted[]): ResonantLine['variance'] {
  const s = new Float64Array(4);
  return (cosTheta, out) => {
    out.fill(0);
    for (const [sign, list] of [[1, solved] as const, [-1, colours] as const]) {
      for (const { weight, coefficients } of list) {
        scatteringAmplitudes(coefficients, cosTheta, s);
        out[0] += sign * weight * (s[0] * s[0] + s[1] * s[1]);
        out[1] += sign * weight * (s[2] * s[2] + s[3] * s[3]);
      }
    }
  };
}

/** Pieces between neighbouring colours, halved where that still matters. */
function halvedPieces(
  nodes: Float64Array,
  profile: (u: number) => number,
  solve: (u: number) => MieCoefficients,
): Piece[] {
  const piece = (from: number, to: number): Piece => {
    const solutions: MieCoefficients[] = [];
    const forward: [number, number] = [0, 0];
    for (const { u, du } of pointsOf(from, to)) {
      const solution = solve(u);
      const [re, im] = forwardAmplitude(solution);
      forward[0] += du * profile(u) * re;
      forward[1] += du * profile(u) * im;
      solutions.push(solution);
    }
    return { from, to, solutions, forward, change: 0 };
  };
  const halves = (whole: Piece): Piece[] => {
    const middle = (whole.from + whole.to) / 2;
    const [left, right] = [piece(whole.from, middle), piece(middle, whole.to)];
    const moved = [0, 1].map((part) => left.forward[part] + right.forward[part] - whole.forward[part]);
    const change = Math.hypot(...moved) / 2;
    return [left, right].map((half) => ({ ...half, change }));
  };
  const pieces = Array.from(nodes.subarray(1), (to, i) => piece(nodes[i], to)).flatMap(halves);
  const size = pieces.reduce((sum, { forward }) => sum + Math.hypot(...forward), 0);
  let [spent, error] = [1.5 * RULE * pieces.length, pieces.reduce((sum, { change }) => sum + change, 0)];
  while (error > TOLERANCE * size && spent + 2 * RULE <= MOST_SOLUTIONS) {
    const worst = pieces.reduce((most, { change }, i) => (change > pieces[most].change ? i : most), 0);
    const [left, right] = halves(pieces[worst]);
    error += 2 * left.change - pieces[worst].change;
    pieces[worst] = left;
    pieces.push(right);
    spent += 2 * RULE;
  }
  return pieces;
}

const { nodes: RULE_NODES, weights: RULE_WEIGHTS } = gaussLegendre(RULE);

function pointsOf(from: number, to: number): { u: number; du: number }[] {
  const half = (to - from) / 2;
  return Array.from(RULE_NODES, (node, i) => ({ u: from + half * (1 + node), du: half * RULE_WEIGHTS[i] }));
}

function cellOf(nodes: Float64Array, u: number): number {
  const spacing = (nodes[nodes.length - 1] - nodes[0]) / (nodes.length - 1);
  return Math.floor((u - nodes[0]) / spacing);
}

/** Values at u of the polynomials that are 1 at one of 16 nodes and 0 at the others. */
function lagrange(nodes: Float64Array, first: number, u: number, out: Float64Array): void {
  for (let j = 0; j < STENCIL; j++) {
    let product = 1;
    for (let i = 0; i < STENCIL; i++) {
      if (i !== j) product *= (u - nodes[first + i]) / (nodes[first + j] - nodes[first + i]);
    }
    out[j] = product;
  }
}

function addCoefficients(sum: MieCoefficients, { order, ...one }: MieCoefficients, factor: number): void {
  for (const column of ['aRe', 'aIm', 'bRe', 'bIm'] as const) {
    const [into, from] = [sum[column], one[column]];
    for (let n = 0; n < order; n++) into[n] += factor * from[n];
  }
}

function divideCoefficients(sum: MieCoefficients, divisor: number): void {
  for (const column of ['aRe', 'aIm', 'bRe', 'bIm'] as const)
    for (let n = 0; n < sum.order; n++) sum[column][n] /= divisor;
}
