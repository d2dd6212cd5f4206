// F. J. Anscombe, "Graphs in Statistical Analysis", The American Statistician 27 (1973), pages 17 to 21: the first and
// third data set have the same least-squares line, y = 3.00 + 0.500 x, printed to three digits.
import { expect, test } from "vitest";
import { gateAdvice } from "#app/domain/calibration/gate-advice.ts";

const openingsIn = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
const catchesLb = {
  first: [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68],
  third: [7.46, 6.77, 12.74, 7.11, 7.81, 8.84, 6.08, 5.39, 8.15, 6.42, 5.73],
};

test.each(Object.entries(catchesLb))("the line of the %s set leads back from catch to opening", (_, lbPerRevs) => {
  const weighed = openingsIn.map((gateOpeningIn, place) => ({ gateOpeningIn, lbPerRev: lbPerRevs[place] ?? NaN }));
  for (const openingIn of [5, 9, 13]) {
    const advice = gateAdvice({ weighed, targetLbPerRev: 3 + 0.5 * openingIn, gateMaxIn: null });
    expect(advice).toMatchObject({ method: "fitted", reach: { fromIn: 4, toIn: 14 }, isBeyondReach: false });
    expect(advice.method === "fitted" && Math.abs(advice.openingIn - openingIn)).toBeLessThan(0.02);
  }
});
