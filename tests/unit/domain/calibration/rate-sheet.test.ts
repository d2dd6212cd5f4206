import fc from "fast-check";
import { expect, test } from "vitest";
import { commonPracticeBands } from "#app/domain/calibration/band.ts";
import { hydraulicLimit, settingsWithLimit } from "#app/domain/calibration/count-rate.ts";
import { settingDischarges } from "#app/domain/calibration/discharge.ts";
import {
  bandSentence,
  bandSummary,
  type BandSummary,
  rateSheet,
  speedsFromTo,
} from "#app/domain/calibration/rate-sheet.ts";

const band = { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 };
const tenPounds = [{ revolutions: 1, grossLb: 12, tareLb: 2 }];
const counted = (...revolutions: number[]) =>
  revolutions.map((one, place) => ({ setting: place + 1, revolutions: one, seconds: 60 }));
const positive = (max: number) => fc.double({ min: 0.1, max, noNaN: true });

function words(summary: BandSummary | null, units?: "us" | "si") {
  return bandSentence(summary, units)
    .parts.map((part) => part.words)
    .join("");
}
function summaryOf(workingSpeedMph: number, ...revolutions: number[]) {
  return bandSummary({ counts: counted(...revolutions), catches: tenPounds, lanesPerPass: 1, workingSpeedMph, band });
}

test("speeds run from 5 to 45 mph by the chosen step", () => {
  expect(speedsFromTo(5)).toEqual([5, 10, 15, 20, 25, 30, 35, 40, 45]);
  expect(speedsFromTo(2.5).slice(-2)).toEqual([42.5, 45]);
  expect(speedsFromTo(15)).toEqual([5, 20, 35]);
  for (const step of [0, -5, 0.1, NaN]) expect(() => speedsFromTo(step)).toThrow(RangeError);
});

test("10 and 20 a minute with 10 lb: per mile, per lane mile and place at each speed", () => {
  const rows = rateSheet({
    counts: counted(10, 20),
    catches: tenPounds,
    lanesPerPass: 2,
    speedsMph: [10, 20],
    band,
  });
  expect(rows).toEqual([
    {
      setting: 1,
      revPerMin: 10,
      isAtHydraulicLimit: false,
      lbPerMin: 100,
      cells: [
        { mph: 10, lbPerMile: 600, lbPerLaneMile: 300, plusMinus: null, place: "in" },
        { mph: 20, lbPerMile: 300, lbPerLaneMile: 150, plusMinus: null, place: "under" },
      ],
    },
    {
      setting: 2,
      revPerMin: 20,
      isAtHydraulicLimit: false,
      lbPerMin: 200,
      cells: [
        { mph: 10, lbPerMile: 1200, lbPerLaneMile: 600, plusMinus: null, place: "over" },
        { mph: 20, lbPerMile: 600, lbPerLaneMile: 300, plusMinus: null, place: "in" },
      ],
    },
  ]);
});

test("timed catches are averaged by setting, have no count, and their ± is twice the deviation of the mean", () => {
  const timedCatches = [35, 37, 36, 80].map((grossLb, place) => ({
    setting: place < 3 ? 2 : 5,
    seconds: 30,
    grossLb,
    tareLb: 2,
  }));
  const [two, five] = settingDischarges({ timedCatches });
  // 66, 70 and 68 lb a minute: mean 68, deviation 2.
  expect(two).toMatchObject({ setting: 2, lbPerMin: 68, revPerMin: null });
  expect(two?.expandedRatio).toBeCloseTo((2 * 2) / Math.sqrt(3) / 68, 12);
  expect(five).toMatchObject({ setting: 5, lbPerMin: 156, expandedRatio: null });
});

