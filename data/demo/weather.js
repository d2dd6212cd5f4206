import { addDays } from "./calendar.js";
import { createRandom } from "./random.js";

/** Invented stations; their codes have the form of the public archive's and belong to nobody. */
export const demoStations = [
  { id: 1, code: "USC00990001", name: "Upper Tarn Mill", district: "Upper Tarn", coldF: -1, snow: 1 },
  { id: 2, code: "USC00990002", name: "Tarn Head Weir", district: "Upper Tarn", coldF: -2.5, snow: 1.1 },
  { id: 3, code: "USC00990003", name: "Lower Tarn Bridge", district: "Lower Tarn", coldF: 2, snow: 0.8 },
  { id: 4, code: "USC00990004", name: "Lakeside Pier", district: "Lakeside", coldF: 0.5, snow: 1.25 },
  { id: 5, code: "USC00990005", name: "Ridge Farm", district: "Ridge", coldF: -3, snow: 1.2 },
  { id: 6, code: "USC00990006", name: "Ridge Gap", district: "Ridge", coldF: -4, snow: 1.3 },
];

const firstWeatherYear = 2001;
const lastWeatherYear = 2025;
/** How hard the winters of the season figures were, in deviations; the earlier ones are drawn. */
const hardnessOf = { 2021: 0.15, 2022: -0.55, 2023: -1.2, 2024: 1.25, 2025: 0.5, 2026: 0.1 };

export function makeStations() {
  return demoStations.map(({ id, code, name }) => ({ id, code, name }));
}

/** Which station a town is held against: one of its district's. One town has none yet. */
export function stationOf(seed, town) {
  const random = createRandom(seed, "station", town.name);
  const own = demoStations.filter(({ district }) => district === town.district);
  return town.name === "Pipitmere" ? null : random.pick(own).id;
}

/** Every station's days from September to May, from 2001-02 to 2025-26. */
export function makeWeatherDays(seed) {
  const years = Array.from({ length: lastWeatherYear - firstWeatherYear + 1 }, (_, place) => firstWeatherYear + place);
  return demoStations.flatMap((station) =>
    years.flatMap((year) =>
      stationSeason(seed, station.code, year).map((weather) => ({
        station_id: station.id,
        day: weather.day,
        tmax_f: weather.tmaxF,
        tmin_f: weather.tminF,
        snowfall_in: weather.snowfallIn,
        snow_depth_in: weather.snowDepthIn,
        precip_in: weather.precipIn,
        has_trace_snowfall: weather.isTrace ? 1 : 0,
        has_trace_depth: 0,
        source: "service",
        fetched_at: "2026-07-02 06:00:00.000",
      })),
    ),
  );
}

/**
 * One station's season, 1 September to 31 May, in °F and inches; what nobody read is null. The same for the same seed.
 *
 * @returns {{ day: string, tmaxF: number | null, tminF: number | null, snowfallIn: number | null,
 *   snowDepthIn: number | null, precipIn: number | null, isTrace: boolean }[]}
 */
export function stationSeason(seed, code, year) {
  const station = demoStations.find((one) => one.code === code);
  if (station === undefined) return [];
  const region = createRandom(seed, "winter", year);
  const hardness = hardnessOf[year] ?? region.normal(0, 0.8);
  const random = createRandom(seed, "weather", code, year);
  const missingDepthShare = code === "USC00990006" && year === 2023 ? 0.16 : 0.006;
  const length = year % 4 === 3 ? 274 : 273;
  let warmth = 0;
  let depthIn = 0;
  return Array.from({ length }, (_, place) => {
    const day = addDays(`${year}-09-01`, place);
    // Warmest about 20 July, 43 days before the first day; coldest half a year on.
    const season = Math.cos((2 * Math.PI * (place + 43)) / 365.25);
    warmth = 0.7 * warmth + random.normal(0, 6.2);
    const tmaxF = Math.round(52.5 + 27.5 * season + station.coldF - 2.2 * hardness + warmth);
    const tminF = tmaxF - random.integer(8, 21);
    const meanF = (tmaxF + tminF) / 2;
    const isWet = random.chance(0.34 + 0.06 * hardness);
    const waterIn = isWet ? Math.min(1.6, Math.exp(random.normal(-1.9, 0.85))) : 0;
    const ratio = Math.max(6, 14 - 0.25 * (meanF - 18));
    const drawnIn = meanF < 33 ? waterIn * ratio * station.snow * 0.75 : 0;
    const snowfallIn = Math.round(drawnIn * 10) / 10;
    const meltIn = Math.max(0, tmaxF - 33) * 0.14;
    depthIn = Math.max(0, depthIn * 0.93 + snowfallIn * 0.62 - meltIn);
    const isRead = (share) => !random.chance(share);
    return {
      day,
      tmaxF: isRead(0.004) ? tmaxF : null,
      tminF: isRead(0.004) ? tminF : null,
      snowfallIn: isRead(0.006) ? snowfallIn : null,
      snowDepthIn: isRead(missingDepthShare) ? Math.round(depthIn) : null,
      precipIn: isRead(0.004) ? Math.round(waterIn * 100) / 100 : null,
      isTrace: snowfallIn === 0 && drawnIn > 0,
    };
  }).map((weather) => ({ ...weather, isTrace: weather.isTrace && weather.snowfallIn === 0 }));
}
