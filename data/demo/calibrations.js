import { addDays, officeInstant } from "./calendar.js";
import { quillbrook, quillbrookTrucks } from "./quillbrook.js";
import { createRandom } from "./random.js";
import { catchRows, catchScatter, countRows, mechanicsFor } from "./readings.js";

const lastAutumn = 2026;

/** Every yard test of every truck, autumn 2022 to autumn 2026, as its raw readings. Rates are left to the program. */
export function makeCalibrations(seed, { towns, trucks, materials, people }) {
  const calibration = [];
  const calibration_count = [];
  const calibration_catch = [];

  function add(test, { counts, catches }) {
    const id = calibration.push({ id: calibration.length + 1, ...test });
    for (const row of counts) calibration_count.push({ calibration_id: id, ...row });
    for (const row of catches) calibration_catch.push({ calibration_id: id, ...row });
  }

  for (const town of towns) {
    const crew = crewOf(people, town.row.id);
    const salt = materials.find((row) => row.town_id === town.row.id && row.kind === "salt");
    const mix = materials.find((row) => row.town_id === town.row.id && row.kind === "mix");
    for (const truck of trucks) {
      if (truck.town_id !== town.row.id || truck.spreader_kind === "liquid-tanks") continue;
      const random = createRandom(seed, "calibrations", town.row.name, truck.unit_number);
      const tests = town.row.name === quillbrook ? writtenTests(random, truck) : drawnTests(random, town, truck);
      for (const test of tests) {
        add(testRow(random, test, { truck, material: salt, crew }), test);
        if (mix && random.chance(0.25)) {
          const mixTest = withMix(random, test, truck);
          add(testRow(random, mixTest, { truck, material: mix, crew }), mixTest);
        }
      }
    }
  }
  return { calibration, calibration_count, calibration_catch };
}

function crewOf(people, townId) {
  const own = people.filter((person) => person.town_id === townId);
  const director = own.find((person) => person.role === "director");
  return { tester: own.find((person) => person.role === "recorder") ?? director, director };
}

/** A truck's tests over the years: wear and new parts move it, and a director who sees it over the band shuts the gate a little. */
function drawnTests(random, town, truck) {
  if (random.chance(0.06)) return [];
  const isGroundSpeed = truck.control === "ground-speed";
  const drawn = Math.log(town.rateLbPerLaneMile) + random.normal(0, town.isInBand ? 0.06 : 0.13);
  // Control by ground speed holds a truck closer to what the driver set, and that is the band.
  const pulled = isGroundSpeed ? drawn + 0.45 * (Math.log(285) - drawn) : drawn;
  const mechanics = mechanicsFor(random, truck, Math.max(185, Math.min(600, Math.exp(pulled))));

  let wear = 1;
  let sixteenths = mechanics.gateSixteenths;
  const tests = [];
  for (let autumn = town.firstAutumn; autumn <= lastAutumn; autumn += 1) {
    wear = Math.max(0.88, Math.min(1.12, wear * Math.exp(random.normal(0.003, 0.03))));
    if (pulled > Math.log(330) && random.chance(0.2)) sixteenths = Math.max(20, sixteenths - 1);
    const isTested = random.chance(town.calibratedShare) && (truck.is_in_service === 1 || autumn < 2024);
    if (!isTested) continue;
    const lbPerRev = mechanics.lbPerRev * wear * (sixteenths / mechanics.gateSixteenths);
    tests.push({
      testedOn: testDay(random, autumn),
      mechanics,
      sixteenths,
      lbPerRev,
      counts: countRows(mechanics, truck, Math.exp(random.normal(0, 0.01))),
      catches: catchRows(mechanics, lbPerRev, catchScatter(random)),
    });
  }
  return tests;
}

function writtenTests(random, truck) {
  const { rates } = quillbrookTrucks.find((written) => written.unit === truck.unit_number);
  const mechanics = mechanicsFor(random, truck, rates[2025]);
  return Object.entries(rates).map(([autumn, rate]) => {
    const lbPerRev = (mechanics.lbPerRev * rate) / rates[2025];
    return {
      testedOn: addDays(`${autumn}-09-21`, random.integer(0, 25)),
      mechanics,
      sixteenths: mechanics.gateSixteenths,
      lbPerRev,
      counts: countRows(mechanics, truck, 1),
      // The scatter cancels out, so that the mean is the rate written down.
      catches: catchRows(mechanics, lbPerRev, [1.02, 0.98, 1]),
    };
  });
}

/** September to mid-November; one in nine late, which for the last autumn means not yet. */
function testDay(random, autumn) {
  const isLate = random.chance(0.11) && autumn < lastAutumn;
  const first = `${autumn}-09-08`;
  return addDays(first, isLate ? random.integer(90, 150) : random.integer(0, 68));
}

/** The same truck with mix, a few days on: a gate about an inch wider, and sand weighs more than salt. */
function withMix(random, test, truck) {
  const sixteenths = test.sixteenths + random.integer(10, 18);
  const lbPerRev = test.lbPerRev * (sixteenths / test.sixteenths) * 1.12;
  return {
    ...test,
    testedOn: addDays(test.testedOn, random.integer(0, 5)),
    sixteenths,
    lbPerRev,
    counts: countRows(test.mechanics, truck, Math.exp(random.normal(0, 0.01))),
    catches: catchRows(test.mechanics, lbPerRev, catchScatter(random)),
  };
}

function testRow(random, { testedOn, sixteenths }, { truck, material, crew }) {
  const createdOn = addDays(testedOn, random.integer(1, 2));
  const isWaiting = testedOn >= `${lastAutumn}-11-01` && random.chance(0.5);
  return {
    client_ref: random.uuid(),
    town_id: truck.town_id,
    truck_id: truck.id,
    material_id: material.id,
    tested_on: testedOn,
    gate_opening_in: sixteenths / 16,
    counts_from_calibration_id: null,
    state: isWaiting ? "ready" : "approved",
    upload_id: null,
    created_by_id: crew.tester.id,
    created_at: officeInstant(random, createdOn),
    approved_at: isWaiting ? null : officeInstant(random, addDays(createdOn, random.integer(1, 5))),
    approved_by_id: isWaiting ? null : crew.director.id,
  };
}
