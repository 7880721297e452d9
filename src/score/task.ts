import type { IndexModel } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import type { Placement } from '../reading/placement.ts';
import type { ShopRules } from '../shop/shopRules.ts';

/** What a detector may be, and what its electronics add. */
export interface DetectorLimits {
  /** Least and largest distance behind the particle, metres. */
  distanceM: [number, number];
  /** Least and largest radius of the circle around the outline, metres. */
  radiusM: [number, number];
  /** Amperes per watt. */
  responsivityAW: number;
  /** Noise current density of the circuit, A/√Hz. */
  noiseCurrentA: number;
  /** What differences of elements keep of the light's common intensity noise (see `noisePower`); 0 if left out. */
  commonModeLeak?: number;
  /** Whether weighted areas must cancel, so that the light's intensity noise does: single elements are then left out. */
  balanced?: boolean;
  /** `one` leaves layouts of several weighted elements out; several if left out. */
  elements?: 'one' | 'several';
  /** Least gap between elements in one plane, metres; 0 if left out. */
  gapM?: number;
}

/** What counts as good enough. */
export interface Target {
  /** Largest allowed |reading/(gain · extinction) − 1|. */
  correction: number;
  /** `one`: read as it is. `free`: one factor for all particles is calibrated away. */
  gain: 'one' | 'free';
  /** Largest allowed half-angle over the first dark ring's angle; null for no limit. */
  lobe: number | null;
  /** Longest allowed measurement, seconds; null for no limit. */
  timeS: number | null;
}

/** All that scoring needs to know of a brief: plain data that may be sent to a worker. */
export interface Task {
  light: Light;
  medium: IndexModel;
  particles: Particle[];
  placement: Placement;
  detector: DetectorLimits;
  target: Target;
  shop: ShopRules | null;
}
