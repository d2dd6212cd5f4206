import type { LocalDate } from "#app/domain/dates.ts";
import { everyDay } from "./season-days.ts";
import { inReportedSteps, type WeatherDay } from "./weather-day.ts";

const freezingF = 32;

/** Days for which it is known, and days for which too little was reported to know. */
export type DayTally = { dayCount: number; unknownDayCount: number };

export type WinterCounts = {
  /** 0.1 inch of snowfall or more. */
  snowDays: DayTally;
  /** 1 inch of snowfall or more. */
  snowDaysOf1In: DayTally;
  /** 3 inches of snowfall or more. */
  snowDaysOf3In: DayTally;
  /** Over 32 °F by day, at or under 32 °F by night. */
  freezeThawDays: DayTally;
  /** Rain or snow, 0.01 inch or more, on a day that went to 32 °F or under. */
  wetFreezeDays: DayTally;
};

/** True, false, or null when it is not known. */
type Verdict = boolean | null;

function ask(reading: number | null, test: (reading: number) => boolean): Verdict {
  return reading === null ? null : test(reading);
}

/** One false settles it, even beside an unknown. */
function both(first: Verdict, second: Verdict): Verdict {
  if (first === false || second === false) return false;
  return first === null || second === null ? null : true;
}

/**
 * Plain counts of winter days from the first day to the last. Our own definitions, so that anybody can count them again.
 *
 * @param days - in any order; days outside are left out
 * @param span - both days included
 * @returns days of each kind, with the days on which a missing reading leaves it open: those are not in the count
 * @throws RangeError when a day is given twice
 * @example winterCounts(days, { from: "2025-07-01", to: "2026-06-30" }).snowDays.dayCount
 */
export function winterCounts(
  days: readonly WeatherDay[],
  { from, to }: { from: LocalDate; to: LocalDate },
): WinterCounts {
  const reported = everyDay(days, from, to).map(inReportedSteps);
  const tally = (verdictOf: (day: WeatherDay) => Verdict): DayTally => {
    const verdicts = reported.map(verdictOf);
    return {
      dayCount: verdicts.filter((verdict) => verdict === true).length,
      unknownDayCount: verdicts.filter((verdict) => verdict === null).length,
    };
  };
  const snowfallOf = (leastIn: number) => tally(({ snowfallIn }) => ask(snowfallIn, (fallenIn) => fallenIn >= leastIn));
  const isFrost = ({ tminF }: WeatherDay) => ask(tminF, (lowestF) => lowestF <= freezingF);
  return {
    snowDays: snowfallOf(0.1),
    snowDaysOf1In: snowfallOf(1),
    snowDaysOf3In: snowfallOf(3),
    freezeThawDays: tally((day) =>
      both(
        ask(day.tmaxF, (highestF) => highestF > freezingF),
        isFrost(day),
      ),
    ),
    wetFreezeDays: tally((day) =>
      both(
        ask(day.precipIn, (fallenIn) => fallenIn > 0),
        isFrost(day),
      ),
    ),
  };
}
