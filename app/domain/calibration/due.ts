import { isLocalDate, type LocalDate, seasonStart, seasonStartYearOf } from "#app/domain/dates.ts";

export type DueState = "in-date" | "due" | "never";

/**
 * Whether a truck and material must be calibrated: once before each season, so anything older than 1 July of the
 * season that `today` lies in is due.
 *
 * @param testedOn - local date of the newest approved calibration; null when there is none
 * @param today - local date
 *
 * Source: published guides agree on a calibration every year before the season; the day is the season's own.
 * @example dueState("2025-10-14", "2026-11-02") // "due"
 */
export function dueState(testedOn: string | null, today: string): DueState {
  if (testedOn === null) return "never";
  return seasonStartYearOf(testedOn) < seasonStartYearOf(today) ? "due" : "in-date";
}

export type DueReasonCode = "never-calibrated" | "work-done" | "new-material" | "new-season";

/** Why a truck and material must be calibrated, as the end of a sentence: "Due: …". */
export const dueReasonWords: Record<DueReasonCode, string> = {
  "never-calibrated": "never calibrated with this material",
  "work-done": "work was done on the spreader since the last calibration",
  "new-material": "the material or its supplier changed since the last calibration",
  "new-season": "last calibrated before this season",
};

/** Day of the year on which the season opens for the trucks: 1 November unless the network says otherwise. */
const defaultOpeningDay = "11-01";

export type DueReason = {
  state: "in-date" | "due" | "overdue" | "never";
  /** Null when in date. */
  reason: DueReasonCode | null;
  /** The day since which it is due; null when in date or never calibrated. */
  dueSince: LocalDate | null;
};

/** The first opening day after the date; a date on the opening day itself has to wait for the next. */
function openingAfter(date: LocalDate, openingDay: string): LocalDate {
  // 2001 has no 29 February, a day that is not there every year.
  if (!isLocalDate(`2001-${openingDay}`)) {
    throw new RangeError(`an opening day must be a day of every year written MM-DD, not "${openingDay}"`);
  }
  const year = Number(date.slice(0, 4));
  const opening = `${year}-${openingDay}`;
  return opening > date ? opening : `${year + 1}-${openingDay}`;
}

/**
 * Whether and why a truck and material must be calibrated.
 *
 * Due once before each season, after work on gate, hydraulics, feed or controller, and with a new material or supplier;
 * overdue when a season's opening has come while it was due. Of several reasons the oldest is given. A test on the
 * very day of the work or of the change counts as done after it; days still to come are left out.
 *
 * @param testedOn - local date of the newest approved calibration; null when there is none
 * @param today - local date
 * @param workDoneOn - local dates of the mechanic's entries, in any order
 * @param materialSince - local date since which the material is as it is; null when it has not changed
 * @param openingDay - MM-DD
 * @throws RangeError when a date is no real day, or the opening day none of every year
 *
 * Source: APWA Illinois chapter newsletter, Fundamentals of salt spreader calibration, and Delaware T2 Center, Salt
 * spreader calibration (2020): every year, after changes of hydraulics, auger or gate; Iowa DOT (2020): after any work in
 * the season. The day of the opening is the network's choice.
 * @example dueReason({ testedOn: "2025-10-14", today: "2026-11-02", workDoneOn: [], materialSince: null }).state
 *   // "overdue"
 */
export function dueReason({
  testedOn,
  today,
  workDoneOn,
  materialSince,
  openingDay = defaultOpeningDay,
}: {
  testedOn: LocalDate | null;
  today: LocalDate;
  workDoneOn: readonly LocalDate[];
  materialSince: LocalDate | null;
  openingDay?: string;
}): DueReason {
  const season = seasonStartYearOf(today);
  if (testedOn === null) return { state: "never", reason: "never-calibrated", dueSince: null };
  const sinceTest = (date: LocalDate, reason: DueReasonCode) => {
    if (!isLocalDate(date)) throw new RangeError(`a date must be a real day written YYYY-MM-DD, not "${date}"`);
    return date > testedOn && date <= today ? [{ reason, dueSince: date }] : [];
  };
  const reasons = [
    ...workDoneOn.flatMap((date) => sinceTest(date, "work-done")),
    ...(materialSince === null ? [] : sinceTest(materialSince, "new-material")),
    ...(seasonStartYearOf(testedOn) < season
      ? sinceTest(seasonStart(seasonStartYearOf(testedOn) + 1), "new-season")
      : []),
  ].sort((a, b) => (a.dueSince < b.dueSince ? -1 : Number(a.dueSince > b.dueSince)));
  const [oldest] = reasons;
  if (!oldest) return { state: "in-date", reason: null, dueSince: null };
  const isOverdue = openingAfter(oldest.dueSince, openingDay) <= today;
  return { state: isOverdue ? "overdue" : "due", ...oldest };
}
