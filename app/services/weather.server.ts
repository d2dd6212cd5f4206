import { QueryTypes } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { seasonEnd, seasonStartYearOf } from "#app/domain/dates.ts";
import {
  type CutPoints,
  historyPointsOf,
  type SeverityCategory,
  severityCategory,
} from "#app/domain/severity/severity-category.ts";
import { severityQuality, type SeverityQuality } from "#app/domain/severity/severity-quality.ts";
import type { WeatherDay } from "#app/domain/severity/weather-day.ts";
import { type WinterCounts, winterCounts } from "#app/domain/severity/winter-counts.ts";
import {
  type BuildUpDay,
  severityBuildUp,
  type WinterSeverity,
  winterSeverity,
} from "#app/domain/severity/winter-severity.ts";
import { usualBuildUp, type UsualDay } from "#app/domain/severity/usual-build-up.ts";
import { now } from "#app/lib/clock.server.ts";
import { db } from "#app/lib/db.server.ts";
import { Station } from "#app/models/station.server.ts";
import { Town } from "#app/models/town.server.ts";

type DayRow = {
  day: string;
  tmaxF: number | null;
  tminF: number | null;
  snowfallIn: number | null;
  snowDepthIn: number | null;
  precipIn: number | null;
  hasTraceSnowfall: number;
  hasTraceDepth: number;
};

async function daysOf(stationId: number): Promise<WeatherDay[]> {
  const rows = await db.query<DayRow>(
    `SELECT day, tmax_f AS tmaxF, tmin_f AS tminF, snowfall_in AS snowfallIn, snow_depth_in AS snowDepthIn,
            precip_in AS precipIn, has_trace_snowfall AS hasTraceSnowfall, has_trace_depth AS hasTraceDepth
       FROM weather_day WHERE station_id = ? ORDER BY day`,
    { type: QueryTypes.SELECT, replacements: [stationId] },
  );
  return rows.map(({ hasTraceSnowfall, hasTraceDepth, ...day }) => ({
    ...day,
    isSnowfallTrace: Boolean(hasTraceSnowfall),
    isSnowDepthTrace: Boolean(hasTraceDepth),
    isPrecipTrace: false,
  }));
}

type StationWinters = {
  daysBySeason: Map<number, WeatherDay[]>;
  /** Oldest first; seasons of which nothing was reported are not there. */
  winters: WinterSeverity[];
  historyPoints: number[];
};

/** The season as far as it has been reported; a season that is over is known to its end. */
function reachOf(seasonStartYear: number, days: readonly WeatherDay[], today: string) {
  if (today > seasonEnd(seasonStartYear)) return { seasonStartYear };
  return { seasonStartYear, throughDay: days.at(-1)?.day ?? today };
}

function wintersFrom(days: readonly WeatherDay[], today: string): StationWinters {
  const daysBySeason = new Map<number, WeatherDay[]>();
  for (const weather of days) {
    const year = seasonStartYearOf(weather.day);
    const season = daysBySeason.get(year);
    if (season) season.push(weather);
    else daysBySeason.set(year, [weather]);
  }
  const winters = [...daysBySeason]
    .map(([year, season]) => winterSeverity(season, reachOf(year, season, today)))
    .filter((winter) => winter !== null);
  return { daysBySeason, winters, historyPoints: historyPointsOf(winters) };
}

/** Winters worked out before, kept while nothing of the station's weather changes and the day is the same. */
const kept = new Map<number, { fingerprint: string; winters: StationWinters }>();

async function wintersOf(stationId: number): Promise<StationWinters> {
  const today = now().toISOString().slice(0, 10);
  const [known] = await db.query<{ dayCount: number; newest: Date | null }>(
    "SELECT COUNT(*) AS dayCount, MAX(fetched_at) AS newest FROM weather_day WHERE station_id = ?",
    { type: QueryTypes.SELECT, replacements: [stationId] },
  );
  const fingerprint = `${today} ${known?.dayCount ?? 0} ${known?.newest?.getTime() ?? 0}`;
  const before = kept.get(stationId);
  if (before?.fingerprint === fingerprint) return before.winters;
  const winters = wintersFrom(await daysOf(stationId), today);
  kept.set(stationId, { fingerprint, winters });
  return winters;
}

