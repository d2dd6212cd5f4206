import fc from "fast-check";
import { expect, test } from "vitest";
import { gateAdvice, targetLbPerRev } from "#app/domain/calibration/gate-advice.ts";
import { rateSheet } from "#app/domain/calibration/rate-sheet.ts";

const band = { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 };
const counts = [10, 15, 15].map((revolutions, place) => ({ setting: place + 1, revolutions, seconds: 60 }));
const positive = (max: number) => fc.double({ min: 0.1, max, noNaN: true });

test("275 lb per lane mile at 24 mph, 15 a minute and two lanes need 14.67 lb a revolution", () => {
  const working = { counts, workingSpeedMph: 24, lanesPerPass: 2, band };
  expect(targetLbPerRev({ ...working, workingSetting: 2 })).toBeCloseTo((275 * 24 * 2) / (60 * 15), 12);
  expect(targetLbPerRev({ ...working, workingSetting: 3 })).toBe(targetLbPerRev({ ...working, workingSetting: 2 }));
  expect(targetLbPerRev({ ...working, workingSetting: 7 })).toBeNull();
  expect(() => targetLbPerRev({ ...working, workingSetting: 2, workingSpeedMph: 0 })).toThrow(RangeError);
});

test("the target catch lays the band's middle", () => {
  fc.assert(
    fc.property(positive(60), positive(45), fc.integer({ min: 1, max: 3 }), (revolutions, speed, lanesPerPass) => {
      const one = { counts: [{ setting: 1, revolutions, seconds: 60 }], lanesPerPass, band };
      const target = targetLbPerRev({ ...one, workingSetting: 1, workingSpeedMph: speed }) ?? NaN;
      const catches = [{ revolutions: 1, grossLb: target, tareLb: 0 }];
      expect(rateSheet({ ...one, catches, speedsMph: [speed] })[0]?.cells[0]?.lbPerLaneMile).toBeCloseTo(275, 6);
    }),
  );
});

test("from one opening the advice is in proportion, without a reach", () => {
  expect(gateAdvice({ weighed: [{ gateOpeningIn: 2, lbPerRev: 12 }], targetLbPerRev: 9, gateMaxIn: 4 })).toEqual({
    method: "proportional",
    openingIn: 1.5,
    nearestSixteenthIn: 1.5,
    reach: null,
    isBeyondReach: false,
    isBeyondMax: false,
  });
});

test("two weighings at one opening are still one opening, averaged", () => {
  const weighed = [11, 13].map((lbPerRev) => ({ gateOpeningIn: 2, lbPerRev }));
  expect(gateAdvice({ weighed, targetLbPerRev: 9, gateMaxIn: null })).toMatchObject({
    method: "proportional",
    openingIn: 1.5,
  });
});

test("from two openings the line decides, within its reach, to the nearest sixteenth", () => {
  const weighed = [
    { gateOpeningIn: 2, lbPerRev: 12 },
    { gateOpeningIn: 1, lbPerRev: 7 },
  ];
  const advice = gateAdvice({ weighed, targetLbPerRev: 9, gateMaxIn: 4 });
  expect(advice).toMatchObject({ method: "fitted", reach: { fromIn: 1, toIn: 2 }, nearestSixteenthIn: 1.375 });
  expect(advice.method === "fitted" && advice.openingIn).toBeCloseTo(1.4, 12);
  expect(gateAdvice({ weighed, targetLbPerRev: 7, gateMaxIn: 4 })).toMatchObject({ isBeyondReach: false });
  expect(gateAdvice({ weighed, targetLbPerRev: 17, gateMaxIn: 4 })).toMatchObject({ isBeyondReach: true });
  expect(gateAdvice({ weighed, targetLbPerRev: 17, gateMaxIn: 2.5 })).toMatchObject({ isBeyondMax: true });
  expect(gateAdvice({ weighed, targetLbPerRev: 17, gateMaxIn: 3 })).toMatchObject({ isBeyondMax: false });
});

test("a wider gate that gave no more is refused, and so is a target below what a shut gate would give", () => {
  const flat = [1, 2].map((gateOpeningIn) => ({ gateOpeningIn, lbPerRev: 9 }));
  expect(gateAdvice({ weighed: flat, targetLbPerRev: 9, gateMaxIn: 4 })).toEqual({
    method: "refused",
    reason: "not-rising",
  });
  const steep = [1, 2].map((gateOpeningIn) => ({ gateOpeningIn, lbPerRev: 9 + gateOpeningIn }));
  expect(gateAdvice({ weighed: steep, targetLbPerRev: 8, gateMaxIn: 4 })).toEqual({
    method: "refused",
    reason: "gate-shut",
  });
});

test("nothing weighed, no catch or no target is refused loudly", () => {
  const weighed = [{ gateOpeningIn: 2, lbPerRev: 12 }];
  expect(() => gateAdvice({ weighed: [], targetLbPerRev: 9, gateMaxIn: 4 })).toThrow(RangeError);
  expect(() => gateAdvice({ weighed, targetLbPerRev: 0, gateMaxIn: 4 })).toThrow(RangeError);
  expect(() => gateAdvice({ weighed: [{ gateOpeningIn: 0, lbPerRev: 1 }], targetLbPerRev: 9, gateMaxIn: 4 })).toThrow(
    RangeError,
  );
});

test("openings that lie on a rising line lead back to it exactly", () => {
  const openings = fc.uniqueArray(fc.integer({ min: 8, max: 64 }), { minLength: 2, maxLength: 6 });
  fc.assert(
    fc.property(
      openings,
      positive(20),
      positive(5),
      fc.integer({ min: 8, max: 64 }),
      (sixteenths, slope, start, wanted) => {
        const weighed = sixteenths.map((one) => ({ gateOpeningIn: one / 16, lbPerRev: start + (slope * one) / 16 }));
        const advice = gateAdvice({ weighed, targetLbPerRev: start + (slope * wanted) / 16, gateMaxIn: null });
        expect(advice).toMatchObject({ method: "fitted", nearestSixteenthIn: wanted / 16, isBeyondMax: false });
        expect(advice.method === "fitted" && advice.isBeyondReach).toBe(
          wanted < Math.min(...sixteenths) || wanted > Math.max(...sixteenths),
        );
      },
    ),
  );
});
