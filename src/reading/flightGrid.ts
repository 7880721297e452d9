import type { FlightMeans, ReadPlace } from './flightMeans.ts';
import type { FlightMirrors } from './flightMirrors.ts';
import type { Placement } from './placement.ts';

/** Places along one direction of the grid, and the Chebyshev polynomials that are fitted through their readings. */
interface Axis {
  middleM: number;
  halfM: number;
  /** Places, from −1 to 1 over the grid; of an even axis those above 0 alone. */
  nodes: Float64Array;
  /** Degrees of neighbouring polynomials differ by this: 2 on an even axis. */
  stride: 1 | 2;
  /** Coefficients from readings: [polynomial · count + node]. */
  fit: Float64Array;
}

export interface FlightGridOptions {
  /** Phase that a step of the particle changes at the rim, for the densest fringes, rad/m. */
  phasePerMetre: number;
  mirrors: FlightMirrors;
  /** Places beyond the phase of half a side, over its cube root: 3 errs by 1e-4 of the swing, 4.7 by 1e-6 (see `placesFor`). */
  tail: number;
}

/**
 * Means over many parallel flights from readings on one grid.
 *
 * A reading is a band-limited function of the particle's place: a step δ changes no phase by more than 2κRδ. So a
 * polynomial through its values on a grid of Chebyshev places, along and across the heading, is the reading everywhere
 * between, and the mean of T_n over a flight is known: ∫T_n = T_{n+1}/2(n+1) − T_{n−1}/2(n−1) (Mason & Handscomb
 * 2003, section 2.4). Where readings of mirror images are alike, only one of them is taken.
 */
export class FlightGrid implements FlightMeans {
  readonly count: number;
  readonly farthestM: number;
  /** How many places are read for all flights together. */
  readonly readings: number;
  readonly #along: Axis;
  readonly #across: Axis;
  readonly #cos: number;
  readonly #sin: number;
  readonly #middles: Float64Array;
  readonly #spanM: number;

