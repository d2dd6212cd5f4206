import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { insertRows } from "#app/lib/bulk.server.ts";
import { now } from "#app/lib/clock.server.ts";
import { NotNow, type StagedRow, type Stored, WeatherShape } from "./staged.server.ts";
import { townStation } from "./weather-file.server.ts";

const insertDay = `INSERT INTO weather_day (station_id, day, tmax_f, tmin_f, snowfall_in, snow_depth_in, precip_in,
  has_trace_snowfall, has_trace_depth, source, fetched_at) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, 'upload', ?)
  ON DUPLICATE KEY UPDATE tmax_f = VALUES(tmax_f), tmin_f = VALUES(tmin_f), snowfall_in = VALUES(snowfall_in),
    snow_depth_in = VALUES(snow_depth_in), precip_in = VALUES(precip_in),
    has_trace_snowfall = VALUES(has_trace_snowfall), has_trace_depth = VALUES(has_trace_depth),
    source = VALUES(source), fetched_at = VALUES(fetched_at)`;

/** Put days into the town's station; a day that is there already gives way. */
export async function storeWeather(
  actor: TownActor,
  _uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
): Promise<Stored> {
  const station = await townStation(actor.townId, transaction);
  if (!station) throw new NotNow("Your town has no weather station any more, so nothing was taken in.");
  const days = rows.map(({ staged }) => WeatherShape.parse(staged));
  const fetchedAt = now().toISOString().replace("T", " ").slice(0, 23);
  await insertRows(
    insertDay,
    days.map((day) => [
      station.id,
      day.day,
      day.tmaxF,
      day.tminF,
      day.snowfallIn,
      day.snowDepthIn,
      day.precipIn,
      day.isSnowfallTrace ? 1 : 0,
      day.isSnowDepthTrace ? 1 : 0,
      fetchedAt,
    ]),
    transaction,
  );
  return { rowCount: days.length, seasonStartYears: [], days: days.map(({ day }) => day) };
}
