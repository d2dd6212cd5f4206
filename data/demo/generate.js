import { makeBooks, makePrices, makeRoads } from "./books.js";
import { makeCalibrations } from "./calibrations.js";
import { makeMaterials, makeTrucks } from "./fleet.js";
import { makePassages } from "./passages.js";
import { makePeople } from "./people.js";
import { lastSeasonReview, makeSeasonFigures, makeSeasons, makeTruths, seasonYears } from "./seasons.js";
import { makeTowns } from "./towns.js";
import { makeStations, stationOf } from "./weather.js";

export const demoSeed = 20261201;

/**
 * The whole invented region "Tarn Valley": one list of rows for each table, with their ids, columns named as in the
 * database. The same seed gives the same rows on every machine; the clock plays no part.
 *
 * Left to the loader, which knows them: the users' issuer and the jobs' times; and the days of weather, which are many
 * and made by weather.js. `doubtful` is no table: it names the
 * towns whose last figures hold a planted slip, and the slip.
 */
export function generateRegion({ seed = demoSeed } = {}) {
  const towns = makeTowns(seed);
  const people = makePeople(seed, towns);
  const materials = makeMaterials(seed, towns);
  const trucks = makeTrucks(seed, towns);
  const coordinator = people.find((person) => person.role === "coordinator");
  const review = [...lastSeasonReview(seed, towns)];
  const truths = makeTruths(seed, towns);
  const { books, storm, storm_material, stock_entry } = makeBooks(seed, { truths, materials, people });
  const { figures, figure_version, figure_note } = makePassages(seed, makeSeasonFigures({ truths, people, books }));
  return {
    station: makeStations(),
    town: towns.map((town) => ({ ...town.row, station_id: stationOf(seed, town.row) })),
    user_account: people,
    material: materials,
    truck: trucks,
    season: makeSeasons(),
    season_figure: figures,
    figure_version,
    figure_note,
    road_class: makeRoads(truths),
    material_price: makePrices(truths, materials),
    storm,
    storm_material,
    stock_entry,
    ...makeCalibrations(seed, { towns, trucks, materials, people }),
    job: makeJobs(coordinator),
    doubtful: review.filter(([, { slip }]) => slip).map(([town, { slip }]) => ({ town, slip })),
  };
}

/** The past seasons' editions are published by the application itself: the demo asks for them and makes none. */
function makeJobs(coordinator) {
  return seasonYears.slice(0, -1).map((year, index) => ({
    id: index + 1,
    kind: "publish-edition",
    payload: JSON.stringify({ seasonStartYear: year, number: 1 }),
    dedupe_key: `publish-edition:${year}:1`,
    state: "ready",
    created_by_id: coordinator.id,
  }));
}
