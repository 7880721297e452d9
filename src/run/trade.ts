import type { Measure, Miss } from '../score/aim.ts';
import type { BriefJson } from './briefJson.ts';
import { briefToJson } from './briefJson.ts';
import type { Cell } from './csvText.ts';
import { csvText } from './csvText.ts';
import type { DesignJson } from './designJson.ts';
import { designToJson } from './designJson.ts';
import type { OpenedBrief } from './openBrief.ts';
import type { SmallestResult } from './search.ts';
import type { TradeAxis } from './tradeGrid.ts';

/** What came of one pair of values. */
export interface TradeCell {
  /** Of the first and the second key, as a brief writes them. */
  values: [string, string];
  result: SmallestResult;
}

/** What a trade was asked, and what it found. */
export interface Trade {
  axes: [TradeAxis, TradeAxis];
  by: Measure;
  /** For each value of the first key those of the second; fewer where it was interrupted. */
  cells: TradeCell[];
}

/** What `rimwright trade --json` prints and trade.json holds. */
export interface TradeJson {
  brief: BriefJson;
  by: Measure;
  over: TradeAxis[];
  cells: {
    values: [string, string];
    /** Null where none meets the target; `nearest` is then the best found, and `misses` are its limits. */
    design: DesignJson | null;
    nearest: DesignJson | null;
    misses: Miss[];
    evaluations: number;
  }[];
  evaluations: number;
  seconds: number;
  stopped: boolean;
}

export function tradeToJson({ brief }: OpenedBrief, { axes, by, cells }: Trade, stopped: boolean): TradeJson {
  const sum = (of: (result: SmallestResult) => number) =>
    cells.reduce((total, { result }) => total + of(result), 0);
  return {
    brief: briefToJson(brief),
    by,
    over: axes,
    cells: cells.map(({ values, result: { design, nearest, misses, evaluations } }) => ({
      values,
      design: design && designToJson(design),
      nearest: design === null && nearest !== null ? designToJson(nearest) : null,
      misses: design === null ? misses : [],
      evaluations,
    })),
    evaluations: sum((result) => result.evaluations),
    seconds: sum((result) => result.seconds),
    stopped,
  };
}

/** A trade as CSV, one row a pair of values; where no design meets the target, the row is of the nearest. */
export function tradeCsv({ axes, cells }: Trade): string {
  const header = [
    ...axes.map(({ key }) => key),
    ...[
      'meets_target',
      'family',
      'time_s',
      'radius_m',
      'area_m2',
      'gain',
      'correction_worst',
      'correction_certified',
    ],
    ...['distance_m', 'area_over_floor', 'misses'],
  ];
  const rows = cells.map(({ values, result: { design, nearest, misses } }): Cell[] => {
    const shown = design ?? nearest;
    if (shown === null) return [...values, false, ...Array<Cell>(10).fill('')];
    const { family, scores, distanceM } = shown;
    return [
      ...values,
      design !== null,
      family,
      scores.snr.time_s,
      scores.radius_m,
      scores.area_m2,
      scores.gain,
      scores.correction.worst,
      // Empty where it was not asked for.
      scores.correction.certified ?? '',
      distanceM,
      scores.areaOverFloor,
      design === null ? misses.map(({ limit }) => limit).join('; ') : '',
    ];
  });
  return csvText([header, ...rows]);
}
