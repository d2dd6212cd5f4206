// NOAA NCEI, GHCN-Daily readme, section III: tenths of °C, millimetres, tenths of millimetres. The round trip is
// counted through in full: United States stations report whole °F, tenths of an inch and whole inches, and the
// archive's units must give them back.
import { expect, test } from "vitest";
import { fromGhcnUnits, inReportedSteps, weatherDay } from "#app/domain/severity/weather-day.ts";
import vectors from "./vectors/weather-units.json";

test.each(vectors)("$id: archived values become the readings that were reported", ({ inputs, expected }) => {
  const day = weatherDay("2026-01-15", {
    TMAX: fromGhcnUnits("TMAX", inputs.TMAX),
    TMIN: fromGhcnUnits("TMIN", inputs.TMIN),
    SNOW: fromGhcnUnits("SNOW", inputs.SNOW),
    SNWD: fromGhcnUnits("SNWD", inputs.SNWD),
    PRCP: fromGhcnUnits("PRCP", inputs.PRCP),
  });
  expect(inReportedSteps(day)).toMatchObject({
    tmaxF: expected.tmaxF,
    tminF: expected.tminF,
    snowfallIn: expected.snowIn,
    snowDepthIn: expected.depthIn,
    precipIn: expected.prcpIn,
  });
});

test("every whole °F from -70 to 130 comes back from tenths of °C", () => {
  const reported = Array.from({ length: 201 }, (_, place) => place - 70);
  const found = reported.map((valueF) => {
    const tenthsC = Math.round(((valueF - 32) * 50) / 9);
    return inReportedSteps(weatherDay("2026-01-15", { TMAX: fromGhcnUnits("TMAX", tenthsC) })).tmaxF;
  });
  expect(found).toEqual(reported);
});

test("every tenth of an inch of snowfall to 69.9 and every inch of depth to 199 comes back from millimetres", () => {
  const tenths = Array.from({ length: 700 }, (_, place) => place / 10);
  const depths = Array.from({ length: 200 }, (_, place) => place);
  const fallen = tenths.map((valueIn) => fromGhcnUnits("SNOW", Math.round(valueIn * 25.4)));
  const lying = depths.map((valueIn) => fromGhcnUnits("SNWD", Math.round(valueIn * 25.4)));
  const day = (SNOW: number | undefined, SNWD: number | undefined) =>
    inReportedSteps(weatherDay("2026-01-15", { SNOW, SNWD }));
  expect(fallen.map((valueIn) => day(valueIn, undefined).snowfallIn)).toEqual(tenths);
  expect(lying.map((valueIn) => day(undefined, valueIn).snowDepthIn)).toEqual(depths);
});
