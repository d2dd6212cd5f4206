import { quillbrook, quillbrookSpeedMph, quillbrookTrucks } from "./quillbrook.js";
import { createRandom } from "./random.js";

const bodies = {
  "hopper-auger": [
    ["6-yard hopper", 6.5],
    ["8-yard hopper", 8.6],
    ["10-yard hopper", 10.8],
  ],
  conveyor: [
    ["8-yard belt body", 8.6],
    ["10-yard chain body", 10.8],
    ["12-yard chain body", 13],
  ],
  "tailgate-auger": [
    ["5-yard dump with tailgate spreader", 5.4],
    ["7-yard dump with tailgate spreader", 7.5],
  ],
  "liquid-tanks": [
    ["900-gallon tanks", 4.5],
    ["1,300-gallon tanks", 6.4],
  ],
};

/** What each town buys. Prices are those of the last season; earlier ones are in the season figures. */
export function makeMaterials(seed, towns) {
  return numbered(
    towns.flatMap((town) => {
      const random = createRandom(seed, "materials", town.row.name);
      const saltCents = Math.max(5800, Math.min(7600, Math.round((7250 * town.priceFactor) / 10) * 10));
      const rows = [{ name: "Salt", kind: "salt", salt_share: 1, price_cents_per_ton: saltCents }];
      if (town.mixSaltShare !== null) {
        const mixCents = mixCentsPerTon(saltCents, town.mixSaltShare);
        rows.push({ name: "Sand mix", kind: "mix", salt_share: town.mixSaltShare, price_cents_per_ton: mixCents });
      }
      if (town.sandTonsPerLaneMile > 0) {
        rows.push({ name: "Sand", kind: "sand", salt_share: 0, price_cents_per_ton: random.integer(125, 165) * 10 });
      }
      // Made in the town's own yard from its salt: no price of its own.
      if (town.brineGalPerLaneMileEvent > 0) {
        rows.push({ name: "Brine", kind: "brine", salt_share: 0.233, price_cents_per_ton: null });
      }
      return rows.map((row) => ({ town_id: town.row.id, ...row }));
    }),
  );
}

/** Sand at about $14 a ton, the salt in it at its own price, $3 for the mixing. */
export function mixCentsPerTon(saltCentsPerTon, saltShare) {
  return Math.round((saltCentsPerTon * saltShare + 1400 * (1 - saltShare) + 300) / 10) * 10;
}

/** One truck for 20 to 30 lane miles, never under two nor over 24. */
export function makeTrucks(seed, towns) {
  return numbered(
    towns.flatMap((town) => {
      if (town.row.name === quillbrook) return quillbrookFleet(seed, town);
      const random = createRandom(seed, "fleet", town.row.name);
      const truckCount = Math.max(2, Math.min(24, Math.round(town.laneMiles / random.between(20, 30))));
      const speedMph = random.pick([20, 22, 25, 25, 25, 28, 30]);
      let unit = random.pick([0, 0, 0, 20, 100, 300]);
      return Array.from({ length: truckCount }, (_, index) => {
        unit += random.pick([1, 1, 1, 2, 3]);
        const isTanker = town.brineGalPerLaneMileEvent > 0 && truckCount >= 6 && index === truckCount - 1;
        return truckRow(random, town, { unit: String(unit), speedMph, isTanker });
      });
    }),
  );
}

function truckRow(random, town, { unit, speedMph, isTanker }) {
  const kinds = ["hopper-auger", "hopper-auger", "conveyor", "conveyor", "tailgate-auger"];
  const spreaderKind = isTanker ? "liquid-tanks" : random.pick(kinds);
  const [body, capacityTons] = random.pick(bodies[spreaderKind]);
  const lanes = random.chance(0.18) ? 2 : 1;
  return {
    town_id: town.row.id,
    unit_number: unit,
    body,
    spreader_kind: spreaderKind,
    control: random.chance(town.groundSpeedShare) ? "ground-speed" : "manual",
    lanes_per_pass: lanes,
    // Two lanes at once take twice the material: such trucks drive slower and run at a higher setting.
    working_speed_mph: lanes === 2 ? Math.min(speedMph, 25) : speedMph,
    working_setting: lanes === 2 ? random.integer(4, 6) : random.pick([2, 3, 3, 3, 4, 4, 5]),
    working_rpm: random.pick([1500, 1500, 1600, 1800, 2000, null]),
    gate_max_in: random.pick([4, 4.5, 5, 6, 6, null]),
    capacity_tons: capacityTons,
    is_in_service: random.chance(0.96) ? 1 : 0,
    created_at: "2022-08-15 15:00:00.000",
  };
}

function quillbrookFleet(seed, town) {
  const random = createRandom(seed, "fleet", quillbrook);
  return quillbrookTrucks.map(({ unit, setting }) => ({
    ...truckRow(random, town, { unit, speedMph: quillbrookSpeedMph, isTanker: false }),
    control: "manual",
    lanes_per_pass: 1,
    working_speed_mph: quillbrookSpeedMph,
    working_setting: setting,
    working_rpm: 1500,
    gate_max_in: 6,
    is_in_service: 1,
  }));
}

function numbered(rows) {
  return rows.map((row, index) => ({ id: index + 1, ...row }));
}
