import { expect, test } from "vitest";
import { type CalibrationRow, type CatchRow, type CountRow, generateRegion } from "../../../data/demo/generate.js";

const region = generateRegion();
const truckById = new Map(region.truck.map((truck) => [truck.id, truck]));
const materialById = new Map(region.material.map((material) => [material.id, material]));
const countsById = byCalibration(region.calibration_count);
const catchesById = byCalibration(region.calibration_catch);
const salt = region.calibration.filter((test) => materialById.get(test.material_id)?.kind === "salt");
const mix = region.calibration.filter((test) => materialById.get(test.material_id)?.kind === "mix");

function byCalibration<Row extends CountRow | CatchRow>(rows: Row[]) {
  const grouped = new Map<number, Row[]>();
  for (const row of rows) {
    const group = grouped.get(row.calibration_id);
    if (group) group.push(row);
    else grouped.set(row.calibration_id, [row]);
  }
  return grouped;
}

function lbPerRev(catches: CatchRow[]) {
  const each = catches.map((one) => (one.gross_lb - one.tare_lb) / one.revolutions);
  return each.reduce((sum, value) => sum + value, 0) / each.length;
}

/** lb/rev × rev/min × 60/mph / lanes, at the truck's working setting and speed. */
function workingRate(calibration: CalibrationRow) {
  const truck = truckById.get(calibration.truck_id);
  const count = countsById.get(calibration.id)?.find((row) => row.setting === truck?.working_setting);
  if (!truck || !count) throw new Error(`calibration ${calibration.id} has no count at the working setting`);
  const revPerMin = (count.revolutions * 60) / count.seconds;
  const perLaneMile = (revPerMin * 60) / truck.working_speed_mph / truck.lanes_per_pass;
  return lbPerRev(catchesById.get(calibration.id) ?? []) * perLaneMile;
}

function quantile(values: number[], share: number) {
  return values.toSorted((one, other) => one - other)[Math.round(share * (values.length - 1))] ?? NaN;
}

/** Median working rate of each town in one season's tests, salt only. */
function townMedians(startYear: number) {
  const rates = new Map<number, number[]>();
  for (const test of salt) {
    if (test.tested_on < `${startYear}-07-01` || test.tested_on > `${startYear + 1}-06-30`) continue;
    rates.set(test.town_id, [...(rates.get(test.town_id) ?? []), workingRate(test)]);
  }
  return new Map([...rates].map(([townId, values]) => [townId, quantile(values, 0.5)]));
}

test("every calibration has counts at settings 1 to 8 that never fall, and one to four catches over their tare", () => {
  for (const { id } of region.calibration) {
    const counts = countsById.get(id) ?? [];
    expect(counts.map((row) => row.setting)).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
    const revolutions = counts.map((row) => row.revolutions);
    expect(revolutions).toEqual(revolutions.toSorted((one, other) => one - other));
    expect(revolutions.every((value) => value > 0 && (value * 4) % 1 === 0)).toBe(true);
    const catches = catchesById.get(id) ?? [];
    expect(catches.length).toBeGreaterThanOrEqual(1);
    expect(catches.length).toBeLessThanOrEqual(4);
    expect(catches.every((row) => row.gross_lb - row.tare_lb > 4 && row.gross_lb < 120)).toBe(true);
  }
});

test("no truck is tested twice with one material on one day", () => {
  const keys = region.calibration.map((test) => `${test.truck_id} ${test.material_id} ${test.tested_on}`);
  expect(new Set(keys).size).toBe(keys.length);
  expect(new Set(region.calibration.map((test) => test.client_ref)).size).toBe(keys.length);
});

test("truck, material and people of a calibration are of its own town", () => {
  const townOfPerson = new Map(region.user_account.map((person) => [person.id, person.town_id]));
  for (const test of region.calibration) {
    expect(truckById.get(test.truck_id)?.town_id).toBe(test.town_id);
    expect(materialById.get(test.material_id)?.town_id).toBe(test.town_id);
    expect(townOfPerson.get(test.created_by_id)).toBe(test.town_id);
    if (test.approved_by_id !== null) expect(townOfPerson.get(test.approved_by_id)).toBe(test.town_id);
  }
});

test("a test is entered after its day and approved after that; a few of the last autumn still wait", () => {
  for (const test of region.calibration) {
    expect(test.created_at.slice(0, 10) > test.tested_on).toBe(true);
    expect(test.approved_at === null).toBe(test.state === "ready");
    expect(test.approved_at === null || test.approved_at > test.created_at).toBe(true);
    expect((test.approved_at ?? test.created_at) < "2026-12-01").toBe(true);
  }
  const waiting = region.calibration.filter((test) => test.state === "ready");
  expect(waiting.length).toBeGreaterThan(10);
  expect(waiting.length / region.calibration.length).toBeLessThan(0.08);
  expect(waiting.every((test) => test.tested_on >= "2026-11-01")).toBe(true);
});

