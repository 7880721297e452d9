import type { Particle } from '../optics/particle.ts';
import type { Scenario } from '../reading/scenario.ts';
import { buildScenarios, driftedWavelengths } from '../reading/scenario.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import { reachesOf } from './reaches.ts';
import type { Task } from './task.ts';

/** Outlines are judged up to this many times the brief's largest radius: how far beyond is what leads a search back. */
export const BEYOND_RADIUS = 1.4;

/** Solves particles in the light of a task, each at every one of the vacuum wavelengths of its main line. */
export type ScenarioSolver = (particles: readonly Particle[], wavelengthsM: readonly number[]) => Scenario[];

/** A solver for the widest cone and the largest phase that a task's limits allow. */
export function scenarioSolver(task: Task): ScenarioSolver {
  const { light, medium, detector } = task;
  const tangent = Math.tan(light.sourceAngleRad ?? 0);
  // η = κρ² with the source's disc of places, z tan a, added to ρ.
  const phases = reachesOf(task).map(
    ({ distanceM, kappa, shadowM }) => kappa * (detector.radiusM[1] + shadowM + distanceM * tangent) ** 2,
  );
  const [halfAngle, phase] = [coneHalfAngle(task), Math.max(...phases)];
  return (particles, wavelengthsM) =>
    buildScenarios(light, medium, particles, wavelengthsM, halfAngle, phase);
}

/** Solves the particles of a task for the widest cone and the largest phase that its limits allow. */
export function taskScenarios(task: Task, drifts: number): Scenario[] {
  return scenarioSolver(task)(task.particles, driftedWavelengths(task.light, drifts));
}

/** Half-angle of the cone in which light may fall on a detector, radians: how far amplitudes are asked for. */
export function coneHalfAngle(task: Task): number {
  const { light, placement, detector, particles } = task;
  const spreadM = Math.max(...particles.map(({ diameterM }) => spreadOf(placement, diameterM)));
  const tangents = reachesOf(task).map(({ distanceM, shadowM }) => {
    // A search tries outlines beyond the allowed radius, tables are built with some room to grow (TableShelf), and the
    // spread reaches 7.5 σ beyond them.
    const farthestM = BEYOND_RADIUS * detector.radiusM[1] + shadowM;
    return (1.35 * farthestM + 7.5 * spreadM) / distanceM;
  });
  return Math.min(1.5, Math.atan(Math.max(...tangents) + Math.tan(light.sourceAngleRad ?? 0)) + 1e-3);
}
