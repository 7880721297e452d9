import { fileURLToPath } from 'node:url';

/** Absolute path of the folder `presets` at the package's root, from the sources and from the built files alike. */
export function presetsFolder(): string {
  return fileURLToPath(new URL('../../presets', import.meta.url));
}
