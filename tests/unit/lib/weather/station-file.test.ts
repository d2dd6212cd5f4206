import { parse } from "csv-parse/sync";
import { expect, test } from "vitest";
import type { WeatherUnits } from "#app/lib/weather/observation.ts";
import { readStationFile } from "#app/lib/weather/station-file.ts";

function read(text: string, units: WeatherUnits = "ghcn") {
  return readStationFile(parse(text, { relax_column_count: true }), { units });
}

function codesOf({ problems }: Awaited<ReturnType<typeof read>>) {
  return problems.map(({ row, code, severity }) => `${severity} ${code} ${row ?? "file"}`);
}

const heads =
  '"STATION","DATE","LATITUDE","NAME","PRCP","PRCP_ATTRIBUTES","SNOW","SNOW_ATTRIBUTES","SNWD","SNWD_ATTRIBUTES","TMAX","TMAX_ATTRIBUTES","TMIN","TMIN_ATTRIBUTES"';
const first =
  '"USC00000001","2026-01-15","43.1","ALDERBROOK, NY US","   61",",,0,0700","  102",",,0","   25",",,0"," -178",",,0"," -233",",,0"';
const second =
  '"USC00000001","2026-01-16","43.1","ALDERBROOK, NY US","    0","T,,0,0700","    0","T,,0","   25",",,0","  278",",I,0","",""';

test("a daily-summaries file gives °F and inches, traces apart, flagged and empty values missing", async () => {
  const { stations, problems } = await read([heads, second, first].join("\r\n"));
  expect(problems).toEqual([]);
  const [station] = stations;
  expect(station?.stationId).toBe("USC00000001");
  expect(station?.days.map(({ day }) => day)).toEqual(["2026-01-15", "2026-01-16"]);
  expect(station?.days[0]?.tmaxF).toBeCloseTo(-0.04, 12);
  expect(station?.days[0]?.snowfallIn).toBeCloseTo(4.0157, 4);
  expect(station?.days[0]?.precipIn).toBeCloseTo(0.2402, 4);
  expect(station?.days[1]).toMatchObject({
    tmaxF: null,
    tminF: null,
    snowfallIn: 0,
    isSnowfallTrace: true,
    isPrecipTrace: true,
    isSnowDepthTrace: false,
  });
  expect(station?.tallies.TMAX).toMatchObject({ readCount: 1, failedCheckCount: 1 });
  expect(station?.tallies.TMIN).toMatchObject({ readCount: 1, blankCount: 1 });
});

test("the same file by station, without heads, gives the same days, and other elements are passed over", async () => {
  const byStation = [
    "USC00000001,20260115,TMAX,-178,,,0,0700",
    "USC00000001,20260115,TMIN,-233,,,0,0700",
    "USC00000001,20260115,TOBS,-200,,,0,0700",
    "USC00000001,20260115,SNOW,102,,,0,",
    "USC00000001,20260115,SNWD,25,,,0,",
    "USC00000001,20260115,PRCP,61,,,0,0700",
    "USC00000001,20260116,TMAX,278,,I,0,0700",
    "USC00000001,20260116,SNOW,0,T,,0,",
    "USC00000001,20260116,SNWD,25,,,0,",
    "USC00000001,20260116,PRCP,0,T,,0,0700",
  ].join("\n");
  const summaries = await read([heads, first, second].join("\n"));
  // The units that were chosen are not asked for here: such a file has one kind of units only.
  const found = await read(byStation, "standard");
  expect(found.problems).toEqual([]);
  expect(found.stations[0]?.days).toEqual(summaries.stations[0]?.days);
});

test("a file in °F and inches is read as such, and taken for archive units it is refused at its decimals", async () => {
  const text = [
    "STATION,DATE,PRCP,PRCP_ATTRIBUTES,SNOW,SNWD,TMAX,TMIN",
    "USC00000001,2026-01-15,0.24,,4.0,1,0,-10",
  ].join("\n");
  const standard = await read(text, "standard");
  expect(standard.problems).toEqual([]);
  expect(standard.stations[0]?.days[0]).toMatchObject({ tmaxF: 0, tminF: -10, snowfallIn: 4, precipIn: 0.24 });
  expect(codesOf(await read(text, "ghcn"))).toContain("error units-differ 2");
});

