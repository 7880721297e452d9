import { fileURLToPath } from 'node:url';
import { boundsOf } from '../src/run/bound.ts';
import type { Brief } from '../src/run/brief.ts';
import { openBrief } from '../src/run/openBrief.ts';
import { search, smallest } from '../src/run/search.ts';
import type { Measure } from '../src/score/aim.ts';
import { worstOf } from '../src/score/scores.ts';
import { balancedGain } from './balancedLayout.ts';

/** One figure that searches must reach, whatever their seed. */
interface Case {
  brief: string;
  by: Measure;
  /** Largest area over gain, in λz; or a factor on the proven bound of what kind. */
  asked: { most: number } | { factor: number; over: 'any' | 'star' } | null;
}

const CASES: readonly Case[] = [
  { brief: 'nominal-sphere', by: 'area', asked: { factor: 1.02, over: 'any' } },
  { brief: 'offset-range', by: 'area', asked: { factor: 1.05, over: 'any' } },
  { brief: 'test/quality/offset-fourier.yaml', by: 'area', asked: { most: 2.4 } },
  { brief: 'test/quality/offset-fourier-free.yaml', by: 'cost', asked: { most: 2.35 } },
  { brief: 'test/quality/offset-fourier-free-three.yaml', by: 'cost', asked: { most: 2.35 } },
  { brief: 'test/quality/offset-pieces.yaml', by: 'area', asked: null },
];

/** Longest that the search of this brief may take on two cores, seconds. */
const ROAD_DUST_S = 60;

/** How many times less time a balanced layout must take than a single element, in light of −130 dB/Hz. */
const LEAST_BALANCED_GAIN = 20;

const seeds = argument('--seeds')?.split(',').map(Number) ?? [1, 2, 3, 4, 5];
const workerEntry = fileURLToPath(new URL('../dist/crew/worker.js', import.meta.url));
let held = true;

console.log(
  'Least area over gain found, in λz, every design certified within the target; and what is proven of any mask and of star outlines',
);
for (const { brief: place, by, asked } of CASES) {
  const { brief } = await openBrief(place);
  const { any, star } = await leastOf(brief);
  const most =
    asked === null ? Infinity : 'most' in asked ? asked.most : asked.factor * { any, star }[asked.over];
  const found: string[] = [];
  for (const seed of seeds) {
    const options = { workers: 2, workerEntry };
    const { design } = await smallest({ ...brief, search: { ...brief.search, seed } }, by, options);
    const value = design?.scores.areaOverFloor ?? Infinity;
    const isKept = design !== null && worstOf(design.scores) <= brief.task.target.correction && value <= most;
    held &&= isKept;
    found.push(`${value.toFixed(4)}${isKept ? '' : ' (!)'}`);
  }
  const limit = most === Infinity ? '' : ` asked ${most.toFixed(4)},`;
  console.log(
    `${place} by ${by}:${limit} any ${any.toFixed(4)}, star ${star.toFixed(4)}; found ${found.join('  ')}`,
  );
}
const { brief: roadDust } = await openBrief('road-dust');
for (const seed of seeds) {
  const { designs, seconds } = await search(
    { ...roadDust, search: { ...roadDust.search, seed } },
    { workers: 2, workerEntry },
  );
  const meeting = designs.filter(({ meetsTarget }) => meetsTarget);
  const fastest = Math.min(...meeting.map(({ scores }) => scores.snr.time_s));
  held &&= seconds < ROAD_DUST_S && meeting.length > 0;
  console.log(
    `road-dust, seed ${seed}: ${seconds.toFixed(1)} s of ${ROAD_DUST_S}; ${designs.length} designs, ${meeting.length} on target, the fastest in ${(1e6 * fastest).toFixed(0)} µs`,
  );
}
for (const seed of seeds) {
  const { single, balanced, ratio } = await balancedGain(seed);
  held &&= ratio >= LEAST_BALANCED_GAIN;
  console.log(
    `noisy-laser, seed ${seed}: single element ${(1e6 * single).toFixed(0)} µs, balanced layout ${(1e6 * balanced).toFixed(1)} µs: ${ratio.toPrecision(3)} times less`,
  );
}
console.log(held ? 'All figures are held.' : 'Not all figures are held: see (!).');
process.exitCode = held ? 0 : 1;

/** The least bounds over the gains that a brief allows. */
async function leastOf({ task }: Brief): Promise<{ any: number; star: number }> {
  const gains = task.target.gain === 'one' ? [1] : [0.5, 1, 1.4];
  const bounds = await boundsOf(task, [task.detector.distanceM[0]], gains);
  const least = (kind: 'any' | 'star') =>
    Math.min(...bounds.map((bound) => bound[kind]?.areaOverFloor ?? Infinity));
  return { any: least('any'), star: least('star') };
}

function argument(name: string): string | undefined {
  const at = process.argv.indexOf(name);
  return at < 0 ? undefined : process.argv[at + 1];
}
