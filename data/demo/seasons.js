import { addDays, officeInstant } from "./calendar.js";
import { mixCentsPerTon } from "./fleet.js";
import { quillbrook, quillbrookLastSeason } from "./quillbrook.js";
import { createRandom } from "./random.js";

/** Seasons with figures; the last of them is the one the walk-through closes. */
export const seasonYears = [2021, 2022, 2023, 2024, 2025];
const lastYear = 2025;

// Events of an ordinary town in each winter, and how the districts differ from it.
const winterEvents = { 2021: 24, 2022: 21, 2023: 18, 2024: 28, 2025: 25 };
const districtFactor = { "Upper Tarn": 1.04, "Lower Tarn": 0.86, Lakeside: 1.1, Ridge: 1.15 };
export const saltCentsPerTon = { 2021: 6050, 2022: 6500, 2023: 7100, 2024: 6900, 2025: 7250 };

/** Past seasons are closed; the one being reported and the coming one are open, whatever the day of the demo. */
export function makeSeasons() {
  return [...seasonYears, 2026].map((year) => ({
    start_year: year,
    figures_due_on: `${year + 1}-08-31`,
    opens_on: `${year}-09-01`,
    closes_on: year < lastYear ? `${year + 1}-12-31` : null,
  }));
}

/** Two to four towns send nothing each season; another handful each time. */
function missingTowns(seed, towns) {
  const random = createRandom(seed, "missing");
  const candidates = random.shuffled(
    towns.filter((town) => town.row.name !== "Fallowmere" && town.row.name !== quillbrook),
  );
  return new Map(
    seasonYears
      .filter((year) => year < lastYear)
      .map((year) => [year, new Set(candidates.splice(0, random.integer(2, 4)).map((town) => town.row.id))]),
  );
}

/**
 * What really happened in every town and season, before anybody wrote it down: the amounts that figures, storms and
 * stock all come from. Quillbrook's last season is among them, which is not reported yet.
 *
 * `random` goes on where the amounts left off; `special` is what the last season's review has in store.
 */
export function makeTruths(seed, towns) {
  const missing = missingTowns(seed, towns);
  const review = lastSeasonReview(seed, towns);
  return towns.flatMap((town) =>
    seasonYears
      .filter((year) => !missing.get(year)?.has(town.row.id))
      .map((year) => {
        const random = createRandom(seed, "season", town.row.name, year);
        const isUnreported = year === lastYear && town.row.name === quillbrook;
        const amounts = isUnreported ? quillbrookLastSeason : amountsOf(random, town, year);
        return {
          town,
          year,
          random,
          amounts,
          isUnreported,
          special: year === lastYear ? review.get(town.row.name) : undefined,
        };
      }),
  );
}

/** What every town sent in for every season, most of it long accepted. The last season is still under review. */
export function makeSeasonFigures({ truths, people, books }) {
  const reviewer = people.find((person) => person.role === "coordinator");
  const rows = [];
  for (const { town, year, random, amounts, isUnreported, special } of truths) {
    if (isUnreported) continue;
    const senderTownId = town.row.reports_through_town_id ?? town.row.id;
    const sender = people.find((person) => person.role === "director" && person.town_id === senderTownId);
    const state = special?.state ?? "accepted";
    const written = passage(random, year, { sender, reviewer, state });
    rows.push({
      id: rows.length + 1,
      town_id: town.row.id,
      season_start_year: year,
      version: state === "sent" ? 2 : 3,
      ...amounts,
      ...special?.change?.(amounts),
      ...books.get(`${town.row.id} ${year}`).extras,
      upload_id: null,
      ...written,
      review_note: special?.note ?? null,
    });
  }
  return rows;
}

