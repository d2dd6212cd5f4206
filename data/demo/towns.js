import { jointBody, townNames } from "./names.js";
import { createRandom } from "./random.js";

const districts = ["Upper Tarn", "Lower Tarn", "Lakeside", "Ridge"];

// How many towns of each size lie in each district, in the order above. Sizes and districts cut across each other:
// were one a copy of the other, publishing both would let a reader subtract one group from the other.
const sizeBands = [
  { lowMiles: 17, highMiles: 47, towns: [3, 3, 1, 5] },
  { lowMiles: 53, highMiles: 143, towns: [7, 7, 4, 6] },
  { lowMiles: 157, highMiles: 385, towns: [5, 5, 6, 4] },
  { lowMiles: 418, highMiles: 715, towns: [2, 3, 3, 1] },
];

// The towns with a part of their own in the scenario.
const placed = {
  Quillbrook: { district: "Upper Tarn", band: 1, laneMiles: 118, rateLbPerLaneMile: 388, saltLbPerLaneMileEvent: 420 },
  Fallowmere: { district: "Lower Tarn", band: 1, laneMiles: 86.5, rateLbPerLaneMile: 352 },
  [jointBody]: { district: "Ridge", band: 1, laneMiles: 64, rateLbPerLaneMile: 318 },
};
const jointTownCount = 3;

/**
 * The towns with the practice that marks each of them through all its figures, ids in the order of the names.
 *
 * `row` goes into the table; the rest is what the other parts of the demo draw from.
 */
export function makeTowns(seed) {
  const random = createRandom(seed, "towns");
  const free = random.shuffled(townNames.filter((name) => !(name in placed)));
  const drafts = Object.entries(placed).map(([name, place]) => ({ name, ...place, reportsThroughBody: false }));

  sizeBands.forEach((band, bandIndex) => {
    districts.forEach((district, districtIndex) => {
      const taken = drafts.filter((town) => town.band === bandIndex && town.district === district).length;
      for (let index = taken; index < band.towns[districtIndex]; index += 1) {
        drafts.push({
          name: free.pop(),
          district,
          band: bandIndex,
          laneMiles: sizeWithin(random, band),
          reportsThroughBody: bandIndex === 0 && district === "Ridge" && index < jointTownCount,
        });
      }
    });
  });

  const byName = drafts.sort((one, other) => (one.name < other.name ? -1 : 1));
  const bodyId = byName.findIndex((town) => town.name === jointBody) + 1;
  const unplaced = byName.map((town) => town.name).filter((name) => !(name in placed));
  const inBand = new Set(random.shuffled(unplaced).slice(0, 22));
  return byName.map((town, index) => ({
    ...practice(seed, town, inBand.has(town.name)),
    row: {
      id: index + 1,
      name: town.name,
      district: town.district,
      time_zone: "America/New_York",
      reports_through_town_id: town.reportsThroughBody ? bodyId : null,
      created_at: "2021-05-03 14:00:00.000",
    },
  }));
}

/** Lane miles, log-normal with a median near 130, cut to the band; halves, as towns report them. */
function sizeWithin(random, { lowMiles, highMiles }) {
  for (;;) {
    const laneMiles = Math.exp(random.normal(4.87, 1.05));
    if (laneMiles >= lowMiles && laneMiles <= highMiles) return Math.round(laneMiles * 2) / 2;
  }
}

function practice(seed, town, isInBand) {
  const random = createRandom(seed, "practice", town.name);
  const drawnRate = isInBand ? random.normal(277, 9) : Math.exp(random.normal(Math.log(368), 0.18));
  const rateLbPerLaneMile = town.rateLbPerLaneMile ?? drawnRate;
  // What a town spreads in a storm follows its rates, and its roads and habits besides.
  const drawnSalt = 352 * (rateLbPerLaneMile / 340) ** 0.6 * Math.exp(random.normal(0, 0.17));
  const usesMix = town.name === "Quillbrook" || random.chance(0.6);
  return {
    laneMiles: town.laneMiles,
    laneMileGrowth: random.normal(0.002, 0.003),
    rateLbPerLaneMile,
    isInBand,
    groundSpeedShare: isInBand ? 0.6 : 0.2,
    saltLbPerLaneMileEvent: town.saltLbPerLaneMileEvent ?? drawnSalt,
    mixShareOfWork: usesMix ? random.between(0.08, 0.55) : 0,
    mixSaltShare: usesMix ? Math.round(random.between(0.1, 0.3) * 20) / 20 : null,
    brineGalPerLaneMileEvent: random.chance(0.34) ? random.between(6, 22) : 0,
    sandTonsPerLaneMile: random.chance(0.3) ? random.between(0.2, 1.1) : 0,
    priceFactor: random.between(0.97, 1.03),
    reportsBrine: random.chance(0.85),
    reportsCost: random.chance(0.92),
    firstAutumn: random.pick([2022, 2022, 2022, 2022, 2022, 2022, 2022, 2023, 2023, 2024]),
    calibratedShare: random.chance(0.08) ? 0.4 : random.between(0.74, 0.97),
  };
}
