import { readFileSync } from "node:fs";
import { parse } from "csv-parse/sync";
import { expect, test } from "vitest";
import { generateRegion } from "../../../data/demo/generate.js";

const figureColumns =
  "season,lane_miles,events,salt_tons,mix_tons,mix_salt_percent,sand_tons,brine_gal,material_cost_usd";
const readingColumns = "truck,material,tested_on,gate_opening_in,reading,setting,revolutions,seconds,gross_lb,tare_lb";

const region = generateRegion();
const quillbrook = region.town.find((town) => town.name === "Quillbrook");

function sampleText(name: string) {
  return readFileSync(new URL(`../../../data/demo/files/${name}`, import.meta.url), "utf8");
}

function sampleRows(name: string) {
  const rows: Record<string, string>[] = parse(sampleText(name), { columns: true });
  return rows;
}

test("the four files carry exactly the columns of their kind", () => {
  for (const [name, columns] of [
    ["quillbrook-season-2025-26.csv", figureColumns],
    ["quillbrook-season-2025-26-with-mistakes.csv", figureColumns],
    ["quillbrook-calibrations-2026.csv", readingColumns],
    ["quillbrook-calibrations-2026-with-mistakes.csv", readingColumns],
  ] as const) {
    expect(sampleText(name).split("\n")[0], name).toBe(columns);
  }
});

test("the good season file carries on where Quillbrook's earlier seasons left off", () => {
  const [row, ...others] = sampleRows("quillbrook-season-2025-26.csv");
  expect(others).toHaveLength(0);
  expect(row?.season).toBe("2025-26");
  const perLaneMileEvent = (saltLb: number, laneMiles: number, events: number) => saltLb / laneMiles / events;
  const earlier = region.season_figure
    .filter((figure) => figure.town_id === quillbrook?.id)
    .map((one) =>
      perLaneMileEvent(one.salt_lb + one.mix_lb * (one.mix_salt_share ?? 0), one.lane_miles, one.event_count),
    );
  expect(earlier).toHaveLength(4);
  const saltTons = Number(row?.salt_tons) + (Number(row?.mix_tons) * Number(row?.mix_salt_percent)) / 100;
  const own = perLaneMileEvent(saltTons * 2000, Number(row?.lane_miles), Number(row?.events));
  expect(own).toBeGreaterThan(0.9 * Math.min(...earlier));
  expect(own).toBeLessThan(1.1 * Math.max(...earlier));
});

test("the good calibration file brings trucks 12, 4 and 9 at 458, 349 and 375 lb per lane mile", () => {
  const rows = sampleRows("quillbrook-calibrations-2026.csv");
  const units = [...new Set(rows.map((row) => row.truck))];
  const rates = units.map((unit) => {
    const truck = region.truck.find((one) => one.town_id === quillbrook?.id && one.unit_number === unit);
    const own = rows.filter((row) => row.truck === unit);
    const catches = own.filter((row) => row.reading === "catch");
    const perRev = catches.map((row) => (Number(row.gross_lb) - Number(row.tare_lb)) / Number(row.revolutions));
    const count = own.find((row) => row.reading === "count" && Number(row.setting) === truck?.working_setting);
    const meanLbPerRev = perRev.reduce((sum, value) => sum + value, 0) / perRev.length;
    return [unit, Math.round((meanLbPerRev * Number(count?.revolutions) * 60) / 25)];
  });
  expect(rates).toEqual([
    ["12", 458],
    ["4", 349],
    ["9", 375],
  ]);
});

test("the file with mistakes names a truck the town has not, a day that does not exist and a tare above its gross", () => {
  const rows = sampleRows("quillbrook-calibrations-2026-with-mistakes.csv");
  const units = new Set(region.truck.filter((one) => one.town_id === quillbrook?.id).map((one) => one.unit_number));
  expect(rows.filter((row) => !units.has(row.truck ?? "")).map((row) => row.truck)).toEqual(["21", "21"]);
  expect(rows.some((row) => row.tested_on === "2026-02-31")).toBe(true);
  expect(rows.filter((row) => Number(row.tare_lb) > Number(row.gross_lb) && row.reading === "catch")).toHaveLength(1);
});
