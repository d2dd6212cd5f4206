import { QueryTypes } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Whether the database answers and its tables are there. */
export async function isReady(): Promise<boolean> {
  try {
    await db.query("SELECT 1 FROM api_token LIMIT 1", { type: QueryTypes.SELECT });
    return true;
  } catch {
    return false;
  }
}
