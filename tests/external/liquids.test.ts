// New Hampshire best practice for anti-icing (NHDES and UNH T2, Pass the Salt 2018), gallons on 1,000 sq ft; lane mile of
// 63,360 sq ft (Minnesota Pollution Control Agency, Minnesota Stormwater Manual); prewet rate of the MaineDOT Treatment
// Recommendations, Table A. Flows worked out from the definitions. Values in vectors/prewet.json, direct-liquid.json and
// liquid-per-area.json.
import { expect, test } from "vitest";
import {
  directGalPerLaneMile,
  directGalPerMin,
  prewetGalPerMin,
  prewetGalPerTon,
} from "#app/domain/calibration/liquids.ts";
import directs from "./vectors/direct-liquid.json";
import areas from "./vectors/liquid-per-area.json";
import prewets from "./vectors/prewet.json";

test.each(prewets)("$id: the pump flow and the gallons a ton follow from each other", ({ inputs, expected }) => {
  const dryLbPerMin = inputs.discharge_lb_per_min;
  expect(prewetGalPerMin({ galPerTon: inputs.gal_per_ton, dryLbPerMin })).toBeCloseTo(expected.gal_per_min, 9);
  expect(prewetGalPerTon({ galPerMin: expected.gal_per_min, dryLbPerMin })).toBeCloseTo(inputs.gal_per_ton, 9);
});

test.each(directs)("$id: the nozzle flow for the gallons on a lane mile", ({ inputs, expected }) => {
  const { gal_per_lane_mile: galPerLaneMile, speed_mph: speedMph, lanes } = inputs;
  expect(directGalPerMin({ galPerLaneMile, speedMph, lanes })).toBeCloseTo(expected.gal_per_min, 3);
});

test.each(areas)(
  "$id: flow that wets 1,000 sq ft as advised lays the gallons on a lane mile",
  ({ inputs, expected }) => {
    const sqftPerMin = 63_360 / 3; // one lane at 20 mph, three minutes a mile
    inputs.gal_per_1000_sqft.forEach((galPer1000Sqft, place) => {
      const galPerMin = (galPer1000Sqft * sqftPerMin) / 1000;
      const found = directGalPerLaneMile({ galPerMin, speedMph: 20, lanes: 1 });
      expect(found).toBeCloseTo(expected.gal_per_lane_mile[place] ?? NaN, 9);
    });
  },
);
