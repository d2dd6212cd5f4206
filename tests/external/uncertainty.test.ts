// Guide to the Expression of Uncertainty in Measurement (JCGM 100:2008), 5.1, with the figures computed by NumPy and
// SciPy 1.17.1; t intervals by SciPy and R 4.2.2. Values in vectors/uncertainty-*.json.
import { expect, test } from "vitest";
import { catchVariationPercent } from "#app/domain/calibration/catch-weight.ts";
import { countUncertaintyRatio, rateUncertainty, repeatUncertainty } from "#app/domain/calibration/uncertainty.ts";
import combined from "./vectors/uncertainty-combined.json";
import counts from "./vectors/uncertainty-counts.json";
import repeats from "./vectors/uncertainty-repeats.json";

function catchesOf(weightsLbPerRev: readonly number[]) {
  return weightsLbPerRev.map((weightLb) => ({ revolutions: 1, grossLb: weightLb, tareLb: 0 }));
}

test.each(repeats)("$id: mean, variation and t interval of the catches equal the reference", ({ inputs, expected }) => {
  const found = repeatUncertainty(catchesOf(inputs.x));
  expect(found?.meanLbPerRev).toBeCloseTo(expected.mean, 9);
  expect(found?.standardLbPerRev).toBeCloseTo(expected.se, 9);
  expect(found?.lowLbPerRev).toBeCloseTo(expected.ci[0] ?? NaN, 9);
  expect(found?.highLbPerRev).toBeCloseTo(expected.ci[1] ?? NaN, 9);
  expect(catchVariationPercent(catchesOf(inputs.x))).toBeCloseTo(100 * expected.cv, 9);
});

test.each(counts)("$id: the counting error as a share of the count equals the reference", ({ inputs, expected }) => {
  expect(countUncertaintyRatio(inputs.revs)).toBeCloseTo(expected.rel_standard, 12);
});

test.each(combined)("$id: the sources combine by root sum of squares", ({ inputs, expected }) => {
  const found = rateUncertainty({
    catches: catchesOf(inputs.weights_lb_per_rev),
    count: { setting: 4, revolutions: inputs.revs, seconds: inputs.time_s },
    scaleStepLb: inputs.scale_resolution_lb,
    timerHalfWidthSeconds: inputs.timer_half_width_s,
    speedMph: inputs.speed_mph,
    speedHalfWidthMph: inputs.speed_half_width,
  });
  expect(found?.combinedRatio).toBeCloseTo(expected.rel_combined, 9);
  expect((found?.expandedRatio ?? NaN) * 585.6).toBeCloseTo(expected.U_k2, 6);
});

test("with a speed known to 1 mph at 25 the speed is the largest source, without it the count", () => {
  const readings = {
    catches: catchesOf([12.1, 12.6, 11.9, 12.4, 12.0]),
    count: { setting: 4, revolutions: 20, seconds: 60 },
    speedMph: 25,
  };
  expect(rateUncertainty({ ...readings, speedHalfWidthMph: 1 })?.largest).toBe("speed");
  expect(rateUncertainty(readings)?.largest).toBe("count");
});
