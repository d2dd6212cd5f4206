import { expect, test } from "vitest";
import { flagsOf, readObservation } from "#app/lib/weather/observation.ts";
import { stationDays } from "#app/lib/weather/station-days.ts";
import { isStationId } from "#app/lib/weather/station-id.ts";

const none = { measurement: "", quality: "" };

test("an attribute text gives its first two flags, and without the column there are none", () => {
  expect(flagsOf("T,,0,0700")).toEqual({ measurement: "T", quality: "" });
  expect(flagsOf(",I,W,2400")).toEqual({ measurement: "", quality: "I" });
  expect(flagsOf(undefined)).toEqual(none);
});

test("a padded 88 is 88 °F, and 889 tenths of °C cannot be", () => {
  expect(readObservation({ element: "TMAX", text: "  88", flags: none, units: "standard" })).toEqual({
    state: "read",
    reading: 88,
  });
  expect(readObservation({ element: "TMAX", text: "889", flags: none, units: "ghcn" })).toMatchObject({
    state: "unreadable",
    code: "impossible",
  });
});

test("blank, -9999, a quality flag and a presumed zero are four ways of missing", () => {
  const reasonOf = (text: string, flags = none) => readObservation({ element: "SNOW", text, flags, units: "ghcn" });
  expect(reasonOf("  ")).toEqual({ state: "missing", reason: "blank" });
  expect(reasonOf("-9999")).toEqual({ state: "missing", reason: "blank" });
  expect(reasonOf("102", { measurement: "", quality: "S" })).toEqual({ state: "missing", reason: "failed-check" });
  expect(reasonOf("0", { measurement: "P", quality: "" })).toEqual({ state: "missing", reason: "presumed-zero" });
});

test("a trace is told by its flag or by the letter, and of a temperature there is none", () => {
  const trace = { state: "read", reading: "trace" };
  expect(readObservation({ element: "SNOW", text: "0", flags: flagsOf("T,,0"), units: "ghcn" })).toEqual(trace);
  expect(readObservation({ element: "PRCP", text: "T", flags: none, units: "standard" })).toEqual(trace);
  expect(readObservation({ element: "TMAX", text: "T", flags: none, units: "standard" })).toMatchObject({
    code: "not-a-number",
  });
});

test("decimals in the archive's units, a comma and a negative depth are not taken", () => {
  const codeOf = (text: string, units: "ghcn" | "standard") =>
    readObservation({ element: "SNWD", text, flags: none, units });
  expect(codeOf("2.5", "ghcn")).toMatchObject({ state: "unreadable", code: "units-differ" });
  expect(codeOf("2,5", "standard")).toMatchObject({ state: "unreadable", code: "not-a-number" });
  expect(codeOf("-1", "standard")).toMatchObject({ state: "unreadable", code: "impossible" });
});

test("days come sorted, the same value twice counts once, and two values for one element leave it missing", () => {
  const station = stationDays("USC00000001");
  const add = (day: string, reading: number) => station.add(day, "TMAX", { state: "read", reading });
  expect([add("2026-01-16", 20), add("2026-01-15", 30), add("2026-01-15", 30)]).toEqual(["taken", "taken", "taken"]);
  expect([add("2026-01-16", 21), add("2026-01-16", 20)]).toEqual(["contradicted", "contradicted"]);
  const { days, tallies } = station.weather();
  expect(days.map(({ day, tmaxF }) => [day, tmaxF])).toEqual([["2026-01-15", 30]]);
  expect(tallies.TMAX).toMatchObject({ readCount: 1, contradictedCount: 1 });
});

test("identifiers have 11 characters and begin with a country's two letters", () => {
  expect(["USC00000001", "CAN00000001", "US1NYXX0001"].every(isStationId)).toBe(true);
  expect(["USC0000001", "usc00000001", "12C00000001", "USC00000001,USC00000002"].some(isStationId)).toBe(false);
});
