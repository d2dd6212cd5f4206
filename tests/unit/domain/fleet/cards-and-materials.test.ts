import fc from "fast-check";
import { expect, test } from "vitest";
import { cardSpeeds } from "#app/domain/fleet/card-speeds.ts";
import { carriedMaterials } from "#app/domain/fleet/carried.ts";

test("a card shows the working speed between round ones", () => {
  expect(cardSpeeds(25)).toEqual([15, 20, 25, 30]);
  expect(cardSpeeds(22)).toEqual([15, 20, 22, 25]);
  expect(cardSpeeds(28)).toEqual([20, 25, 28, 30]);
  expect(cardSpeeds(10)).toEqual([5, 10, 15, 20]);
  expect(cardSpeeds(3)).toEqual([3, 5, 10, 15]);
  expect(() => cardSpeeds(0)).toThrow(RangeError);
});

test("whatever the working speed, a card has four rising speeds with it among them", () => {
  fc.assert(
    fc.property(fc.double({ min: 0.5, max: 60, noNaN: true }), (speed) => {
      const speeds = cardSpeeds(speed);
      expect(speeds).toHaveLength(4);
      expect(speeds).toContain(speed);
      expect(new Set(speeds).size).toBe(4);
      expect(speeds).toEqual([...speeds].sort((a, b) => a - b));
    }),
  );
});

test("only ticked materials are carried; a day that is none, or has not come, is refused by material", () => {
  const typed = [
    { materialId: 1, isCarried: true, since: "" },
    { materialId: 2, isCarried: true, since: "2026-11-01" },
    { materialId: 3, isCarried: false, since: "nonsense" },
    { materialId: 4, isCarried: true, since: "2026-02-30" },
    { materialId: 5, isCarried: true, since: "2026-12-02" },
  ];
  const { materials, errors } = carriedMaterials(typed, "2026-12-01");
  expect(materials).toEqual([
    { materialId: 1, sinceOn: null },
    { materialId: 2, sinceOn: "2026-11-01" },
  ]);
  expect(Object.keys(errors)).toEqual(["4", "5"]);
});
