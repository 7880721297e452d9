import { refractiveIndex } from '../optics/indexModel.ts';
import { linesOf } from '../optics/light.ts';
import { fringesAt, shadowOffset } from '../reading/fringes.ts';
import { farthestRead } from '../reading/placement.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Task } from './task.ts';

/** One arrangement at the limits of a task. */
interface Reach {
  /** From the particle to the detector plane, metres. */
  distanceM: number;
  /** See `Fringes`; the largest of all lines, each times its wavelength over the main one's. */
  kappa: number;
  /** Largest distance of the particle's shadow from the axis, metres. */
  shadowM: number;
}

/** Places along the beam that are looked at: among them all that are judged. */
const PLACES = [-1, -0.75, -0.5, -0.25, 0, 0.25, 0.5, 0.75, 1];

/** The arrangements among which fringes are densest, shadows farthest out, and a source's disc of places largest. */
export function reachesOf({ light, medium, particles, placement, detector }: Task): Reach[] {
  const { beam } = light;
  const { depthM } = placement;
  const wavenumber = (2 * Math.PI * refractiveIndex(medium, light.wavelengthM)[0]) / light.wavelengthM;
  // In a flat wave κλ is the same for all lines.
  const lines = beam === undefined ? [light] : linesOf(light);
  const ratios = lines.map((line) => line.wavelengthM / light.wavelengthM);
  const spreadM = Math.max(...particles.map(({ diameterM }) => spreadOf(placement, diameterM)));
  const offsetM = farthestRead(placement);
  return detector.distanceM.flatMap((distance) =>
    PLACES.map((part) => {
      const placeM = part * depthM;
      const kappas = ratios.map(
        (ratio) => ratio * fringesAt(beam, wavenumber / ratio, distance, placeM).kappa,
      );
      const shadows = ratios.flatMap((ratio) =>
        [0, spreadM].map((spread) =>
          shadowOffset(beam, wavenumber / ratio, distance, placeM, spread, offsetM),
        ),
      );
      return {
        distanceM: distance - placeM,
        kappa: Math.max(...kappas),
        shadowM: Math.max(...shadows),
      };
    }),
  );
}
