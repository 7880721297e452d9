import type { OutlineElement } from '../outline/shape.ts';
import type { Scores } from '../score/scores.ts';

/** One design as the report shows it: plain data in SI units, with the keys of a results file's `scores`. */
export interface ReportDesign {
  id: string;
  family: string;
  /** 1 is the front. */
  rank: number;
  /** Particle to detector, metres. */
  distanceM: number;
  /** Closed polygons in metres, as in a drawing: outer rings counter-clockwise, holes clockwise. */
  elements: readonly OutlineElement[];
  scores: {
    gain: number;
    /** Relative to `gain`, over every particle, wavelength and position, and of the mean over a distribution: 0.01 is 1 %. */
    correction: Scores['correction'];
    lobe: { ratio: number };
    /** `time_s` is null where no time can be said. */
    snr: { required: number; time_s: number | null };
    area_m2: number;
    radius_m: number;
    areaOverFloor: number;
    leastAreaOverFloor?: number;
    /** `fits` is null where the brief names no shop. */
    shop: { fits: boolean | null; notes: readonly string[] };
  };
  meetsTarget: boolean;
  /** Of the drawing itself, where the shop's cutting changes it; `scores` are of the outline as cut. */
  asDrawn?: { worst: number };
}

/** All that a report says, as plain data. */
export interface ReportInput {
  title: string;
  /** The brief as it was read, in its own notation. */
  briefText: string;
  /** Keys that the brief left out, with the values used: `light.drift: 0 nm`. */
  defaults: readonly string[];
  warnings: readonly string[];
  /** In the order in which they are to be shown. */
  designs: readonly ReportDesign[];
  /** Wavelength in the medium, metres. */
  wavelengthMediumM: number;
  /** The particle may be anywhere within this distance of the axis, metres. */
  offsetM: number;
  /** Largest |correction| that the target allows. */
  targetCorrection: number;
  evaluations: number;
  /** Why the run ended and how much it still brought, in a sentence or two. */
  ending: string;
  /** What to change in the brief to get further. */
  hints: readonly string[];
  seed: number;
  /** Candidates that the search was asked for. */
  candidates: number;
  version: string;
}