test("archive units taken for °F are refused where they can be no weather", async () => {
  expect(codesOf(await read([heads, first].join("\n"), "standard"))).toEqual([
    "error impossible 2",
    "error impossible 2",
    "error impossible 2",
    "check element-absent file",
  ]);
});

test("a file without flags, without snow and with the night warmer than the day is taken with three checks", async () => {
  const found = await read("STATION,DATE,TMAX,TMIN\nUSC00000001,2026-01-15,10,20\nUSC00000001,2026-01-16,30,20");
  expect(codesOf(found)).toEqual(["check no-flags file", "check element-absent file", "check min-above-max file"]);
  expect(found.problems[1]?.message).toContain("SNOW, SNWD, PRCP");
  expect(found.problems[2]?.message).toContain("on 2026-01-15.");
});

test("a changed date, a short identifier, a word and a contradiction are told by row, column and value", async () => {
  const found = await read(
    [
      heads,
      first,
      first.replace("2026-01-15", "1/15/2026"),
      first.replace("USC00000001", "USC1"),
      first.replace("2026-01-15", "2026-01-17").replace("  102", "much"),
      first.replace("  102", "  104"),
      "",
      first,
    ].join("\n"),
  );
  expect(found.problems.map(({ row, column, value, code }) => [row, column, value, code])).toEqual([
    [3, "DATE", "1/15/2026", "not-a-date"],
    [4, "STATION", "USC1", "not-a-station"],
    [5, "SNOW", "much", "not-a-number"],
    [6, "SNOW", "104", "contradicted"],
    [8, "SNOW", "102", "contradicted"],
    [null, null, null, "element-absent"],
  ]);
  expect(found.stations[0]?.days[0]?.snowfallIn).toBeNull();
  expect(found.stations[0]?.days[0]?.tmaxF).toBeCloseTo(-0.04, 12);
});

test("several stations come apart, and 21 are refused", async () => {
  const rows = (count: number) =>
    Array.from({ length: count }, (_, place) => `USC000000${10 + place},20260115,TMAX,0,,,0,`).join("\n");
  expect((await read(rows(2))).stations.map(({ stationId }) => stationId)).toEqual(["USC00000010", "USC00000011"]);
  expect(codesOf(await read(rows(21)))).toEqual(["error too-many-stations file"]);
});

test("nothing, heads alone, heads twice and heads of something else are refused as a whole", async () => {
  expect(codesOf(await read(""))).toEqual(["error empty file"]);
  expect(codesOf(await read(heads))).toEqual(["error only-heads file"]);
  expect(codesOf(await read(`STATION,DATE,TMAX,tmax\n`))).toEqual(["error doubled-columns file"]);
  expect(codesOf(await read("season,lane_miles\n2025-26,100"))).toEqual(["error other-columns file"]);
  expect(codesOf(await read("STATION,DATE,TAVG\nUSC00000001,2026-01-15,0"))).toEqual(["error other-columns file"]);
});

test("300 bad rows list 200 problems and count the rest", async () => {
  const rows = Array.from({ length: 300 }, () => "USC00000001,2026-13-01,10,20");
  const { problems } = await read(["STATION,DATE,TMAX,TMIN", ...rows].join("\n"));
  expect(problems).toHaveLength(201);
  expect(problems.at(-1)).toMatchObject({ code: "more-problems", severity: "error" });
  expect(problems.at(-1)?.message).toContain("101 more");
});

test("records that come one by one are read like a list", async () => {
  async function* slowly() {
    for (const record of [["USC00000001", "20260115", "TMAX", "0", "", "", "0", ""]]) yield record;
  }
  const { stations } = await readStationFile(slowly(), { units: "ghcn" });
  expect(stations[0]?.days[0]?.tmaxF).toBe(32);
});