  /** @param middles of the flights: flat [x0, y0, …], metres */
  constructor(
    middles: Float64Array,
    { spanM, headingRad }: NonNullable<Placement['crossing']>,
    { phasePerMetre, mirrors, tail }: FlightGridOptions,
  ) {
    this.count = middles.length / 2;
    this.#cos = Math.cos(headingRad);
    this.#sin = Math.sin(headingRad);
    this.#spanM = spanM;
    this.#middles = this.#turned(middles);
    const { ends, sides, centre } = mirrors;
    const axisOf = (which: 0 | 1, beyondM: number, isEven: boolean) => {
      const [middleM, halfM] = extent(this.#middles, which, isEven || centre);
      const count = placesFor(phasePerMetre * (halfM + beyondM), tail);
      return axis(middleM, halfM + beyondM, count, isEven);
    };
    this.#along = axisOf(0, spanM / 2, ends);
    this.#across = axisOf(1, 0, sides);
    const places = this.#along.nodes.length * this.#across.nodes.length;
    this.readings = this.#sharesCentre(centre) ? (places + 1) >> 1 : places;
    this.farthestM = Math.hypot(
      Math.abs(this.#along.middleM) + this.#along.halfM,
      Math.abs(this.#across.middleM) + this.#across.halfM,
    );
  }

  means(read: ReadPlace, out: Float64Array): void {
    const coefficients = this.#fit(this.#values(read));
    const [along, across] = [this.#along, this.#across];
    const columns = across.nodes.length;
    const meanOf = new Float64Array(along.nodes.length);
    const heightOf = new Float64Array(columns);
    const reach = this.#spanM / 2 / along.halfM;
    for (let p = 0; p < out.length; p++) {
      const t = (this.#middles[2 * p] - along.middleM) / along.halfM;
      polynomialMeans(t - reach, t + reach, along.stride, meanOf);
      const u = across.halfM === 0 ? 0 : (this.#middles[2 * p + 1] - across.middleM) / across.halfM;
      polynomialValues(u, across.stride, heightOf);
      let mean = 0;
      for (let i = 0, at = 0; i < meanOf.length; i++) {
        let row = 0;
        for (let j = 0; j < columns; j++) row += coefficients[at++] * heightOf[j];
        mean += meanOf[i] * row;
      }
      out[p] = mean;
    }
  }

  /** Half a turn takes the grid into itself, and the mirrors have not used that up. */
  #sharesCentre(centre: boolean): boolean {
    return centre && this.#along.stride === 1 && this.#across.stride === 1;
  }

  #values(read: ReadPlace): Float64Array {
    const [along, across] = [this.#along, this.#across];
    const columns = across.nodes.length;
    const values = new Float64Array(along.nodes.length * columns);
    for (let n = 0; n < this.readings; n++) {
      const s = along.middleM + along.halfM * along.nodes[Math.floor(n / columns)];
      const v = across.middleM + across.halfM * across.nodes[n % columns];
      values[n] = read(s * this.#cos - v * this.#sin, s * this.#sin + v * this.#cos);
    }
    // Half a turn about the axis leads from the first place to the last, and so on.
    for (let n = this.readings; n < values.length; n++) values[n] = values[values.length - 1 - n];
    return values;
  }

  /** Coefficients [along · columns + across] of the polynomial through the values. */
  #fit(values: Float64Array): Float64Array {
    const [along, across] = [this.#along, this.#across];
    return transform(along.fit, transform(across.fit, values, along.nodes.length), across.nodes.length);
  }

  /** Places as [along, across] the heading. */
  #turned(places: Float64Array): Float64Array {
    const turned = new Float64Array(places.length);
    for (let i = 0; i < places.length; i += 2) {
      turned[i] = places[i] * this.#cos + places[i + 1] * this.#sin;
      turned[i + 1] = places[i + 1] * this.#cos - places[i] * this.#sin;
    }
    return turned;
  }
}

/**
 * Chebyshev places that carry e^{ixt} on [−1, 1]: its coefficients are the Bessel functions J_n(x), which fall once n passes x,
 * over a width of ∛x. Tried from x = 0.05 to 128.
 */
function placesFor(phase: number, tail: number): number {
  return phase === 0 ? 1 : Math.ceil(phase + tail * Math.cbrt(phase) + 3);
}

/** Middle and half width of the places along one direction, about the axis where images in it are used. */
function extent(places: Float64Array, which: 0 | 1, isSymmetric: boolean): [middle: number, half: number] {
  let [least, most] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (let i = which; i < places.length; i += 2) {
    least = Math.min(least, places[i]);
    most = Math.max(most, places[i]);
  }
  if (isSymmetric) return [0, Math.max(Math.abs(least), Math.abs(most))];
  return [(least + most) / 2, (most - least) / 2];
}

function axis(middleM: number, halfM: number, count: number, isEven: boolean): Axis {
  const stride = isEven && count > 1 ? 2 : 1;
  const held = Math.ceil(count / stride);
  const all = held * stride;
  // Angles in whole quarters of a step: large products would lose digits.
  const cosines = Float64Array.from({ length: 4 * all }, (_, q) => Math.cos((Math.PI * q) / (2 * all)));
  const fit = new Float64Array(held * held);
  for (let n = 0; n < held; n++) {
    const scale = (n === 0 ? 1 : 2) / held;
    for (let i = 0; i < held; i++) {
      fit[n * held + i] = scale * cosines[(n * stride * (2 * i + 1)) % (4 * all)];
    }
  }
  return {
    middleM,
    halfM,
    nodes: Float64Array.from({ length: held }, (_, i) => cosines[2 * i + 1]),
    stride,
    fit,
  };
}

/** Applies a square matrix to every row of `values`, and lays the result out with rows and columns exchanged. */
function transform(matrix: Float64Array, values: Float64Array, rows: number): Float64Array {
  const width = values.length / rows;
  const out = new Float64Array(values.length);
  for (let r = 0; r < rows; r++) {
    for (let n = 0; n < width; n++) {
      let sum = 0;
      for (let i = 0; i < width; i++) sum += matrix[n * width + i] * values[r * width + i];
      out[n * rows + r] = sum;
    }
  }
  return out;
}

/** T_0, T_stride, T_2stride … at t. */
function polynomialValues(t: number, stride: 1 | 2, out: Float64Array): void {
  // T_{m+s} = 2 T_s T_m − T_{m−s}
  const step = stride === 1 ? t : 2 * t * t - 1;
  let before = step;
  let value = 1;
  for (let n = 0; n < out.length; n++) {
    out[n] = value;
    const next = 2 * step * value - before;
    before = value;
    value = next;
  }
}

/** Means of the same polynomials from `low` to `high`. */
function polynomialMeans(low: number, high: number, stride: 1 | 2, out: Float64Array): void {
  const length = high - low;
  // T_{n−1} and T_n at both ends; `before` and `rise` are how much they rise from one end to the other.
  let lowBefore = 1;
  let highBefore = 1;
  let lowValue = low;
  let highValue = high;
  let before = 0;
  let rise = length;
  out[0] = 1;
  for (let n = 1; n <= stride * (out.length - 1); n++) {
    const lowNext = 2 * low * lowValue - lowBefore;
    const highNext = 2 * high * highValue - highBefore;
    const next = highNext - lowNext;
    if (n % stride === 0) {
      out[n / stride] = n === 1 ? (low + high) / 2 : (next / (n + 1) - before / (n - 1)) / (2 * length);
    }
    lowBefore = lowValue;
    highBefore = highValue;
    lowValue = lowNext;
    highValue = highNext;
    before = rise;
    rise = next;
  }
}
