import { expect, test } from "vitest";
import { cabCard } from "#app/domain/calibration/card.ts";
import { rateSheet } from "#app/domain/calibration/rate-sheet.ts";

const band = { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 };
const readings = {
  counts: [5, 11.47, 11.47].map((revolutions, place) => ({ setting: place + 1, revolutions, seconds: 60 })),
  catches: [{ revolutions: 1, grossLb: 12, tareLb: 2 }],
  lanesPerPass: 1,
};
const input = {
  ...readings,
  unitNumber: "12",
  materialName: "Salt",
  gateOpeningIn: 1.875,
  gateScaleMark: "3",
  testedOn: "2026-10-09",
  testedBy: "R. Alder",
  speedsMph: [10, 25],
  workingSpeedMph: 25,
  band,
};

test("the card shows whole pounds, marks the band's cells and ends with the season", () => {
  const card = cabCard(input);
  expect(card).toMatchObject({ unitNumber: "12", gateOpeningIn: 1.875, gateScaleMark: "3", validUntil: "2027-06-30" });
  expect(card.rows[0]).toEqual({
    setting: 1,
    isAtHydraulicLimit: false,
    cells: [
      { mph: 10, wholeLbPerLaneMile: 300, inBand: true },
      { mph: 25, wholeLbPerLaneMile: 120, inBand: false },
    ],
  });
  // 275.28 at 25 mph.
  expect(card.rows[1]?.cells[1]).toEqual({ mph: 25, wholeLbPerLaneMile: 275, inBand: true });
});

test("the words say what was measured", () => {
  expect(cabCard(input).words).toEqual({
    basis: "lb per lane mile, one lane in a pass",
    band: "In the band at 25 mph: settings 2, 3",
    limit: "Hydraulics at their limit: setting 3 as setting 2",
  });
  expect(cabCard({ ...input, workingSpeedMph: 45 }).words.band).toBe("In the band at 45 mph: no setting");
  expect(cabCard({ ...input, counts: input.counts.slice(0, 2) }).words).toMatchObject({
    band: "In the band at 25 mph: setting 2",
    limit: null,
  });
  expect(cabCard({ ...input, band: null }).words.band).toBe("No band for this material");
  expect(cabCard({ ...input, lanesPerPass: 2 }).words.basis).toBe("lb per lane mile, 2 lanes in a pass");
});

test("a test in June holds to the end of that June", () => {
  expect(cabCard({ ...input, testedOn: "2026-06-30" }).validUntil).toBe("2026-06-30");
  expect(() => cabCard({ ...input, testedOn: "2026-06-31" })).toThrow(RangeError);
});

test("every cell of the card is the sheet's rate, and marked as the sheet places it", () => {
  const speedsMph = [5, 10, 15, 20, 25, 30, 35, 40, 45];
  const sheet = rateSheet({ ...readings, speedsMph, band }).flatMap(({ cells }) => cells);
  const card = cabCard({ ...input, speedsMph }).rows.flatMap(({ cells }) => cells);
  expect(card.length).toBe(27);
  card.forEach((cell, place) => {
    expect(Math.abs(cell.wholeLbPerLaneMile - (sheet[place]?.lbPerLaneMile ?? NaN))).toBeLessThanOrEqual(0.5);
    expect(cell.inBand).toBe(sheet[place]?.place === "in");
  });
});
