/** One row of measured data: two powers, as it was read. */
export interface PowerReading {
  /** Of the data file. */
  line: number;
  label: string;
  /** W, without and with the particle; NaN where the cell is no number. */
  withoutW: number;
  withW: number;
  /** Of each reading, seconds; null for the brief's. */
  averagingS: number | null;
  /** A reference sphere with the standard uncertainty of its diameter, metres. */
  reference: { diameterM: number; standardUncertaintyM: number } | null;
  /** Cells that cannot be what they should be, in words. */
  mistakes: readonly string[];
}