test("salt rates at the working setting run from about 180 to 680 lb per lane mile with a median of 325 to 355", () => {
  const rates = salt.map(workingRate);
  expect(Math.min(...rates)).toBeGreaterThan(150);
  expect(Math.max(...rates)).toBeLessThan(700);
  expect(quantile(rates, 0.05)).toBeLessThan(280);
  expect(quantile(rates, 0.95)).toBeGreaterThan(480);
  expect(quantile(rates, 0.5)).toBeGreaterThan(325);
  expect(quantile(rates, 0.5)).toBeLessThan(355);
});

test("between a quarter and two fifths of the towns have their median in the band of 250 to 300", () => {
  for (const startYear of [2023, 2024, 2025, 2026]) {
    const medians = [...townMedians(startYear).values()];
    const inBand = medians.filter((rate) => rate >= 250 && rate <= 300).length;
    expect(medians.length, `${startYear}`).toBeGreaterThan(50);
    expect(inBand / medians.length, `${startYear}`).toBeGreaterThan(0.25);
    expect(inBand / medians.length, `${startYear}`).toBeLessThan(0.4);
  }
});

test("trucks with ground-speed control lie nearer the band than the manual ones", () => {
  const rateOf = (control: string) =>
    quantile(salt.filter((test) => truckById.get(test.truck_id)?.control === control).map(workingRate), 0.5);
  expect(rateOf("manual") - rateOf("ground-speed")).toBeGreaterThan(30);
});

test("mix runs at about one and a half times the salt rate, through a wider gate that no truck exceeds", () => {
  expect(mix.length).toBeGreaterThan(100);
  expect(quantile(mix.map(workingRate), 0.5)).toBeGreaterThan(460);
  expect(quantile(mix.map(workingRate), 0.5)).toBeLessThan(620);
  for (const test of region.calibration) {
    expect((test.gate_opening_in * 16) % 1).toBe(0);
    expect(test.gate_opening_in).toBeLessThanOrEqual(truckById.get(test.truck_id)?.gate_max_in ?? 6);
  }
});

test("some hydraulics reach their limit, some catches scatter over 10 %, some trucks were never or lately tested", () => {
  const limited = [...countsById.values()].filter((rows) => rows[7]?.revolutions === rows[6]?.revolutions);
  expect(limited.length / countsById.size).toBeGreaterThan(0.1);
  expect(limited.length / countsById.size).toBeLessThan(0.3);

  const scattered = [...catchesById.values()].filter((rows) => variationPercent(rows) > 10);
  expect(scattered.length).toBeGreaterThan(20);
  expect(scattered.length / catchesById.size).toBeLessThan(0.08);

  const tested = new Set(salt.map((test) => test.truck_id));
  const never = region.truck.filter((truck) => !tested.has(truck.id) && truck.spreader_kind !== "liquid-tanks");
  expect(never.length).toBeGreaterThan(10);
  expect(never.length / region.truck.length).toBeLessThan(0.12);

  const late = salt.filter((test) => test.tested_on.slice(5) >= "12-01" || test.tested_on.slice(5) < "03-01");
  expect(late.length).toBeGreaterThan(50);
});

test("Quillbrook's eight trucks lay a median of 388 lb per lane mile at 25 mph, none in the band", () => {
  const town = region.town.find((one) => one.name === "Quillbrook");
  const trucks = region.truck.filter((truck) => truck.town_id === town?.id);
  expect(trucks.map((truck) => truck.unit_number)).toEqual(["4", "7", "9", "11", "12", "14", "15", "18"]);
  expect(trucks.every((truck) => truck.working_speed_mph === 25)).toBe(true);
  for (const startYear of [2025, 2026]) {
    const tests = salt.filter((test) => test.town_id === town?.id && test.tested_on.startsWith(`${startYear}-`));
    const rates = tests.map(workingRate).sort((one, other) => one - other);
    const middle = ((rates[rates.length / 2 - 1] ?? NaN) + (rates[rates.length / 2] ?? NaN)) / 2;
    expect(Math.abs(middle - 388), `${startYear}`).toBeLessThan(2);
    expect(Math.min(...rates), `${startYear}`).toBeGreaterThan(300);
  }
});

test("in autumn 2026 Quillbrook has tested trucks 7, 11, 14 and 18 only", () => {
  const town = region.town.find((one) => one.name === "Quillbrook");
  const tested = salt.filter((test) => test.town_id === town?.id && test.tested_on.startsWith("2026-"));
  const units = tested.map((test) => truckById.get(test.truck_id)?.unit_number);
  expect(units).toEqual(["7", "11", "14", "18"]);
});

function variationPercent(catches: CatchRow[]) {
  const each = catches.map((one) => (one.gross_lb - one.tare_lb) / one.revolutions);
  if (each.length < 2) return 0;
  const mean = each.reduce((sum, value) => sum + value, 0) / each.length;
  const squares = each.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return (100 * Math.sqrt(squares / (each.length - 1))) / mean;
}
