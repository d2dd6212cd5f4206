import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { type Stored, type StagedRow } from "./staged.server.ts";

export async function storeWeather(
  _actor: TownActor,
  _uploadId: number,
  _rows: readonly StagedRow[],
  _transaction: Transaction,
): Promise<Stored> {
  return { rowCount: 0, seasonStartYears: [], days: [] };
}
