import { makeCalibrations } from "./calibrations.js";
import { makeFleetCare } from "./fleet-care.js";
import { makeGateChanges } from "./gate-changes.js";
import { makeMaterials, makeTrucks } from "./fleet.js";
import { makePeople } from "./people.js";
import { lastSeasonReview, makeSeasonFigures, makeSeasons, seasonYears } from "./seasons.js";
import { makeTowns } from "./towns.js";

/**
 * The whole invented region "Tarn Valley": one list of rows for each table, with their ids, columns named as in the
 * database. The same seed gives the same rows on every machine; the clock plays no part.
 *
 * Left to the loader, which knows them: the users' issuer and the jobs' times. `doubtful` is no table: it names the
 * towns whose last figures hold a planted slip, and the slip.
 */
export function generateRegion({ seed = 20261201 } = {}) {
  const towns = makeTowns(seed);
  const people = makePeople(seed, towns);
  const materials = makeMaterials(seed, towns);
  const trucks = makeTrucks(seed, towns);
  const coordinator = people.find((person) => person.role === "coordinator");
  const made = makeCalibrations(seed, { towns, trucks, materials, people });
  const changes = makeGateChanges(seed, { towns, trucks, materials, made });
  const review = [...lastSeasonReview(seed, towns)];
  return {
    town: towns.map((town) => town.row),
    user_account: people,
    material: materials,
    truck: trucks,
    season: makeSeasons(),
    season_figure: makeSeasonFigures(seed, { towns, people }),
    ...made,
    ...changes,
    ...makeFleetCare(seed, { towns, trucks, materials, people, calibrations: made.calibration }),
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
