import type { Finding } from "#app/domain/finding.ts";
import { type Catch, catchVariationPercent } from "./catch-weight.ts";
import { type Count, fallsInCount, fallWords } from "./count-rate.ts";

/** Above this the catches are too far apart to be averaged. A limit of our own; no published one is known. */
export const mostVariationPercent = 10;

/** No watch, scale or rule in a yard reads less or more; beyond, a division could run out of the range of numbers. */
const leastReading = 0.001;
const mostReading = 1_000_000;

export type CalibrationReadings = {
  counts: readonly Count[];
  catches: readonly Catch[];
  gateOpeningIn: number;
  gateMaxIn: number | null;
  workingSetting: number | null;
};

function error(code: string, field: string, message: string): Finding {
  return { code, severity: "error", field, message };
}

function check(code: string, field: string, message: string): Finding {
  return { code, severity: "check", field, message };
}

function isReading(value: number) {
  return value >= leastReading && value <= mostReading;
}

function catchFindings(catches: readonly Catch[]): Finding[] {
  if (catches.length === 0) return [error("no-catch", "catches", "Weigh at least one catch.")];
  const wrong = catches.flatMap((one, place) => {
    const name = `Catch ${place + 1}`;
    if (!isReading(one.revolutions)) {
      return [
        error(
          "catch-revolutions",
          "catches",
          `${name} needs the revolutions it took, more than 0 and below a million.`,
        ),
      ];
    }
    if (!(one.tareLb >= 0) || !isReading(one.grossLb)) {
      return [
        error(
          "catch-weight",
          "catches",
          `${name} needs a gross weight above 0 lb, a tare of 0 lb or more, and both below a million.`,
        ),
      ];
    }
    if (one.grossLb <= one.tareLb) {
      const weights = `gross ${one.grossLb} lb, tare ${one.tareLb} lb`;
      return [error("tare-above-gross", "catches", `${name} leaves no material: ${weights}. Were they swapped?`)];
    }
    return [];
  });
  if (wrong.length > 0) return wrong;
  if (catches.length === 1) {
    return [
      check("one-catch", "catches", "There is one catch only, so nothing shows how far it repeats. Weigh two more."),
    ];
  }
  const variationPercent = catchVariationPercent(catches) ?? 0;
  if (variationPercent <= mostVariationPercent) return [];
  const spread = `The catches differ by ${variationPercent.toFixed(0)} % (coefficient of variation)`;
  return [check("catches-differ", "catches", `${spread}, more than ${mostVariationPercent} %. Weigh two more.`)];
}

function countFindings(counts: readonly Count[], workingSetting: number | null): Finding[] {
  if (counts.length === 0) return [error("no-count", "counts", "Count the revolutions of at least one setting.")];
  const wrong = counts
    .filter(({ revolutions, seconds }) => !isReading(revolutions) || !isReading(seconds))
    .map(({ setting }) =>
      error(
        "count-not-positive",
        "counts",
        `Setting ${setting} needs revolutions and seconds, both more than 0 and below a million.`,
      ),
    );
  const settings = counts.map(({ setting }) => setting);
  const twice = new Set(settings.filter((setting, place) => settings.indexOf(setting) !== place));
  for (const setting of twice) {
    wrong.push(error("setting-twice", "counts", `Setting ${setting} is counted twice. Keep one of the counts.`));
  }
  if (wrong.length > 0) return wrong;

  const findings = fallsInCount(counts).map((fall) => error("count-falls", "counts", fallWords(fall)));
  if (workingSetting !== null && !settings.includes(workingSetting)) {
    const message = `The truck's working setting ${workingSetting} is not counted, so its rate is not known.`;
    findings.push(check("working-setting-not-counted", "counts", message));
  }
  return findings;
}

function gateFindings(gateOpeningIn: number, gateMaxIn: number | null): Finding[] {
  if (!isReading(gateOpeningIn)) {
    return [error("gate-not-positive", "gateOpeningIn", "Measure the gate opening: inches, more than 0.")];
  }
  if (gateMaxIn === null || gateOpeningIn <= gateMaxIn) return [];
  const message = `A gate opening of ${gateOpeningIn} in is more than the ${gateMaxIn} in recorded for this truck.`;
  return [check("gate-above-maximum", "gateOpeningIn", message)];
}

/**
 * What is wrong or doubtful in the readings of one calibration, as sentences for whoever took them.
 *
 * Never throws, whatever the numbers: it runs before anything is computed from them. With no error among the findings,
 * `calibrationRates` takes the same readings.
 *
 * @param readings - inches, lb, revolutions, seconds; `gateMaxIn` and `workingSetting` null when not recorded
 * @returns errors and checks on gate, counts and catches, in that order; empty when all is well
 * @example calibrationFindings({ counts, catches: [one], gateOpeningIn: 2, gateMaxIn: 4, workingSetting: 3 })
 */
export function calibrationFindings(readings: CalibrationReadings): Finding[] {
  return [
    ...gateFindings(readings.gateOpeningIn, readings.gateMaxIn),
    ...countFindings(readings.counts, readings.workingSetting),
    ...catchFindings(readings.catches),
  ];
}
