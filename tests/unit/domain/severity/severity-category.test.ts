import { expect, test } from "vitest";
import {
  categoryBetween,
  historyPointsOf,
  severityCategory,
  severityCutPoints,
} from "#app/domain/severity/severity-category.ts";
import { severityQuality } from "#app/domain/severity/severity-quality.ts";
import { winterSeverity, type WinterSeverity } from "#app/domain/severity/winter-severity.ts";
import { aSeason, onDays } from "./winters.ts";

function severityOf(own: Parameters<typeof aSeason>[1], throughDay?: string): WinterSeverity {
  const found = winterSeverity(aSeason(2025, own), { seasonStartYear: 2025, throughDay });
  if (!found) throw new Error("this winter has begun");
  return found;
}

test("9 of 90 days without a depth are still enough, 10 are not, and the part for cold stays sound", () => {
  const enough = severityQuality(severityOf(onDays("2026-01-01", "2026-01-09", { SNWD: undefined })));
  const tooFew = severityQuality(severityOf(onDays("2026-01-01", "2026-01-10", { SNWD: undefined })));
  expect(enough).toMatchObject({ isTotalSound: true, lacking: [] });
  expect(tooFew).toEqual({
    isTotalSound: false,
    isTemperaturePartSound: true,
    isSnowPartSound: false,
    lacking: ["snowDepth"],
    isSpanDoubtful: false,
  });
});

test("without temperatures the part for snow stays sound and the total does not", () => {
  const quality = severityQuality(severityOf(onDays("2025-12-01", "2026-02-28", { TMAX: undefined, TMIN: undefined })));
  expect(quality).toMatchObject({ isTotalSound: false, isTemperaturePartSound: false, isSnowPartSound: true });
});

test("a record that stops on 28 February leaves the winter's end open, though no counted day is missing", () => {
  const severity = severityOf(onDays("2026-03-01", "2026-06-30", null));
  expect(severity.missingDayCounts).toEqual({ tmax: 0, tmin: 0, snowfall: 0, snowDepth: 0 });
  expect(severityQuality(severity)).toMatchObject({ isSpanDoubtful: true, isTotalSound: false });
});

test("12 blind days of 122 before and after the winter are let pass, 13 are not", () => {
  const doubtful = (to: string) => severityQuality(severityOf(onDays("2026-03-01", to, null))).isSpanDoubtful;
  expect([doubtful("2026-03-12"), doubtful("2026-03-13")]).toEqual([false, true]);
});

test("a history takes finished, sound winters only", () => {
  const sound = severityOf({ "2026-01-10": { TMAX: 0 } });
  const running = severityOf({ "2026-01-10": { TMAX: 0 } }, "2026-05-31");
  const gappy = severityOf(onDays("2026-01-01", "2026-01-20", null));
  expect(historyPointsOf([sound, running, gappy])).toEqual([6]);
});

test("19 winters make no category and 20 do", () => {
  const winters = Array.from({ length: 20 }, (_, place) => 100 * place);
  expect(severityCategory(500, winters.slice(1))).toBeNull();
  expect(severityCutPoints(winters)).toEqual([380, 760, 1140, 1520]);
  expect(severityCategory(500, winters)?.category).toBe("W2");
});

test("a total on a cut point stays in the lower category", () => {
  const cuts = [10, 20, 30, 40] as const;
  expect([10, 11, 20, 30, 40, 41].map((points) => categoryBetween(points, cuts))).toEqual([
    "W1",
    "W2",
    "W2",
    "W3",
    "W4",
    "W5",
  ]);
});

test("falling cut points and a total that is no number are refused", () => {
  expect(() => categoryBetween(10, [10, 30, 20, 40])).toThrow(RangeError);
  expect(() => categoryBetween(NaN, [10, 20, 30, 40])).toThrow(RangeError);
});