test("both kinds of readings or neither are refused", () => {
  const timedCatches = [{ setting: 1, seconds: 30, grossLb: 9, tareLb: 0 }];
  expect(() => settingDischarges({})).toThrow(RangeError);
  expect(() => settingDischarges({ counts: counted(9), catches: tenPounds, timedCatches })).toThrow(RangeError);
  expect(() => settingDischarges({ counts: counted(9) })).toThrow(RangeError);
});

test("a setting at the hydraulic limit carries rate and ± of the last that rose", () => {
  const catches = [10, 11, 10.5].map((grossLb) => ({ revolutions: 1, grossLb, tareLb: 0 }));
  const [, second, third] = settingDischarges({ counts: counted(10, 20, 19.75), catches });
  expect(third).toEqual({ ...second, setting: 3, isAtHydraulicLimit: true });
  expect(hydraulicLimit(settingsWithLimit(counted(10, 20, 19.75, 20)))).toEqual({
    lastRisingSetting: 2,
    revPerMin: 20,
    limitedSettings: [3, 4],
  });
  expect(hydraulicLimit(settingsWithLimit(counted(10, 20)))).toBeNull();
});

test("a rate that misses the band's end by the last binary digit is on it", () => {
  // 16.1 − 3.6 is 12.500000000000002 in binary, and 8 a minute at 20 mph make a little more than 300 of it.
  const catches = [{ revolutions: 1, grossLb: 16.1, tareLb: 3.6 }];
  const cellsAt = (speed: number) =>
    rateSheet({ counts: counted(8), catches, lanesPerPass: 1, speedsMph: [speed], band })[0]?.cells[0];
  expect(cellsAt(20)?.lbPerLaneMile).not.toBe(300);
  expect(cellsAt(20)?.place).toBe("in");
  expect(cellsAt(19.99)?.place).toBe("over");
});

test("rates rise in proportion to count and catch, and fall with every step of speed", () => {
  const factors = fc.tuple(positive(60), positive(40), positive(10), fc.integer({ min: 1, max: 4 }));
  fc.assert(
    fc.property(factors, fc.double({ min: 0.5, max: 20, noNaN: true }), ([count, netLb, factor, lanes], step) => {
      const ratesOf = (revolutions: number, grossLb: number) =>
        rateSheet({
          counts: [{ setting: 1, revolutions, seconds: 60 }],
          catches: [{ revolutions: 1, grossLb, tareLb: 0 }],
          lanesPerPass: lanes,
          speedsMph: speedsFromTo(step),
          band: null,
        })[0]?.cells.map((cell) => cell.lbPerLaneMile) ?? [];
      const rates = ratesOf(count, netLb);
      const [byCount, byCatch] = [ratesOf(count * factor, netLb), ratesOf(count, netLb * factor)];
      expect(rates.length).toBe(speedsFromTo(step).length);
      rates.forEach((rate, place) => {
        expect(Math.abs((byCount[place] ?? NaN) / (factor * rate) - 1)).toBeLessThan(1e-12);
        expect(Math.abs((byCatch[place] ?? NaN) / (factor * rate) - 1)).toBeLessThan(1e-12);
        if (place > 0) expect(rate).toBeLessThan(rates[place - 1] ?? NaN);
      });
    }),
  );
});

test("at both ends of a setting's speeds its rate is in the band, and just outside them it is not", () => {
  const seen = { some: 0, none: 0 };
  fc.assert(
    fc.property(positive(60), positive(30), (count, netLb) => {
      const readings = {
        counts: counted(count),
        catches: [{ revolutions: 1, grossLb: netLb, tareLb: 0 }],
        lanesPerPass: 1,
      };
      const placesAt = (...speedsMph: number[]) =>
        rateSheet({ ...readings, speedsMph, band })[0]?.cells.map((cell) => cell.place);
      const speeds = bandSummary({ ...readings, workingSpeedMph: 25, band }).settings[0]?.speeds;
      if (!speeds) {
        seen.none += 1;
        expect(placesAt(...speedsFromTo(0.5))).not.toContain("in");
        return;
      }
      seen.some += 1;
      expect(placesAt(speeds.slowestMph, speeds.fastestMph)).toEqual(["in", "in"]);
      if (speeds.slowestMph > 5) expect(placesAt(speeds.slowestMph * 0.999)).toEqual(["over"]);
      if (speeds.fastestMph < 45) expect(placesAt(speeds.fastestMph * 1.001)).toEqual(["under"]);
    }),
  );
  expect(Math.min(seen.some, seen.none)).toBeGreaterThan(2);
});

