import { addDays } from "./calendar.js";
import { mixCentsPerTon } from "./fleet.js";
import { createRandom } from "./random.js";
import { pounds, saltCentsPerTon, tenths } from "./seasons.js";
import { stationOf, stationSeason, demoStations } from "./weather.js";

const usualLbPerCubicYard = { salt: 2160, sand: 2800, mix: 2740 };
const suppliers = ["Tarn Minerals", "Ridgeway Aggregates", "Lakeside Salt Company", "county contract"];

/**
 * The books of every town and season: storms, what they took, and the piles, all from the same truth as the figures.
 *
 * The log explains what left the pile but for −4 to 12 %. Three things are wrong on purpose: Fallowmere's one delivery
 * of salt has lost its decimal point, a few towns forgot a delivery, and Quillbrook's last log is still on paper.
 *
 * @returns {{ storm: object[], storm_material: object[], stock_entry: object[], books: Map<string, object> }}
 */
export function makeBooks(seed, { truths, materials, people }) {
  const storm = [];
  const storm_material = [];
  const stock_entry = [];
  const books = new Map();
  const snowDays = new Map();
  for (const { town, year, amounts, isUnreported, special } of truths) {
    const random = createRandom(seed, "books", town.row.name, year);
    const own = materials.filter((material) => material.town_id === town.row.id);
    const writer = people.find((person) => person.town_id === town.row.id);
    const used = usedByMaterial(own, amounts);
    const days = stormDays(random, { seed, town, year, eventCount: amounts.event_count, snowDays });
    const shares = new Map(own.map(({ id }) => [id, unexplainedShare(random, special)]));
    const lines = isUnreported
      ? []
      : stormLines(random, { days, own, used, shares, amounts }).map((line) => ({ ...line, town, year, writer }));
    for (const { used: usedInStorm, ...line } of lines) {
      const id = storm.push({ id: storm.length + 1, ...stormRow(random, line) });
      for (const [materialId, taken] of usedInStorm)
        storm_material.push({ storm_id: id, material_id: materialId, ...taken });
    }
    const isSlipped = special?.slip?.startsWith("salt") === true;
    const solids = own.filter(({ kind }) => kind !== "brine" && used.get(idOf(own, kind)) > 0);
    for (const material of solids) {
      const entries = pileEntries(random, {
        material,
        year,
        usedLb: used.get(material.id),
        isSlipped: isSlipped && material.kind === "salt",
        priceFactor: town.priceFactor,
      });
      for (const entry of entries) {
        stock_entry.push({
          id: stock_entry.length + 1,
          client_ref: random.uuid(),
          town_id: town.row.id,
          season_start_year: year,
          material_id: material.id,
          ...entry,
          upload_id: null,
          created_by_id: writer.id,
          created_at: `${addDays(entry.day, 1)} 15:00:00.000`,
        });
      }
    }
    const stockUsed = solids.reduce(
      (sum, { id, kind }) => sum + used.get(id) * (isSlipped && kind === "salt" ? 10 : 1),
      0,
    );
    const logged = lines.flatMap((line) => [...line.used]).reduce((sum, [, { used_lb }]) => sum + (used_lb ?? 0), 0);
    const treated = lines.reduce((sum, line) => sum + line.laneMilesTreated, 0);
    books.set(`${town.row.id} ${year}`, {
      extras: {
        lane_miles_treated: lines.length === 0 ? null : Math.round(treated * 10) / 10,
        wetted_salt_lb: amounts.brine_gal > 0 ? pounds((amounts.salt_lb / 2000) * random.between(0.15, 0.55)) : null,
        stock_used_lb: stockUsed,
        stock_logged_lb: logged,
      },
    });
  }
  return { storm, storm_material, stock_entry, books };
}

function idOf(own, kind) {
  return own.find((material) => material.kind === kind)?.id;
}

