/** Where the particle may be, and how it moves during one measurement. */
export interface Placement {
  /** Anywhere within this distance of the axis, metres. */
  offsetM: number;
  /** And this far before or behind the nominal place along the beam, metres. */
  depthM: number;
  /** Rms random motion per transverse axis during one measurement, metres. */
  spreadM: number;
  /** Straight flight across the beam during one measurement, or null. */
  crossing: { spanM: number; headingRad: number } | null;
}
