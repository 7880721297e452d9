import type { Candidate } from '../crew/candidate.ts';
import type { Variant } from '../outline/families/family.ts';
import type { Aim } from '../score/aim.ts';
import type { Task } from '../score/task.ts';
import type { FamilyStanding } from './standing.ts';

/** What a search is asked. */
export interface Quest {
  task: Task;
  variants: readonly Variant[];
  /** Ascending, metres. */
  distances: readonly number[];
  /** The first is the main one. */
  aims: readonly Aim[];
  candidates: number;
  seed: number;
  /** Share of a lap that goes to whole fronts where there are several aims; that of `Rounds` if left out. */
  spreadShare?: number;
}

/** How far the rounds have come. */
export interface RoundsProgress {
  evaluations: number;
  candidates: number;
  /** The best candidate for the main aim so far. */
  best: Candidate | null;
  families: FamilyStanding[];
  /** What was worked on last. */
  variant: string;
}

/** What a search found, in candidates. */
export interface Findings {
  evaluations: number;
  /** For each aim the best candidates, one a variant, best first. */
  best: { candidate: Candidate; value: number }[][];
  /** Trade-offs of correction, time and radius within the brief's limits. */
  front: Candidate[];
  /** Whether the laps came to their end before the candidates did. */
  settled: boolean;
  /** As `FrontHistory` says. */
  movedInLastQuarter: number | null;
}

/** A candidate to be refined once more. */
export interface Again {
  candidate: Candidate;
  aim: Aim;
  /** As in a job. */
  asCut?: true;
}