/**
 * The winter index of each season for several towns, by their stations.
 *
 * @returns points by town id and season start year; only of seasons with enough readings, and running ones as far as
 *   they go. A town without a station has none.
 */
export async function awssiOfTowns(townIds: readonly number[]): Promise<Map<number, Map<number, number>>> {
  const towns = await Town.findAll({ attributes: ["id", "stationId"], where: { id: [...townIds] }, raw: true });
  const stationIds = [...new Set(towns.map(({ stationId }) => stationId).filter((id) => id !== null))];
  const byStation = new Map<number, Map<number, number>>();
  for (const stationId of stationIds) {
    const { winters } = await wintersOf(stationId);
    const sound = winters.filter((winter) => severityQuality(winter).isTotalSound);
    byStation.set(stationId, new Map(sound.map((winter) => [winter.seasonStartYear, winter.totalPoints])));
  }
  return new Map(
    towns.map(({ id, stationId }) => [id, (stationId === null ? undefined : byStation.get(stationId)) ?? new Map()]),
  );
}

export type TownWinter = {
  station: { code: string; name: string };
  severity: WinterSeverity;
  quality: SeverityQuality;
  category: { category: SeverityCategory; cutPoints: CutPoints } | null;
  /** Sound, finished winters of the station that the category rests on, this one left out. */
  historyCount: number;
  buildUp: BuildUpDay[];
  /** How its other winters gathered; null with too few of them. */
  usual: UsualDay[] | null;
  counts: WinterCounts;
  otherWinters: { seasonStartYear: number; totalPoints: number }[];
};

export type WinterView =
  | { state: "known"; winter: TownWinter }
  | { state: "no-station" }
  | { state: "no-weather"; station: { code: string; name: string } };

/** One station's winter. */
export async function stationWinter(station: Station, seasonStartYear: number): Promise<WinterView> {
  const { code, name } = station;
  const { daysBySeason, winters, historyPoints } = await wintersOf(station.id);
  const severity = winters.find((winter) => winter.seasonStartYear === seasonStartYear);
  const days = daysBySeason.get(seasonStartYear);
  if (!severity || !days) return { state: "no-weather", station: { code, name } };
  const quality = severityQuality(severity);
  const today = now().toISOString().slice(0, 10);
  const others = winters.filter(
    (winter) => winter.seasonStartYear !== seasonStartYear && winter.isOver && severityQuality(winter).isTotalSound,
  );
  return {
    state: "known",
    winter: {
      station: { code, name },
      severity,
      quality,
      // A winter that is still running, or has gaps, is not classed: it would be called mild for what is not there.
      category: severity.isOver && quality.isTotalSound ? severityCategory(severity.totalPoints, historyPoints) : null,
      historyCount: others.length,
      buildUp: severityBuildUp(days, reachOf(seasonStartYear, days, today)),
      usual: usualBuildUp(
        others.map(({ seasonStartYear: year }) =>
          severityBuildUp(daysBySeason.get(year) ?? [], { seasonStartYear: year }),
        ),
      ),
      counts: winterCounts(days, { from: severity.beginDay, to: severity.endDay }),
      otherWinters: others
        .map(({ seasonStartYear: year, totalPoints }) => ({ seasonStartYear: year, totalPoints }))
        .toReversed(),
    },
  };
}

/** The winter a town had in one season, by the station it is attached to. */
export async function getTownWinter(actor: TownActor, seasonStartYear: number): Promise<WinterView> {
  const town = await Town.findByPk(actor.townId, { attributes: ["stationId"], rejectOnEmpty: true });
  const station = town.stationId === null ? null : await Station.findByPk(town.stationId);
  return station ? stationWinter(station, seasonStartYear) : { state: "no-station" };
}
