import { expect, test } from "vitest";
import { generateRegion } from "../../../data/demo/generate.js";

const region = generateRegion();
const truckById = new Map(region.truck.map((truck) => [truck.id, truck]));
const materialById = new Map(region.material.map((material) => [material.id, material]));
const calibrationById = new Map(region.calibration.map((calibration) => [calibration.id, calibration]));

test("every truck carries a material of its own town, and all that it was weighed with", () => {
  const pairs = new Set(region.truck_material.map((row) => `${row.truck_id} ${row.material_id}`));
  expect(pairs.size).toBe(region.truck_material.length);
  for (const row of region.truck_material) {
    expect(materialById.get(row.material_id)?.town_id).toBe(truckById.get(row.truck_id)?.town_id);
  }
  const carrying = new Set(region.truck_material.map((row) => row.truck_id));
  expect(region.truck.every((truck) => carrying.has(truck.id))).toBe(true);
  for (const row of region.calibration) expect(pairs.has(`${row.truck_id} ${row.material_id}`)).toBe(true);
});

test("work is of the truck's town, before December 2026, and some of it came after the last calibration", () => {
  expect(region.truck_work.length).toBeGreaterThan(80);
  const after = region.truck_work.filter((work) => {
    expect(work.town_id).toBe(truckById.get(work.truck_id)?.town_id);
    expect(work.done_on < "2026-12-01").toBe(true);
    const days = region.calibration.filter((row) => row.truck_id === work.truck_id).map((row) => row.tested_on);
    return days.length > 0 && days.every((day) => day < work.done_on);
  });
  expect(after.length).toBeGreaterThan(10);
});

test("gates changed in autumn 2026 take over the counts of the earlier opening, which was wider", () => {
  const changed = region.calibration.filter((row) => row.counts_from_calibration_id !== null);
  expect(changed.length).toBeGreaterThan(15);
  const countsOf = (id: number) =>
    region.calibration_count
      .filter((row) => row.calibration_id === id)
      .map(({ setting, revolutions, seconds }) => [setting, revolutions, seconds]);
  for (const row of changed) {
    const before = calibrationById.get(row.counts_from_calibration_id ?? 0);
    expect(before?.truck_id).toBe(row.truck_id);
    expect(before?.material_id).toBe(row.material_id);
    expect((before?.tested_on ?? "") < row.tested_on).toBe(true);
    expect(before?.gate_opening_in ?? 0).toBeGreaterThan(row.gate_opening_in);
    expect(countsOf(row.id)).toEqual(countsOf(before?.id ?? 0));
    expect(row.tested_on >= "2026-07-01").toBe(true);
  }
});

test("controllers were tried on ground-speed trucks alone: most within 5 percent, some far off", () => {
  const errors = region.calibration_verification.map((row) => {
    const truck = truckById.get(calibrationById.get(row.calibration_id)?.truck_id ?? 0);
    expect(truck?.control).toBe("ground-speed");
    // Caught lb in a minute, times 60/mph over the lanes, is what it laid on a lane mile.
    const perLaneMile = ((row.gross_lb - row.tare_lb) * 60) / row.speed_mph / (truck?.lanes_per_pass ?? 1);
    return (100 * (perLaneMile - row.commanded_lb_per_lane_mile)) / row.commanded_lb_per_lane_mile;
  });
  const far = errors.filter((error) => Math.abs(error) > 5).length / errors.length;
  expect(errors.length).toBeGreaterThan(100);
  expect(far).toBeGreaterThan(0.05);
  expect(far).toBeLessThan(0.3);
});

test("prewetting runs at 8 to 12 gallons a ton", () => {
  expect(region.calibration_liquid.length).toBeGreaterThan(20);
  for (const row of region.calibration_liquid) {
    const galPerTon = (row.gallons * 60 * 2000) / row.seconds / (row.dry_lb_per_min ?? NaN);
    expect(galPerTon).toBeGreaterThan(7.8);
    expect(galPerTon).toBeLessThan(12.2);
  }
});

test("truck 7 of Quillbrook was over the band with mix at its first gate, and lies in it at the second", () => {
  const town = region.town.find((one) => one.name === "Quillbrook");
  const truck = region.truck.find((one) => one.town_id === town?.id && one.unit_number === "7");
  const tests = region.calibration.filter(
    (row) => row.truck_id === truck?.id && materialById.get(row.material_id)?.kind === "mix",
  );
  const rates = tests.map(({ id }) => {
    const count = region.calibration_count.find(
      (row) => row.calibration_id === id && row.setting === truck?.working_setting,
    );
    const catches = region.calibration_catch.filter((row) => row.calibration_id === id);
    const lbPerRev =
      catches.reduce((sum, row) => sum + (row.gross_lb - row.tare_lb) / row.revolutions, 0) / catches.length;
    return (((count?.revolutions ?? NaN) * 60) / (count?.seconds ?? NaN)) * lbPerRev * (60 / 25);
  });
  expect(rates).toHaveLength(2);
  expect(rates[0]).toBeGreaterThan(600);
  expect(rates[1]).toBeGreaterThan(450);
  expect(rates[1]).toBeLessThan(550);
});
