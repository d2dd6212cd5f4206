import { addDays, officeInstant } from "./calendar.js";
import { quillbrook } from "./quillbrook.js";
import { createRandom } from "./random.js";
import { catchRows, catchScatter } from "./readings.js";

const season = 2026;

/**
 * What came after the counts in autumn 2026: gates that were closed and weighed again with the same counts, controllers
 * tried at several speeds, and prewetting. Earlier seasons stay as they are, and with them every published edition.
 */
export function makeGateChanges(seed, { towns, trucks, materials, made }) {
  const { calibration, calibration_count, calibration_catch } = made;
  const calibration_verification = [];
  const calibration_liquid = [];
  const townById = new Map(towns.map((town) => [town.row.id, town]));
  const truckById = new Map(trucks.map((truck) => [truck.id, truck]));
  const kindById = new Map(materials.map((material) => [material.id, material.kind]));

  for (const test of calibration.filter((row) => row.tested_on >= `${season}-07-01` && row.state === "approved")) {
    const truck = truckById.get(test.truck_id);
    const town = townById.get(test.town_id);
    const random = createRandom(seed, "gate changes", town.row.name, truck.unit_number, test.material_id);
    const readings = {
      counts: calibration_count.filter((row) => row.calibration_id === test.id),
      catches: calibration_catch.filter((row) => row.calibration_id === test.id),
    };
    const working = workingRate(truck, readings);
    const target = kindById.get(test.material_id) === "salt" ? 280 : 505;
    const mayChange = town.row.name !== quillbrook && working > target * 1.12 && random.chance(0.14);
    if (mayChange) changeGate(random, { test, readings, working, target, made });
    if (truck.control === "ground-speed") calibration_verification.push(...speedRows(random, test, truck));
    if (town.brineGalPerLaneMileEvent > 0 && random.chance(0.35)) {
      calibration_liquid.push(prewetRow(random, test, truck, working));
    }
  }
  writtenChange({ towns, trucks, materials, made, random: createRandom(seed, "gate changes", quillbrook) });
  return { calibration_verification, calibration_liquid };
}

/** lb per lane mile at the working setting and speed. */
function workingRate(truck, { counts, catches }) {
  const count = counts.find((row) => row.setting === truck.working_setting);
  const lbPerRev = mean(catches.map((row) => (row.gross_lb - row.tare_lb) / row.revolutions));
  return ((count.revolutions * 60) / count.seconds) * lbPerRev * (60 / truck.working_speed_mph / truck.lanes_per_pass);
}

function mean(values) {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function changeGate(random, { test, readings, working, target, made }) {
  const before = Math.round(test.gate_opening_in * 16);
  const after = Math.max(8, Math.round((before * target) / working));
  if (after >= before) return;
  const [first] = readings.catches;
  const lbPerRev = mean(readings.catches.map((row) => (row.gross_lb - row.tare_lb) / row.revolutions));
  // The catch follows the gate roughly: a little more comes out than the opening alone would say.
  const changed = lbPerRev * (after / before) ** 0.93;
  const id = made.calibration.length + 1;
  const testedOn = addDays(test.tested_on, random.integer(1, 3));
  const enteredOn = addDays(testedOn, 1);
  made.calibration.push({
    ...test,
    id,
    client_ref: random.uuid(),
    tested_on: testedOn,
    gate_opening_in: after / 16,
    counts_from_calibration_id: test.id,
    created_at: officeInstant(random, enteredOn),
    approved_at: officeInstant(random, addDays(enteredOn, random.integer(1, 3))),
  });
  made.calibration_count.push(...readings.counts.map((row) => ({ ...row, calibration_id: id })));
  const mechanics = { catchTurns: first.revolutions, tareLb: first.tare_lb };
  made.calibration_catch.push(
    ...catchRows(mechanics, changed, catchScatter(random)).map((row) => ({ calibration_id: id, ...row })),
  );
}

/** Truck 7 of Quillbrook with mix: too much through the first gate, in the band through the second. */
function writtenChange({ towns, trucks, materials, made, random }) {
  const town = towns.find((one) => one.row.name === quillbrook);
  const truck = trucks.find((row) => row.town_id === town.row.id && row.unit_number === "7");
  const mix = materials.find((row) => row.town_id === town.row.id && row.kind === "mix");
  const salt = made.calibration.findLast((row) => row.truck_id === truck.id && row.tested_on.startsWith(`${season}-`));
  const counts = made.calibration_count.filter((row) => row.calibration_id === salt.id);
  const count = counts.find((row) => row.setting === truck.working_setting);
  const lbPerRevAt = (rate) => (rate * truck.working_speed_mph) / 60 / ((count.revolutions * 60) / count.seconds);
  const openings = [
    { sixteenths: 50, rate: 668, days: 2 },
    { sixteenths: 38, rate: 519, days: 4 },
  ];
  let firstId = null;
  for (const { sixteenths, rate, days } of openings) {
    const id = made.calibration.length + 1;
    const testedOn = addDays(salt.tested_on, days);
    made.calibration.push({
      ...salt,
      id,
      client_ref: random.uuid(),
      material_id: mix.id,
      tested_on: testedOn,
      gate_opening_in: sixteenths / 16,
      counts_from_calibration_id: firstId,
      created_at: officeInstant(random, addDays(testedOn, 1)),
      approved_at: officeInstant(random, addDays(testedOn, 2)),
    });
    firstId = id;
    made.calibration_count.push(...counts.map((row) => ({ ...row, calibration_id: id })));
    const mechanics = { catchTurns: 3, tareLb: 3.4 };
    made.calibration_catch.push(
      ...catchRows(mechanics, lbPerRevAt(rate), [1.012, 0.99, 0.998]).map((row) => ({ calibration_id: id, ...row })),
    );
  }
}

/** A controller told to lay one rate at three speeds; most are near it, a few are not. */
function speedRows(random, test, truck) {
  const commanded = random.pick([250, 275, 300]);
  const bias = random.chance(0.12) ? random.pick([-0.09, 0.1, 0.13]) : random.normal(0, 0.012);
  return [15, 25, 35].map((speedMph, index) => {
    const seconds = 60;
    const netLb = (commanded * (1 + bias + random.normal(0, 0.006)) * speedMph * truck.lanes_per_pass * seconds) / 3600;
    const tareLb = 38;
    return {
      calibration_id: test.id,
      position: index + 1,
      speed_mph: speedMph,
      commanded_lb_per_lane_mile: commanded,
      seconds,
      gross_lb: Math.round((netLb + tareLb) * 10) / 10,
      tare_lb: tareLb,
    };
  });
}

/** Eight to twelve gallons on a ton, from a catch of one minute. */
function prewetRow(random, test, truck, rateLbPerLaneMile) {
  const dryLbPerMin = Math.round((rateLbPerLaneMile * truck.working_speed_mph * truck.lanes_per_pass) / 60);
  return {
    calibration_id: test.id,
    position: 1,
    kind: "prewet",
    gallons: Math.round(((random.between(8, 12) * dryLbPerMin) / 2000) * 100) / 100,
    seconds: 60,
    speed_mph: null,
    lanes: null,
    dry_lb_per_min: dryLbPerMin,
  };
}
