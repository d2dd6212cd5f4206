import { Op, QueryTypes } from "sequelize";
import { z } from "zod";
import type { NetworkActor } from "#app/context.ts";
import { seasonEnd, seasonStart } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { db, inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { summariesClient } from "#app/lib/weather/daily-summaries.server.ts";
import { Station } from "#app/models/station.server.ts";
import { Town } from "#app/models/town.server.ts";
import { WeatherDay } from "#app/models/weather-day.server.ts";
import { recordAudit } from "./audit.server.ts";
import { type JobLine, listJobs, queueJob } from "./jobs.server.ts";
import { stationWinter, type WinterView } from "./weather.server.ts";

export type StationLine = {
  id: number;
  code: string;
  name: string;
  townNames: string[];
  /** Of the season asked for. */
  dayCount: number;
  lastDay: string | null;
  winter: WinterView;
};

export type StationsView = {
  stations: StationLine[];
  townsWithout: { id: number; name: string }[];
  towns: { id: number; name: string; stationId: number | null }[];
  jobs: JobLine[];
  /** Whether a weather service is set up to ask. */
  hasService: boolean;
};

/** Every station with its towns and what is known of one season there. */
export async function listStations(_actor: NetworkActor, seasonStartYear: number): Promise<StationsView> {
  const [stations, towns, days, jobs] = await Promise.all([
    Station.findAll({ order: [["name", "ASC"]] }),
    Town.findAll({ attributes: ["id", "name", "stationId"], order: [["name", "ASC"]], raw: true }),
    db.query<{ stationId: number; dayCount: number; lastDay: string }>(
      `SELECT station_id AS stationId, COUNT(*) AS dayCount, MAX(day) AS lastDay FROM weather_day
        WHERE day BETWEEN ? AND ? GROUP BY station_id`,
      { type: QueryTypes.SELECT, replacements: [seasonStart(seasonStartYear), seasonEnd(seasonStartYear)] },
    ),
    listJobs("fetch-weather", 8),
  ]);
  const lines: StationLine[] = [];
  for (const station of stations) {
    const known = days.find(({ stationId }) => stationId === station.id);
    lines.push({
      id: station.id,
      code: station.code,
      name: station.name,
      townNames: towns.filter(({ stationId }) => stationId === station.id).map(({ name }) => name),
      dayCount: known?.dayCount ?? 0,
      lastDay: known?.lastDay ?? null,
      winter: await stationWinter(station, seasonStartYear),
    });
  }
  return {
    stations: lines,
    townsWithout: towns.filter(({ stationId }) => stationId === null).map(({ id, name }) => ({ id, name })),
    towns: towns.map(({ id, name, stationId }) => ({ id, name, stationId })),
    jobs,
    hasService: env.weatherUrl !== null,
  };
}

/** Add a station. @returns false when there is one of that code */
export async function addStation(actor: NetworkActor, station: { code: string; name: string }): Promise<boolean> {
  try {
    await inTransaction(async (transaction) => {
      const created = await Station.create(station, { transaction });
      await recordAudit(
        actor,
        { action: "station.add", entity: "station", entityId: created.id, detail: station },
        transaction,
      );
    });
    return true;
  } catch (error) {
    if (isDuplicate(error)) return false;
    throw error;
  }
}

/** Attach a town to a station, or to none. @throws 404 when either is not there */
export async function attachTown(actor: NetworkActor, townId: number, stationId: number | null): Promise<void> {
  await inTransaction(async (transaction) => {
    const town = await Town.findByPk(townId, { transaction });
    if (!town) throw notFound("town");
    if (stationId !== null && !(await Station.findByPk(stationId, { transaction }))) throw notFound("station");
    const before = town.stationId;
    await town.update({ stationId }, { transaction });
    await recordAudit(
      actor,
      { action: "town.attach-station", entity: "town", entityId: townId, townId, detail: { before, stationId } },
      transaction,
    );
  });
}

/**
 * Ask for a station's weather of one season; the worker fetches it.
 *
 * @param clientRef - named by the form: asking twice with the same name asks once
 * @throws 404 when the station is not there
 */
export async function askForWeather(
  actor: NetworkActor,
  given: { stationId: number; seasonStartYear: number; clientRef: string },
): Promise<void> {
  const { stationId, seasonStartYear, clientRef } = given;
  await inTransaction(async (transaction) => {
    if (!(await Station.findByPk(stationId, { transaction }))) throw notFound("station");
    const payload = { stationId, seasonStartYear };
    await queueJob(
      { kind: "fetch-weather", payload, dedupeKey: `fetch-weather:${clientRef}`, createdById: actor.userId },
      transaction,
    );
  });
}

const Payload = z.object({ stationId: z.number().int(), seasonStartYear: z.number().int() });

/**
 * Fetch a station's season from the weather service and put it in place of what was fetched before. Days uploaded from
 * a file stay where the service has none. Safe to run twice.
 *
 * @throws Error with a sentence for the coordinator when the service gives nothing usable; nothing is then changed
 */
export async function fetchQueuedWeather(payload: unknown): Promise<void> {
  const { stationId, seasonStartYear } = Payload.parse(payload);
  if (env.weatherUrl === null) throw new Error("No weather service is set up. Upload the station's file.");
  const station = await Station.findByPk(stationId, { rejectOnEmpty: true });
  const today = now().toISOString().slice(0, 10);
  const question = {
    stationId: station.code,
    seasonStartYear,
    ...(today >= seasonStart(seasonStartYear) && today <= seasonEnd(seasonStartYear) ? { throughDay: today } : {}),
  };
  const reply = await summariesClient({ fetch, baseUrl: env.weatherUrl }).season(question);
  if (!reply.ok) throw new Error(reply.message);
  const fetchedAt = now();
  const rows = reply.weather.days.map((weather) => ({
    stationId,
    day: weather.day,
    tmaxF: weather.tmaxF,
    tminF: weather.tminF,
    snowfallIn: weather.snowfallIn,
    snowDepthIn: weather.snowDepthIn,
    precipIn: weather.precipIn,
    hasTraceSnowfall: weather.isSnowfallTrace,
    hasTraceDepth: weather.isSnowDepthTrace,
    source: "service",
    fetchedAt,
  }));
  await inTransaction(async (transaction) => {
    const day = { [Op.between]: [seasonStart(seasonStartYear), seasonEnd(seasonStartYear)] };
    await WeatherDay.destroy({ where: { stationId, day, source: "service" }, transaction });
    await WeatherDay.bulkCreate(rows, {
      updateOnDuplicate: [
        "tmaxF",
        "tminF",
        "snowfallIn",
        "snowDepthIn",
        "precipIn",
        "hasTraceSnowfall",
        "hasTraceDepth",
        "source",
        "fetchedAt",
      ],
      transaction,
    });
  });
}
