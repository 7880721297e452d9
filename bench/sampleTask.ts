import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { Brief } from '../src/run/brief.ts';
import { readBrief } from '../src/run/readBrief.ts';

/** A brief of the shelf. */
export async function presetBrief(name: string): Promise<Brief> {
  const file = fileURLToPath(new URL(`../presets/briefs/${name}.yaml`, import.meta.url));
  return readBrief(readFileSync(file, 'utf8'), file);
}

/** A five-lobed outline of `count` vertices with the given mean radius: flat [x0, y0, …], metres. */
export function lobedRing(count: number, radiusM: number): Float64Array {
  const ring = new Float64Array(2 * count);
  for (let i = 0; i < count; i++) {
    const phi = (2 * Math.PI * i) / count;
    const radius = radiusM * Math.sqrt(1 + 0.5 * Math.cos(5 * phi));
    ring[2 * i] = radius * Math.cos(phi);
    ring[2 * i + 1] = radius * Math.sin(phi);
  }
  return ring;
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1];
}
