import type { Miss } from '../score/aim.ts';
import type { Brief } from './brief.ts';
import type { BriefJson } from './briefJson.ts';
import { briefToJson } from './briefJson.ts';
import type { DesignJson } from './designJson.ts';
import { designToJson } from './designJson.ts';
import type { Ending } from './ending.ts';
import type { RankedDesign } from './ranking.ts';
import type { SearchResult, SmallestResult } from './search.ts';

/** The best that a search came across where nothing meets the target, and the limits that it misses. */
export interface Nearest {
  design: RankedDesign;
  /** The worst first. */
  misses: Miss[];
}

/** What `rimwright search --json` prints and front.json holds. */
export interface SearchJson {
  brief: BriefJson;
  designs: DesignJson[];
  /** Null where a design meets the target, or nothing was found at all. */
  nearest: { design: DesignJson; misses: Miss[] } | null;
  warnings: string[];
  evaluations: number;
  seconds: number;
  /** Whether the search was interrupted before its budget was spent. */
  stopped: boolean;
  ending: Ending;
}

/**
 * The plain form of a search's result. Nothing in it but `seconds` depends on the machine or the number of workers.
 */
export function searchToJson(
  brief: Brief,
  result: SearchResult,
  nearest: Nearest | null,
  warnings: readonly string[],
): SearchJson {
  const { designs, evaluations, seconds, stopped, ending } = result;
  return {
    brief: briefToJson(brief),
    designs: designs.map(designToJson),
    nearest: nearest && { design: designToJson(nearest.design), misses: nearest.misses },
    warnings: [...warnings],
    evaluations,
    seconds,
    stopped,
    ending,
  };
}

/** What `rimwright smallest --json` prints. */
export interface SmallestJson {
  brief: BriefJson;
  /** Null where none meets the target; `nearest` is then the best found, and `misses` are its limits. */
  design: DesignJson | null;
  nearest: DesignJson | null;
  misses: Miss[];
  warnings: string[];
  evaluations: number;
  seconds: number;
  stopped: boolean;
  ending: Ending;
}

/** The plain form of the result of `smallest`. */
export function smallestToJson(
  brief: Brief,
  result: SmallestResult,
  warnings: readonly string[],
): SmallestJson {
  const { design, nearest, misses, evaluations, seconds, stopped, ending } = result;
  return {
    brief: briefToJson(brief),
    design: design && designToJson(design),
    nearest: design === null && nearest !== null ? designToJson(nearest) : null,
    misses: design === null ? misses : [],
    warnings: [...warnings],
    evaluations,
    seconds,
    stopped,
    ending,
  };
}
