import { availableParallelism, cpus } from 'node:os';
import { benchBaseline } from './baseline.ts';
import { benchCandidates } from './candidates.ts';
import { benchEffects } from './effects.ts';
import { benchFronts } from './fronts.ts';
import { benchPolygons } from './polygons.ts';
import { benchReadings } from './readings.ts';
import { benchRealFronts } from './realFronts.ts';

/** `npm run bench`: a table; `npm run bench -- --json`: one JSON document; `--road-dust` adds that brief's fronts. Medians of seeded, warmed runs. */
const readings = await benchReadings();
const polygons = benchPolygons();
const effects = await benchEffects();
const candidates = await benchCandidates();
const roadDust = await benchCandidates('road-dust');
const baseline = await benchBaseline();
const fronts = benchFronts();
const slowBriefs = process.argv.includes('--road-dust') ? ['road-dust'] : [];
const realFronts = await benchRealFronts(['size-range', 'offset-range', ...slowBriefs]);
const machine = { node: process.version, cores: availableParallelism(), processor: cpus()[0]?.model };

if (process.argv.includes('--json')) {
  const { twoWorkersOverOne, candidatesPerSecond } = candidates;
  console.log(
    JSON.stringify(
      {
        ...readings,
        candidatesPerSecond,
        twoWorkersOverOne,
        polygons,
        effects,
        roadDust,
        baseline,
        fronts,
        realFronts,
        machine,
      },
      null,
      2,
    ),
  );
} else {
  const row = (what: string, value: number | string) =>
    console.log(`${what.padEnd(54)}${String(value).padStart(24)}`);
  row('readings per second and core, 512-node outline', readings.readingsPerSecond);
  const plane = ({ points, perSecond }: { points: number; perSecond: number }) =>
    `${perSecond.toPrecision(3)} (${points} points)`;
  row('polar grids per second, error 1e-4', plane(readings.quadrature));
  row('  readings over grids', readings.ratioToQuadrature);
  row('Gauss–Legendre spokes per second, error 1e-4', plane(readings.gaussQuadrature));
  row('  readings over spokes', readings.ratioToGaussQuadrature);
  row('radial table to 0.45 mm, ms', readings.tableMs.toFixed(2));
  row('closed form of a polygon, ns an edge, η = 10', polygons.nsPerEdgeAt10.toFixed(0));
  row('closed form of a polygon, ns an edge, η = 1e6', polygons.nsPerEdgeAt1e6.toFixed(0));
  row('  η = 1e6 over η = 10', polygons.ratio.toFixed(2));
  for (const { effect, solveMs, tableMs, readingsPerSecond } of effects) {
    row(`radial table to 0.55 mm, effect: ${effect}, ms`, tableMs.toFixed(2));
    row('  particle solved, ms', solveMs.toFixed(2));
    row('  readings per second', readingsPerSecond);
  }
  for (const [name, { candidatesPerSecond, twoWorkersOverOne }] of Object.entries({
    offset: candidates,
    'road dust': roadDust,
  })) {
    row(`candidates per second, ${name}, one worker`, candidatesPerSecond[0]);
    row(`candidates per second, ${name}, two workers`, candidatesPerSecond[1]);
    row('  two over one, median of the rounds', twoWorkersOverOne.toFixed(2));
  }
  for (const { family, evaluations, ours, optimizationJs } of baseline) {
    row(`area over λz, ${family}, ${evaluations} evaluations`, ours.toPrecision(4));
    row('  optimization-js', optimizationJs.toPrecision(4));
  }
  const shares = (quartiles: readonly number[]) => quartiles.map((share) => share.toFixed(4)).join(' ');
  for (const { name, variables, evaluations, ours, optimizationJs } of fronts) {
    row(`share of the front, ${name}, n = ${variables}, ${evaluations} evaluations`, shares(ours));
    row('  optimization-js', shares(optimizationJs));
  }
  for (const { name, candidates: count, wholeFronts, singleAims } of realFronts) {
    const volumes = (found: readonly number[]) => found.map((volume) => volume.toFixed(3)).join(' ');
    row(`real job, ${name}, ${count} candidates, seeds 1 to 3`, volumes(wholeFronts));
    row('  single aims alone', volumes(singleAims));
  }
  console.log(`Node ${machine.node}, ${machine.cores} cores, ${machine.processor}`);
}
