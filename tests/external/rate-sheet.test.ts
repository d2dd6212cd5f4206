// Minnesota Snow and Ice Control Field Handbook for Snowplow Operators (Manual 2005-01 and revisions), calibration
// insert; New Hampshire Department of Environmental Services, salt applicator course, 3 Dec 2014, slides 15 and 16; State
// College Borough PA, Snow and Ice page. Values and addresses in vectors/lb-per-mile.json, lb-per-area.json and
// lane-scaling.json. Uncertainty: JCGM 100:2008 (GUM) 5.1, in vectors/uncertainty-combined.json.
import { expect, test } from "vitest";
import { rateSheet } from "#app/domain/calibration/rate-sheet.ts";
import areas from "./vectors/lb-per-area.json";
import lanes from "./vectors/lane-scaling.json";
import rates from "./vectors/lb-per-mile.json";
import combined from "./vectors/uncertainty-combined.json";

const chartTolerance = 0.003;

test.each(rates)(
  "$id: the sheet's row lays the pounds on a mile that follow from the chart",
  ({ inputs, expected }) => {
    const [row] = rateSheet({
      counts: [{ setting: 4, revolutions: inputs.discharge_lb_per_min / 10, seconds: 60 }],
      catches: [{ revolutions: 1, grossLb: 12, tareLb: 2 }],
      lanesPerPass: 2,
      speedsMph: [inputs.speed_mph],
      band: null,
    });
    const [cell] = row?.cells ?? [];
    expect(Math.abs((cell?.lbPerMile ?? NaN) / expected.lb_per_mile - 1)).toBeLessThanOrEqual(chartTolerance);
    expect(cell?.lbPerLaneMile).toBeCloseTo((cell?.lbPerMile ?? NaN) / 2, 9);
  },
);

test.each(areas)("$id: a timed catch of three runs lays the form's pounds on 1,000 sq ft", ({ inputs, expected }) => {
  // Three runs of 30 seconds, the course's protocol, with the printed mean.
  const timedCatches = [-2, 0, 2].map((offLb) => ({
    setting: 1,
    seconds: 30,
    grossLb: inputs.avg_discharge_lb_per_min / 2 + offLb + 3,
    tareLb: 3,
  }));
  const [row] = rateSheet({ timedCatches, lanesPerPass: 1, speedsMph: [inputs.speed_mph], band: null });
  const thousandsOfSqftInAMile = 5.28 * inputs.spread_width_ft;
  const lbPer1000Sqft = (row?.cells[0]?.lbPerMile ?? NaN) / thousandsOfSqftInAMile;
  expect(Math.abs(lbPer1000Sqft - expected.lb_per_1000_sqft)).toBeLessThanOrEqual(0.0006);
});

test.each(lanes)("$id: the sheet's rate over two lanes is the published rate for one", ({ inputs, expected }) => {
  // At 20 mph a mile takes 3 minutes.
  const lbPerMin = inputs.rate_lb_per_two_lane_mile / 3;
  const timedCatches = [{ setting: 1, seconds: 60, grossLb: lbPerMin, tareLb: 0 }];
  const [row] = rateSheet({ timedCatches, lanesPerPass: 2, speedsMph: [20], band: null });
  const published = expected.rate_lb_per_lane_mile ?? expected.rate_lb_per_mile;
  expect(row?.cells[0]?.lbPerMile).toBeCloseTo(inputs.rate_lb_per_two_lane_mile, 9);
  expect(row?.cells[0]?.lbPerLaneMile).toBeCloseTo(published ?? NaN, 9);
});

test("the ± of a cell is twice the catches' and the count's part of the reference, put together", () => {
  const vector = combined.find(({ id }) => id === "unc-combined");
  if (!vector?.expected.rel) throw new Error("the vector is missing");
  const { inputs } = vector;
  const [row] = rateSheet({
    counts: [{ setting: 4, revolutions: inputs.revs, seconds: inputs.time_s }],
    catches: inputs.weights_lb_per_rev.map((weightLb) => ({ revolutions: 1, grossLb: weightLb, tareLb: 0 })),
    lanesPerPass: 1,
    speedsMph: [25],
    band: null,
  });
  expect(row?.cells[0]?.lbPerLaneMile).toBeCloseTo(585.6, 9);
  expect(row?.cells[0]?.plusMinus).toBeCloseTo(
    2 * 585.6 * Math.hypot(vector.expected.rel.weigh, vector.expected.rel.revs),
    9,
  );
});
