import { mph } from "#app/domain/units.ts";
import { applicationRate } from "./application-rate.ts";
import { timedDischarge } from "./timed-catch.ts";
import { coverageFactor, rectangular } from "./uncertainty.ts";

/** A network setting. Specifications often say 5 %; no published number is known. */
export const defaultTolerancePercent = 5;

// Assumptions of our own, with no published source: a thumb on a watch, and a yard scale that reads half pounds.
const defaultTimerHalfWidthSeconds = 0.5;
const defaultScaleStepLb = 0.5;

/** What the controller was told to lay and what it laid, at one speed; ± in percent of the commanded rate (k = 2). */
export type VerificationPoint = {
  speedMph: number;
  commandedLbPerLaneMile: number;
  caughtLbPerLaneMile: number;
  plusMinusPercent: number;
};

export type VerificationVerdict = "within" | "outside" | "undecided";

/**
 * One point of a ground-speed verification, from a timed catch.
 *
 * @param reading - speed, commanded rate and seconds > 0; gross above tare
 * @param lanesPerPass - a whole number from 1 up
 * @param scaleStepLb - smallest step of the scale, ≥ 0
 * @param timerHalfWidthSeconds - ≥ 0
 * @returns the caught rate in lb per lane mile and the ± that timer and scale leave to it
 * @throws RangeError when a reading is out of range
 *
 * Source: JCGM 100:2008 (GUM), 5.1, for the ±; errors of timer and scale are evenly likely within their half-widths.
 * @example verificationPoint({ speedMph: 20, commandedLbPerLaneMile: 300, seconds: 60, grossLb: 105, tareLb: 5 }, 1)
 *   .caughtLbPerLaneMile // 300
 */
export function verificationPoint(
  reading: { speedMph: number; commandedLbPerLaneMile: number; seconds: number; grossLb: number; tareLb: number },
  lanesPerPass: number,
  scaleStepLb = defaultScaleStepLb,
  timerHalfWidthSeconds = defaultTimerHalfWidthSeconds,
): VerificationPoint {
  const { speedMph, commandedLbPerLaneMile, seconds, grossLb, tareLb } = reading;
  if (!(commandedLbPerLaneMile > 0)) throw new RangeError("the commanded rate must be above 0 lb per lane mile");
  const caughtLbPerLaneMile = applicationRate(timedDischarge(reading), mph(speedMph), lanesPerPass);
  const ratio = Math.hypot(
    rectangular(timerHalfWidthSeconds) / seconds,
    rectangular(scaleStepLb / 2) / (grossLb - tareLb),
  );
  const plusMinusPercent = (100 * coverageFactor * ratio * caughtLbPerLaneMile) / commandedLbPerLaneMile;
  return { speedMph, commandedLbPerLaneMile, caughtLbPerLaneMile, plusMinusPercent };
}

/** With a guard band: a verdict only where the whole of error ± lies on one side of the tolerance. */
function verdictOf(errorPercent: number, plusMinusPercent: number, tolerancePercent: number): VerificationVerdict {
  if (Math.abs(errorPercent) + plusMinusPercent <= tolerancePercent) return "within";
  return Math.abs(errorPercent) - plusMinusPercent > tolerancePercent ? "outside" : "undecided";
}

/**
 * Whether a ground-speed controlled spreader lays what it is told to lay.
 *
 * @param points - one or more; commanded rates > 0, ± ≥ 0
 * @param tolerancePercent - > 0
 * @returns each point's error, (caught − commanded) / commanded, in percent, and its verdict; over all: "outside" when
 *   one point is, "within" when all are, else "undecided"
 * @throws RangeError when there is no point or a figure is out of range
 *
 * Source of the error: T. Peters, Fundamentals of salt spreader calibration, APWA Illinois chapter newsletter (displayed
 * against caught weight). The guard band is the network's choice.
 * @example verifyGroundSpeed({ points: [{ speedMph: 20, commandedLbPerLaneMile: 300, caughtLbPerLaneMile: 330,
 *   plusMinusPercent: 2 }], tolerancePercent: 5 }).verdict // "outside"
 */
export function verifyGroundSpeed<Point extends VerificationPoint>({
  points,
  tolerancePercent,
}: {
  points: readonly Point[];
  tolerancePercent: number;
}): { points: (Point & { errorPercent: number; verdict: VerificationVerdict })[]; verdict: VerificationVerdict } {
  if (points.length === 0) throw new RangeError("a verification needs one point at least");
  if (!(tolerancePercent > 0)) throw new RangeError(`the tolerance must be above 0 %, not ${tolerancePercent}`);
  const judged = points.map((point) => {
    const { commandedLbPerLaneMile: commanded, caughtLbPerLaneMile: caught, plusMinusPercent } = point;
    if (!(commanded > 0 && caught >= 0 && plusMinusPercent >= 0)) {
      throw new RangeError("a point needs a commanded rate above 0, and a caught rate and ± of 0 or more");
    }
    const errorPercent = (100 * (caught - commanded)) / commanded;
    return { ...point, errorPercent, verdict: verdictOf(errorPercent, plusMinusPercent, tolerancePercent) };
  });
  const verdicts = judged.map((point) => point.verdict);
  if (verdicts.includes("outside")) return { points: judged, verdict: "outside" };
  return { points: judged, verdict: verdicts.includes("undecided") ? "undecided" : "within" };
}
