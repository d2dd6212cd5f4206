import fc from "fast-check";
import { expect, test } from "vitest";
import { calibrationFindings } from "#app/domain/calibration/findings.ts";
import { calibrationRates } from "#app/domain/calibration/rates.ts";

const catches = [12.1, 12.6, 11.9].map((netLb) => ({ revolutions: 1, grossLb: netLb + 2, tareLb: 2 }));
const counts = [10, 15, 20].map((revolutions, place) => ({ setting: place + 1, revolutions, seconds: 60 }));
const good = { counts, catches, gateOpeningIn: 1.875, gateMaxIn: 4, workingSetting: 2 };

function codes(readings: Parameters<typeof calibrationFindings>[0]) {
  return calibrationFindings(readings).map(({ code, severity }) => `${severity} ${code}`);
}

test("three agreeing catches and rising counts raise nothing", () => {
  expect(calibrationFindings(good)).toEqual([]);
});

test("one catch is allowed and asks for two more", () => {
  expect(codes({ ...good, catches: catches.slice(0, 1) })).toEqual(["check one-catch"]);
});

test("catches of 10 and 13 lb vary by 18 % and ask for two more", () => {
  const apart = [10, 13].map((grossLb) => ({ revolutions: 1, grossLb, tareLb: 0 }));
  expect(calibrationFindings({ ...good, catches: apart })[0]?.message).toContain("differ by 18 %");
});

test("a count that falls from 20 to 12 is an error that names both settings", () => {
  const falling = [...counts, { setting: 4, revolutions: 12, seconds: 60 }];
  const [finding] = calibrationFindings({ ...good, counts: falling });
  expect(finding).toMatchObject({ code: "count-falls", severity: "error", field: "counts" });
  expect(finding?.message).toContain("from 20 a minute at setting 3 to 12 at setting 4");
});

test("a count that falls by half a revolution only is at the hydraulic limit and no error", () => {
  expect(codes({ ...good, counts: [...counts, { setting: 4, revolutions: 19.5, seconds: 60 }] })).toEqual([]);
});

test.each([
  ["a gate of 5 in above the truck's 4", { gateOpeningIn: 5 }, "check gate-above-maximum"],
  ["a gate of 0", { gateOpeningIn: 0 }, "error gate-not-positive"],
  ["a gate of NaN", { gateOpeningIn: NaN }, "error gate-not-positive"],
  ["a working setting 7 that is not counted", { workingSetting: 7 }, "check working-setting-not-counted"],
  ["no catch", { catches: [] }, "error no-catch"],
  ["no count", { counts: [] }, "error no-count"],
  ["0 revolutions in a catch", { catches: [{ revolutions: 0, grossLb: 9, tareLb: 1 }] }, "error catch-revolutions"],
  ["a tare above gross", { catches: [{ revolutions: 1, grossLb: 2, tareLb: 9 }] }, "error tare-above-gross"],
  ["a negative tare", { catches: [{ revolutions: 1, grossLb: 2, tareLb: -9 }] }, "error catch-weight"],
  ["-3 revolutions in a count", { counts: [{ setting: 2, revolutions: -3, seconds: 60 }] }, "error count-not-positive"],
  ["a setting counted twice", { counts: [...counts, ...counts.slice(2)] }, "error setting-twice"],
])("%s is found", (_, change, code) => {
  expect(codes({ ...good, ...change })).toEqual([code]);
});

test("no maximum and no working setting on record raise nothing", () => {
  expect(codes({ ...good, gateOpeningIn: 9, gateMaxIn: null, workingSetting: null })).toEqual([]);
});

test("whatever the readings, findings never throw, and without an error the rates can be worked out", () => {
  const anything = fc.oneof(fc.double(), fc.integer({ min: -5, max: 60 }));
  const anyCounts = fc.array(
    fc.record({ setting: fc.integer({ min: 1, max: 9 }), revolutions: anything, seconds: anything }),
  );
  const anyCatches = fc.array(fc.record({ revolutions: anything, grossLb: anything, tareLb: anything }));
  fc.assert(
    fc.property(anyCounts, anyCatches, anything, (someCounts, someCatches, gateOpeningIn) => {
      const readings = { ...good, counts: someCounts, catches: someCatches, gateOpeningIn };
      const hasError = calibrationFindings(readings).some(({ severity }) => severity === "error");
      if (!hasError) expect(calibrationRates(readings).lbPerRev).toBeGreaterThan(0);
    }),
    { numRuns: 3000 },
  );
});
