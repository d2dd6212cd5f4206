// Minnesota Snow and Ice Control Field Handbook for Snowplow Operators (Manual 2005-01 and revisions), calibration
// insert and page 15; New Hampshire Department of Environmental Services, salt applicator course, 3 Dec 2014, slides 15
// and 16; State College Borough PA, Snow and Ice page. Values and addresses in vectors/minutes-per-mile.json,
// lb-per-mile.json, lane-scaling.json, catch-average.json and multiplier-rounding.json.
import { expect, test } from "vitest";
import { applicationRate, countForRate, minutesPerMile } from "#app/domain/calibration/application-rate.ts";
import { lbPerRevolution, weightPerRevolution } from "#app/domain/calibration/catch-weight.ts";
import { timedDischarge } from "#app/domain/calibration/timed-catch.ts";
import { lbPerLaneMile, lbPerMin, mph } from "#app/domain/units.ts";
import averages from "./vectors/catch-average.json";
import lanes from "./vectors/lane-scaling.json";
import rates from "./vectors/lb-per-mile.json";
import multipliers from "./vectors/minutes-per-mile.json";
import roundings from "./vectors/multiplier-rounding.json";

const chartTolerance = 0.003;

test("20 mph and 200 lb a minute lay 600 lb on a mile, as the handbook prints", () => {
  expect(minutesPerMile(20)).toBe(3);
  expect(applicationRate(lbPerMin(200), mph(20), 1)).toBe(600);
  expect(countForRate(lbPerLaneMile(600), 10, mph(20), 1)).toBe(20);
});

test.each(rates)("$id: the discharge lays the pounds on a mile that follow from the chart", ({ inputs, expected }) => {
  const rate = applicationRate(lbPerMin(inputs.discharge_lb_per_min), mph(inputs.speed_mph), 1);
  expect(Math.abs(rate / expected.lb_per_mile - 1)).toBeLessThanOrEqual(chartTolerance);
});

test.each(multipliers)("$id: minutes for a mile equal the printed chart within 0.3 %", ({ inputs, expected }) => {
  expect(Math.abs(minutesPerMile(inputs.speed_mph) / expected.multiplier - 1)).toBeLessThanOrEqual(chartTolerance);
});

// Common practice, no published source: charts go on with two decimals.
test.each([
  [35, 1.71],
  [40, 1.5],
  [45, 1.33],
])("at %i mph the %f minutes of common practice agree within 0.3 %%", (speedMph, minutes) => {
  expect(Math.abs(minutesPerMile(speedMph) / minutes - 1)).toBeLessThanOrEqual(chartTolerance);
});

test.each(roundings)(
  "$id: the rate is worked out with 60/mph and not with the rounded chart",
  ({ inputs, expected }) => {
    const rate = applicationRate(lbPerMin(inputs.discharge_lb_per_min), mph(inputs.speed_mph), 1);
    expect(rate).toBeCloseTo(expected.exact, 9);
    expect(Math.abs(rate - expected.with_2dp_multiplier)).toBeGreaterThan(0.5);
  },
);

test.each(lanes)("$id: a pass over two lanes lays half as much on each", ({ inputs, expected }) => {
  const discharge = lbPerMin(inputs.rate_lb_per_two_lane_mile / minutesPerMile(25));
  const published = expected.rate_lb_per_lane_mile ?? expected.rate_lb_per_mile;
  expect(applicationRate(discharge, mph(25), 2)).toBeCloseTo(published ?? NaN, 9);
});

test.each(averages)("$id: catches are averaged per revolution and not pooled", ({ inputs, expected }) => {
  const catches = inputs.samples.map(({ net_lb, revs }) => ({ revolutions: revs, grossLb: net_lb, tareLb: 0 }));
  catches.forEach((one, place) => expect(weightPerRevolution(one)).toBeCloseTo(expected.per_sample[place] ?? NaN, 9));
  expect(Math.abs(lbPerRevolution(catches) - expected.average_of_samples)).toBeLessThanOrEqual(0.0005);
  expect(Math.abs(lbPerRevolution(catches) - expected.pooled)).toBeGreaterThan(0.0025);
});

test("a catch of 30 seconds, the course's time, counts double in pounds a minute", () => {
  expect(timedDischarge({ grossLb: 37, tareLb: 2.165, seconds: 30 })).toBeCloseTo(69.67, 9);
});
