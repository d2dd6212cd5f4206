import fc from "fast-check";
import { expect, test } from "vitest";
import { defaultTolerancePercent, verificationPoint, verifyGroundSpeed } from "#app/domain/calibration/verification.ts";

function point(caughtLbPerLaneMile: number, plusMinusPercent: number) {
  return { speedMph: 20, commandedLbPerLaneMile: 300, caughtLbPerLaneMile, plusMinusPercent };
}
function verdict(...points: ReturnType<typeof point>[]) {
  return verifyGroundSpeed({ points, tolerancePercent: 5 }).verdict;
}

test("100 lb caught in a minute at 20 mph over one lane are 300 lb per lane mile, over two 150", () => {
  const reading = { speedMph: 20, commandedLbPerLaneMile: 300, seconds: 60, grossLb: 105, tareLb: 5 };
  expect(verificationPoint(reading, 1).caughtLbPerLaneMile).toBe(300);
  expect(verificationPoint(reading, 2).caughtLbPerLaneMile).toBe(150);
  // Half a second of 60 and half a step of half a pound of 100, each over the root of three, doubled.
  const ratio = (2 * Math.hypot(0.5 / 60, 0.25 / 100)) / Math.sqrt(3);
  expect(verificationPoint(reading, 1).plusMinusPercent).toBeCloseTo(100 * ratio, 12);
  expect(verificationPoint(reading, 1, 0, 0).plusMinusPercent).toBe(0);
  expect(() => verificationPoint({ ...reading, speedMph: 0 }, 1)).toThrow(RangeError);
  expect(() => verificationPoint({ ...reading, commandedLbPerLaneMile: 0 }, 1)).toThrow(RangeError);
});

test("the error is counted from the commanded rate", () => {
  const { points } = verifyGroundSpeed({ points: [point(330, 2), point(285, 2)], tolerancePercent: 5 });
  expect(points.map(({ errorPercent }) => errorPercent)).toEqual([10, -5]);
});

// The tolerance of 5 % is a network setting; no published number is known.
test("with 5 % tolerance: 3 ± 2 is within, 4 ± 2 and 6 ± 2 are undecided, 8 ± 2 is outside, either way round", () => {
  expect(defaultTolerancePercent).toBe(5);
  expect([309, 312, 318, 324].map((caught) => verdict(point(caught, 2)))).toEqual([
    "within",
    "undecided",
    "undecided",
    "outside",
  ]);
  expect([291, 288, 282, 276].map((caught) => verdict(point(caught, 2)))).toEqual([
    "within",
    "undecided",
    "undecided",
    "outside",
  ]);
});

test("one point outside puts the truck outside, one undecided leaves it undecided", () => {
  expect(verdict(point(300, 1), point(330, 1), point(312, 2))).toBe("outside");
  expect(verdict(point(300, 1), point(312, 2))).toBe("undecided");
  expect(verdict(point(300, 1), point(303, 2))).toBe("within");
});

test("a wider ± never turns an undecided point into a verdict", () => {
  const share = fc.double({ min: 0, max: 20, noNaN: true });
  fc.assert(
    fc.property(fc.double({ min: 200, max: 400, noNaN: true }), share, share, (caught, plusMinus, wider) => {
      const [before, after] = [verdict(point(caught, plusMinus)), verdict(point(caught, plusMinus + wider))];
      if (before !== after) expect(after).toBe("undecided");
    }),
  );
});

test("no point, no tolerance or a negative ± is refused", () => {
  expect(() => verifyGroundSpeed({ points: [], tolerancePercent: 5 })).toThrow(RangeError);
  expect(() => verifyGroundSpeed({ points: [point(300, 1)], tolerancePercent: 0 })).toThrow(RangeError);
  expect(() => verdict(point(300, -1))).toThrow(RangeError);
});