/** Solids in lb, brine in gallons, by material id. */
function usedByMaterial(own, amounts) {
  const byKind = { salt: amounts.salt_lb, mix: amounts.mix_lb, sand: amounts.sand_lb, brine: amounts.brine_gal ?? 0 };
  return new Map(own.map(({ id, kind }) => [id, byKind[kind]]));
}

/** Most logs explain the pile to a few per cent; what still waits for review explains it well. */
function unexplainedShare(random, special) {
  const drawn = Math.max(-0.04, Math.min(0.12, random.normal(0.035, 0.035)));
  return special?.state === "sent" ? Math.min(drawn, 0.07) : drawn;
}

/** The days on which it stormed: days of snow at the town's station, and others where there were not enough. */
function stormDays(random, { seed, town, year, eventCount, snowDays }) {
  const stationId = stationOf(seed, town.row) ?? 1;
  const key = `${stationId} ${year}`;
  if (!snowDays.has(key)) {
    const code = demoStations.find(({ id }) => id === stationId)?.code;
    const season = stationSeason(seed, code, year);
    snowDays.set(
      key,
      season.filter(({ snowfallIn }) => snowfallIn !== null && snowfallIn >= 0.1),
    );
  }
  const snowed = random.shuffled(snowDays.get(key).filter(({ day }) => day >= `${year}-10-20`)).slice(0, eventCount);
  const taken = new Set(snowed.map(({ day }) => day));
  const more = [];
  while (snowed.length + more.length < eventCount) {
    const day = addDays(`${year}-11-20`, random.integer(0, 120));
    if (taken.has(day)) continue;
    taken.add(day);
    more.push({ day, snowfallIn: 0, tminF: random.integer(22, 31), tmaxF: random.integer(30, 36) });
  }
  return [...snowed, ...more].toSorted((one, other) => (one.day < other.day ? -1 : 1));
}

/** A storm for each day; together they took what the log says was taken, to a tenth of a ton. */
function stormLines(random, { days, own, used, shares, amounts }) {
  const weights = days.map(
    ({ snowfallIn }) => (0.5 + Math.min(8, snowfallIn ?? 0) / 3) * Math.exp(random.normal(0, 0.25)),
  );
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const lines = days.map((weather, place) => ({
    weather,
    startHour: random.integer(0, 11),
    lastedHours: random.integer(3, 11),
    passes: Math.max(1, Math.min(6, Math.round((weights[place] * days.length * 2.4) / total))),
    used: new Map(),
  }));
  for (const { id, kind } of own) {
    const loggedLb = used.get(id) * (1 - shares.get(id));
    if (loggedLb <= 0) continue;
    // Brine goes down before a storm, mix and sand in the colder ones.
    const share = kind === "salt" ? 1 : kind === "brine" ? 0.6 : 0.5;
    const chosen = lines.map((_line, place) => place).filter((place) => share === 1 || (place * 7) % 10 < share * 10);
    const sum = chosen.reduce((all, place) => all + weights[place], 0);
    for (const place of chosen) {
      const part = (loggedLb * weights[place]) / sum;
      const taken =
        kind === "brine"
          ? { used_lb: null, used_gal: Math.round(part / 10) * 10 }
          : { used_lb: pounds(tenths(part / 2000)), used_gal: null };
      if ((taken.used_lb ?? taken.used_gal) > 0) lines[place].used.set(id, taken);
    }
  }
  return lines.map((line) => ({
    ...line,
    laneMilesTreated: Math.round(amounts.lane_miles * line.passes * random.between(0.82, 1) * 10) / 10,
  }));
}

function stormRow(random, { town, year, writer, weather, startHour, lastedHours, passes, laneMilesTreated }) {
  const time = (hour) => `${weather.day} ${String(hour).padStart(2, "0")}:${random.pick(["00", "15", "30", "45"])}:00`;
  const isRain = (weather.snowfallIn ?? 0) === 0;
  return {
    town_id: town.row.id,
    season_start_year: year,
    started_at: time(startHour),
    ended_at: time(startHour + lastedHours),
    kind: isRain ? random.pick(["freezing-rain", "frost", "sleet"]) : weather.snowfallIn < 1 ? "light-snow" : "snow",
    pavement_temp_f: Math.max(4, Math.min(34, (weather.tminF ?? 22) + random.integer(2, 8))),
    passes,
    lane_miles_treated: laneMilesTreated,
    hours: lastedHours * random.integer(1, 4),
    created_by_id: writer.id,
    created_at: `${addDays(weather.day, 1)} 14:00:00.000`,
  };
}

