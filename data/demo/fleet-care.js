import { addDays } from "./calendar.js";
import { quillbrook } from "./quillbrook.js";
import { createRandom } from "./random.js";

/** Who carries what, and the work done on trucks: what makes a calibration due besides the calendar. */
export function makeFleetCare(seed, { towns, trucks, materials, people, calibrations }) {
  const truck_material = [];
  const truck_work = [];
  for (const town of towns) {
    const own = materials.filter((row) => row.town_id === town.row.id);
    const mechanic = people.find((person) => person.town_id === town.row.id);
    for (const truck of trucks.filter((row) => row.town_id === town.row.id)) {
      const random = createRandom(seed, "care", town.row.name, truck.unit_number);
      const tests = calibrations.filter((row) => row.truck_id === truck.id);
      const isWritten = town.row.name === quillbrook;
      for (const material of carried(random, truck, own, tests, isWritten)) {
        // A new supplier in September: whoever weighed before that has to weigh again.
        const isNew = !isWritten && material.kind === "salt" && random.chance(0.05);
        const sinceOn = isNew ? addDays("2026-09-14", random.integer(0, 60)) : null;
        truck_material.push({ truck_id: truck.id, material_id: material.id, since_on: sinceOn });
      }
      for (const work of isWritten ? writtenWork(truck) : drawnWork(random)) {
        truck_work.push({
          client_ref: random.uuid(),
          town_id: town.row.id,
          truck_id: truck.id,
          ...work,
          created_by_id: mechanic.id,
          created_at: `${work.done_on} 20:30:00.000`,
        });
      }
    }
  }
  return { truck_material, truck_work };
}

function carried(random, truck, materials, tests, isWritten) {
  const wasWeighed = (material) => tests.some((row) => row.material_id === material.id);
  if (truck.spreader_kind === "liquid-tanks") return materials.filter(({ kind }) => kind === "brine");
  // Truck 9 of Quillbrook takes mix in a pinch and was never weighed with it.
  if (isWritten) return materials.filter((row) => row.kind === "salt" || wasWeighed(row) || truck.unit_number === "9");
  return materials.filter((row) => {
    if (row.kind === "salt" || wasWeighed(row)) return true;
    return row.kind === "mix" ? random.chance(0.3) : row.kind === "sand" && random.chance(0.15);
  });
}

const notes = {
  gate: ["new gate slide", "gate straightened after a knock", "scale on the gate renewed"],
  hydraulics: ["pump rebuilt", "flow control valve replaced", "new motor on the auger"],
  feed: ["chain tightened, two links out", "auger flights welded", "new belt"],
  controller: ["controller reset and set up anew", "speed sensor replaced"],
};

function drawnWork(random) {
  const count = random.pick([0, 0, 0, 0, 1, 1, 2]);
  return Array.from({ length: count }, () => {
    const part = random.pick(Object.keys(notes));
    return { done_on: addDays("2024-08-01", random.integer(0, 840)), part, note: random.pick(notes[part]) };
  });
}

function writtenWork({ unit_number }) {
  if (unit_number === "11") {
    return [{ done_on: "2026-09-10", part: "hydraulics", note: "new motor on the auger, hoses renewed" }];
  }
  if (unit_number === "15") return [{ done_on: "2026-10-22", part: "feed", note: "auger flights welded" }];
  return [];
}