/** One town's season in storage units. Tons are reported to a tenth, gallons to ten. */
function amountsOf(random, town, year) {
  const age = year - seasonYears[0];
  const laneMiles = Math.round(town.laneMiles * (1 + town.laneMileGrowth * (age - 4)) * 10) / 10;
  const drawnEvents = winterEvents[year] * districtFactor[town.row.district] * random.normal(1, 0.07);
  const eventCount = Math.max(14, Math.min(38, Math.round(drawnEvents)));
  // A weak trend downwards, a town's own luck, and a little more salt a storm in a hard winter.
  const hardness = (winterEvents[year] / 23) ** 0.15;
  const perLaneMileEvent = town.saltLbPerLaneMileEvent * 0.988 ** age * hardness * Math.exp(random.normal(0, 0.06));

  const straightTons = (perLaneMileEvent * laneMiles * eventCount) / 2000;
  const mixShare = town.mixShareOfWork * random.between(0.85, 1.1);
  const saltTons = tenths(straightTons * (1 - mixShare));
  // Where mix is laid instead of salt, about three times the weight goes down (common practice).
  const mixTons = tenths(straightTons * mixShare * 3);
  const sandTons = tenths(town.sandTonsPerLaneMile * laneMiles * (eventCount / 23) * random.between(0.8, 1.2));
  const drawnGal = town.brineGalPerLaneMileEvent * laneMiles * eventCount * random.between(0.8, 1.2);
  const brineGal = Math.round(drawnGal / 10) * 10;

  const saltCents = saltCentsPerTon[year] * town.priceFactor;
  const mixCents = mixTons === 0 ? 0 : mixTons * mixCentsPerTon(saltCents, town.mixSaltShare);
  const costCents = saltTons * saltCents + mixCents + sandTons * 1450 + brineGal * 14;
  return {
    lane_miles: laneMiles,
    event_count: eventCount,
    salt_lb: pounds(saltTons),
    mix_lb: pounds(mixTons),
    mix_salt_share: mixTons === 0 ? null : town.mixSaltShare,
    sand_lb: pounds(sandTons),
    brine_gal: brineGal > 0 || town.reportsBrine ? brineGal : null,
    material_cost_cents: town.reportsCost ? Math.round(costCents / 100) * 100 : null,
  };
}

export function tenths(tons) {
  return Math.round(tons * 10) / 10;
}

/** Tons to a tenth are whole multiples of 200 lb. */
export function pounds(tons) {
  return Math.round(tons * 10) * 200;
}

/** Written up after 30 June, sent by the end of August or a little late, looked at within three weeks. */
function passage(random, year, { sender, reviewer, state }) {
  const isLate = random.chance(0.1);
  const sentOn = addDays(`${year + 1}-07-06`, isLate ? random.integer(57, 80) : random.integer(0, 52));
  const isReviewed = state === "accepted" || state === "returned";
  return {
    state,
    created_at: officeInstant(random, addDays(sentOn, -random.integer(1, 8))),
    sent_at: officeInstant(random, sentOn),
    sent_by_id: sender.id,
    reviewed_at: isReviewed ? officeInstant(random, addDays(sentOn, random.integer(2, 20))) : null,
    reviewed_by_id: isReviewed ? reviewer.id : null,
  };
}

/**
 * The towns of the last season that the coordinator still has to deal with, by name.
 *
 * One slip is gross (a decimal point lost), two are small, three figures are sound and merely wait, one went back.
 */
export function lastSeasonReview(seed, towns) {
  const random = createRandom(seed, "review");
  const middling = towns.filter(
    (town) =>
      town.laneMiles > 50 &&
      town.laneMiles < 400 &&
      town.reportsCost &&
      !town.row.name.includes(" ") &&
      town.row.name !== quillbrook &&
      town.row.name !== "Fallowmere",
  );
  const [grown, cheap, returned, ...waiting] = random.shuffled(middling).map((town) => town.row.name);
  return new Map([
    ["Fallowmere", { state: "sent", slip: "salt ten times too large", change: tenfoldSalt }],
    [grown, { state: "sent", slip: "lane miles up by three tenths", change: moreLaneMiles }],
    [cheap, { state: "sent", slip: "cost a tenth of what it was", change: tenthOfCost }],
    [
      returned,
      {
        state: "returned",
        note: "Does the sand figure include the pile at the north yard? Please check and send again.",
      },
    ],
    ...waiting.slice(0, 3).map((name) => [name, { state: "sent" }]),
  ]);
}

function tenfoldSalt({ salt_lb }) {
  return { salt_lb: salt_lb * 10 };
}
function moreLaneMiles({ lane_miles }) {
  return { lane_miles: Math.round(lane_miles * 13) / 10 };
}
function tenthOfCost({ material_cost_cents }) {
  return { material_cost_cents: Math.round(material_cost_cents / 1000) * 100 };
}