/** Opening, deliveries and closing that come to what was used. Two closings in five were measured in cubic yards. */
function pileEntries(random, { material, year, usedLb, isSlipped, priceFactor }) {
  const cents = material.kind === "salt" ? saltCentsPerTon[year] * priceFactor : null;
  const centsPerTon =
    cents ??
    (material.kind === "mix" ? mixCentsPerTon(saltCentsPerTon[year] * priceFactor, material.salt_share) : 1450);
  const entry = (kind, day, quantityLb, more = {}) => ({
    kind,
    day,
    quantity_lb: quantityLb,
    typed_quantity: quantityLb / 2000,
    typed_unit: "ton",
    lb_per_cubic_yard: null,
    price_cents: null,
    supplier: "",
    ...more,
  });
  const opening = isSlipped ? 0 : pounds(tenths((usedLb / 2000) * random.between(0.12, 0.45)));
  const density = usualLbPerCubicYard[material.kind];
  const inYards = !isSlipped && random.chance(0.4);
  const drawnClosing = isSlipped ? 0 : (usedLb / 2000) * random.between(0.08, 0.4);
  const yards = Math.round((drawnClosing * 2000) / density);
  const closing = inYards ? yards * density : pounds(tenths(drawnClosing));
  const received = usedLb + closing - opening;
  const count = isSlipped ? 1 : Math.max(1, Math.min(6, Math.round(received / 2000 / 180)));
  const deliveries = Array.from({ length: count }, (_, place) => {
    const isLast = place === count - 1;
    const part = isLast ? received - (count - 1) * Math.floor(received / count) : Math.floor(received / count);
    const quantity = isSlipped ? part * 10 : part;
    return entry(
      "delivery",
      addDays(`${year}-10-20`, Math.round((150 * place) / count) + random.integer(0, 12)),
      quantity,
      {
        price_cents: Math.round((part / 2000) * centsPerTon),
        supplier: random.pick(suppliers),
      },
    );
  });
  return [
    entry("opening", `${year}-10-01`, opening),
    ...deliveries,
    entry(
      "closing",
      `${year + 1}-05-31`,
      closing,
      inYards ? { typed_quantity: yards, typed_unit: "cubic-yard", lb_per_cubic_yard: density } : {},
    ),
  ];
}

/** Roads by class and season; they come to the lane miles that the season really had. */
export function makeRoads(truths) {
  const classes = [
    ["Arterial", 0.18],
    ["Collector", 0.27],
  ];
  return truths.flatMap(({ town, year, amounts }) => {
    const parts = classes.map(([name, share]) => [name, Math.round(amounts.lane_miles * share * 10) / 10]);
    const rest = amounts.lane_miles - parts.reduce((sum, [, laneMiles]) => sum + laneMiles, 0);
    return [...parts, ["Local", Math.round(rest * 10) / 10]].map(([name, laneMiles]) => ({
      town_id: town.row.id,
      name,
      season_start_year: year,
      lane_miles: laneMiles,
    }));
  });
}

/** What each town paid for a ton in each season. Brine is made from its own salt. */
export function makePrices(truths, materials) {
  return truths.flatMap(({ town, year }) =>
    materials
      .filter((material) => material.town_id === town.row.id && material.kind !== "brine")
      .map((material) => {
        const saltCents = saltCentsPerTon[year] * town.priceFactor;
        const cents = { salt: saltCents, mix: mixCentsPerTon(saltCents, material.salt_share), sand: 1450 };
        return { material_id: material.id, season_start_year: year, cents_per_ton: Math.round(cents[material.kind]) };
      }),
  );
}
