import { inReportedSteps, type WeatherDay } from "./weather-day.ts";

/** Points of one day by element; `null` where the reading is missing, which adds nothing and is counted as missing. */
export type DayPoints = {
  tmaxPoints: number | null;
  tminPoints: number | null;
  snowfallPoints: number | null;
  snowDepthPoints: number | null;
};

/** From this reading upwards, up to the next step, so many points. Without an end there can be no hole between two. */
type Step = readonly [from: number, points: number];

const coldest = Number.NEGATIVE_INFINITY;

/** Highest temperature, whole °F. */
const tmaxSteps: readonly Step[] = [
  [33, 0],
  [25, 1],
  [20, 2],
  [15, 3],
  [10, 4],
  [5, 5],
  [0, 6],
  [-5, 7],
  [-10, 8],
  [-15, 9],
  [-20, 10],
  [coldest, 15],
];

/** Lowest temperature, whole °F. */
const tminSteps: readonly Step[] = [
  [33, 0],
  [25, 1],
  [20, 2],
  [15, 3],
  [10, 4],
  [5, 5],
  [0, 6],
  [-5, 7],
  [-10, 8],
  [-15, 9],
  [-20, 10],
  [-25, 11],
  [-35, 15],
  [coldest, 20],
];

/** Snowfall, tenths of an inch. */
const snowfallSteps: readonly Step[] = [
  [30, 45],
  [24, 36],
  [18, 26],
  [15, 22],
  [12, 18],
  [10, 14],
  [9, 13],
  [8, 12],
  [7, 10],
  [6, 9],
  [5, 7],
  [4, 6],
  [3, 4],
  [2, 3],
  [1, 2],
  [0.1, 1],
  [0, 0],
];

/** Snow on the ground, whole inches. */
const snowDepthSteps: readonly Step[] = [
  [36, 15],
  [24, 10],
  [18, 9],
  [15, 8],
  [12, 7],
  [9, 6],
  [6, 5],
  [4, 4],
  [3, 3],
  [2, 2],
  [1, 1],
  [0, 0],
];

function pointsFor(steps: readonly Step[], reading: number | null) {
  if (reading === null) return null;
  const step = steps.find(([from]) => reading >= from);
  if (!step) throw new RangeError(`no points are given for a reading of ${reading}`);
  return step[1];
}

/**
 * The day's points in the Accumulated Winter Season Severity Index, by element.
 *
 * @param day - one day's weather; it is brought to reported steps before the tables are read
 * @returns points of the four elements, 0 or more; a trace scores 0, a missing reading is `null`
 * @throws RangeError when a snow reading is below zero or not a number
 *
 * Source: B. E. Mayes Boustead, S. D. Hilberg, M. D. Shulski and K. G. Hubbard, "The Accumulated Winter Season Severity
 * Index (AWSSI)", Journal of Applied Meteorology and Climatology 54 (2015), 1693–1712, point tables.
 * @example dayPoints(weatherDay("2026-01-15", { TMAX: 0, TMIN: -10, SNOW: 0, SNWD: 1 })) // 6, 8, 0 and 1 points
 */
export function dayPoints(day: WeatherDay): DayPoints {
  const { tmaxF, tminF, snowfallIn, snowDepthIn } = inReportedSteps(day);
  return {
    tmaxPoints: pointsFor(tmaxSteps, tmaxF),
    tminPoints: pointsFor(tminSteps, tminF),
    snowfallPoints: pointsFor(snowfallSteps, snowfallIn),
    snowDepthPoints: pointsFor(snowDepthSteps, snowDepthIn),
  };
}

/** The day's points for cold: highest and lowest temperature. What is missing adds nothing. */
export function temperaturePointsOf({ tmaxPoints, tminPoints }: DayPoints): number {
  return (tmaxPoints ?? 0) + (tminPoints ?? 0);
}

/** The day's points for snow: fallen and on the ground. What is missing adds nothing. */
export function snowPointsOf({ snowfallPoints, snowDepthPoints }: DayPoints): number {
  return (snowfallPoints ?? 0) + (snowDepthPoints ?? 0);
}