test("one setting in the band: its number and the whole speeds inside its stretch", () => {
  expect(summaryOf(25, 5, 11.5, 20).inBandSettings).toEqual([2]);
  // 115 lb a minute: 300 at 23 mph, 250 at 27.6 mph.
  expect(words(summaryOf(25, 5, 11.5, 20))).toBe("At 25 mph setting 2 lands in the band: from 23 to 27 mph.");
});

test("two settings in the band are both named", () => {
  expect(words(summaryOf(25, 10.5, 12))).toBe(
    "At 25 mph settings 1 and 2 land in the band: setting 1 from 21 to 25 mph and setting 2 from 24 to 28 mph.",
  );
});

test("none in the band: how far the nearest is off, and who reaches it at which speed", () => {
  const summary = summaryOf(25, 4, 15);
  expect(words(summary)).toBe(
    "At 25 mph no setting lands in the band: the nearest, setting 2, lays 60 lb per lane mile above it. " +
      "It is reached by setting 1 from 8 to 9 mph and setting 2 from 30 to 36 mph.",
  );
  expect(bandSentence(summary).parts.map(({ tone }) => tone)).toEqual([undefined, "over", undefined]);
  expect(words(summaryOf(25, 1.5))).toContain("lays 214 lb per lane mile below it");
  expect(words(summaryOf(25, 1.5))).toContain("No setting reaches it at any speed from 5 to 45 mph.");
});

test("a stretch without two whole speeds in it is given in tenths that lie inside it, and a mere point as one speed", () => {
  // 32 lb a minute: 300 at 6.4 mph, 250 at 7.68 mph. 225 lb a minute: 300 at 45 mph.
  expect(words(summaryOf(25, 3.2))).toContain("It is reached by setting 1 from 6.4 to 7.6 mph.");
  expect(words(summaryOf(25, 22.5))).toContain("It is reached by setting 1 at 45 mph.");
});

test("a rate a quarter of a pound outside is not said to be 0 above", () => {
  expect(words(summaryOf(25, 12.51))).toContain("lays 1 lb per lane mile above it");
});

test("in SI the speeds are in km/h and the distance in kg per lane km", () => {
  // 60 lb per lane mile are 16.9 kg per lane km; 30 and 36 mph are 48.3 and 57.9 km/h.
  expect(words(summaryOf(25, 15), "si")).toBe(
    "At 40.2 km/h no setting lands in the band: the nearest, setting 1, lays 17 kg per lane km above it. " +
      "It is reached by setting 1 from 49 to 57 km/h.",
  );
});

test("without a band there is a sentence and no place", () => {
  expect(words(null)).toBe("There is no band for this material, so no rate is marked.");
  const rows = rateSheet({ counts: counted(10), catches: tenPounds, lanesPerPass: 1, speedsMph: [20], band: null });
  expect(rows[0]?.cells[0]?.place).toBeNull();
});

// Common practice, no published source.
test("the salt band of common practice is 250 to 300 and that of mix about 500; sand and brine have none", () => {
  expect(commonPracticeBands.salt).toEqual(band);
  const { lowLbPerLaneMile = NaN, highLbPerLaneMile = NaN } = commonPracticeBands.mix ?? {};
  expect((lowLbPerLaneMile + highLbPerLaneMile) / 2).toBe(500);
  expect([commonPracticeBands.sand, commonPracticeBands.brine]).toEqual([undefined, undefined]);
});
