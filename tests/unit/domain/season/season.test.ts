import fc from "fast-check";
import { expect, test } from "vitest";
import { seasonFindings } from "#app/domain/season/season-findings.ts";
import { type SeasonAmounts, seasonTotals } from "#app/domain/season/season-totals.ts";

const season: SeasonAmounts = {
  laneMiles: 100,
  eventCount: 20,
  saltLb: 500_000,
  mixLb: 500_000,
  mixSaltShare: 0.2,
  sandLb: 100_000,
  brineGal: null,
  materialCostCents: 3_300_000,
};

function codes(change: Partial<SeasonAmounts>, earlier: SeasonAmounts[] = []) {
  return seasonFindings({ ...season, ...change }, earlier).map(({ code, severity }) => `${severity} ${code}`);
}

test("250 tons of salt and 250 of mix with a fifth of salt are 6,000 lb a lane mile, 300 in each of 20 events", () => {
  const totals = seasonTotals(season);
  expect(totals.totalSaltLb).toBe(600_000);
  expect(totals.saltLbPerLaneMile).toBe(6000);
  expect(totals.saltTonsPerLaneMile).toBe(3);
  expect(totals.saltLbPerLaneMileEvent).toBe(300);
  expect(totals.abrasivesTonsPerLaneMile).toBeCloseTo(2.5, 12);
  expect(totals.chlorideLbPerLaneMile).toBeCloseTo(3639.6, 9);
  expect(totals.materialCostCentsPerLaneMile).toBe(33_000);
});

test("nothing is divided by 2 events, and 3 are enough", () => {
  expect(seasonTotals({ ...season, eventCount: 2 }).saltLbPerLaneMileEvent).toBeNull();
  expect(seasonTotals({ ...season, eventCount: 3 }).saltLbPerLaneMileEvent).toBe(2000);
});

test("a cost that is not reported stays unknown, and a share that is not known is not taken as 0", () => {
  expect(seasonTotals({ ...season, materialCostCents: null }).materialCostCentsPerLaneMile).toBeNull();
  expect(() => seasonTotals({ ...season, mixSaltShare: null })).toThrow(RangeError);
  expect(seasonTotals({ ...season, mixLb: 0, mixSaltShare: null }).totalSaltLb).toBe(500_000);
});

test("a season cut in two adds up to the whole", () => {
  fc.assert(
    fc.property(fc.double({ min: 0, max: 1, noNaN: true }), (share) => {
      const part = (of: number) => ({ ...season, saltLb: season.saltLb * of, mixLb: season.mixLb * of });
      const parts = seasonTotals(part(share)).totalSaltLb + seasonTotals(part(1 - share)).totalSaltLb;
      expect(parts).toBeCloseTo(600_000, 6);
    }),
  );
});

test("an ordinary season beside ordinary earlier ones raises nothing", () => {
  expect(
    codes({}, [
      { ...season, saltLb: 400_000 },
      { ...season, saltLb: 650_000 },
    ]),
  ).toEqual([]);
});

test("62 tons of salt on a lane mile are an error, 41 a check", () => {
  expect(codes({ saltLb: 62 * 2000 * 100, materialCostCents: null })).toEqual(["error absurd-salt"]);
  expect(codes({ saltLb: 40 * 2000 * 100, materialCostCents: null })).toEqual(["check much-salt"]);
});

test("ten times the median of four earlier seasons is said so, and a tenth too", () => {
  const earlier = Array.from({ length: 4 }, () => ({ ...season, mixLb: 0 }));
  const [more] = seasonFindings({ ...season, mixLb: 0, saltLb: 5_000_000, materialCostCents: null }, earlier);
  expect(more).toMatchObject({ code: "unlike-earlier", severity: "check", field: "saltLb" });
  expect(more?.message).toContain("about 10 times the median of its 4 earlier seasons");
  const [less] = seasonFindings({ ...season, mixLb: 0, saltLb: 50_000, materialCostCents: null }, earlier);
  expect(less?.message).toContain("about 10 % of the median");
});

test("one earlier season of 100 lane miles makes 130 a check and 118 none", () => {
  expect(codes({ laneMiles: 130 }, [season])).toEqual(["check lane-miles-changed"]);
  expect(codes({ laneMiles: 118 }, [season])).toEqual([]);
});

test.each([
  ["121 events", { eventCount: 121 }, "error too-many-events"],
  ["9,400 events", { eventCount: 9400 }, "error too-many-events"],
  ["2 events", { eventCount: 2 }, "check few-events"],
  ["2.5 events", { eventCount: 2.5 }, "error events"],
  ["$8 a ton", { materialCostCents: 440_000 }, "check cost-per-ton"],
  ["$300 a ton", { materialCostCents: 16_500_000 }, "check cost-per-ton"],
  ["0 lane miles", { laneMiles: 0 }, "error lane-miles"],
  ["negative salt", { saltLb: -1 }, "error out-of-range"],
  ["sand that is no number", { sandLb: NaN }, "error out-of-range"],
  ["a mix of unknown share", { mixSaltShare: null }, "error mix-salt-share"],
  ["a salt share of 120 %", { mixSaltShare: 1.2 }, "error mix-salt-share"],
])("%s is found", (_, change, code) => {
  expect(codes(change)).toEqual([code]);
});

test("whatever the figures, findings never throw, and without an error the totals can be worked out", () => {
  const anything = fc.oneof(fc.double(), fc.integer({ min: -5, max: 1_000_000 }));
  const anyAmounts = fc.record({
    laneMiles: anything,
    eventCount: anything,
    saltLb: anything,
    mixLb: anything,
    mixSaltShare: fc.option(anything),
    sandLb: anything,
    brineGal: fc.option(anything),
    materialCostCents: fc.option(anything),
  });
  fc.assert(
    fc.property(anyAmounts, fc.array(anyAmounts, { maxLength: 3 }), (amounts, earlier) => {
      const hasError = seasonFindings(amounts, earlier).some(({ severity }) => severity === "error");
      if (!hasError) expect(seasonTotals(amounts).totalSaltLb).toBeGreaterThanOrEqual(0);
    }),
    { numRuns: 3000 },
  );
});
