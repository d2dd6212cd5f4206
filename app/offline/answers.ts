import type { SyncAnswer, WorksheetCopy } from "#app/domain/calibration/worksheet-sync.ts";
import type { YardKit } from "#app/domain/calibration/yard-kit.ts";

const outcomes = ["saved", "finished", "not-finished", "conflict", "refused"];

function hasKeys(value: unknown, keys: readonly string[]): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && keys.every((key) => key in value);
}

/** Whether this is our server's answer, and not that of something in between (a captive portal, a proxy). */
export function isSyncAnswer(value: unknown): value is SyncAnswer {
  return hasKeys(value, ["outcome"]) && typeof value.outcome === "string" && outcomes.includes(value.outcome);
}

export type KitAnswer = { kit: YardKit; copy: WorksheetCopy | null };

/** As `isSyncAnswer`, for what a phone takes along. */
export function isKitAnswer(value: unknown): value is KitAnswer {
  return (
    hasKeys(value, ["kit", "copy"]) && hasKeys(value.kit, ["userId", "townId", "trucks", "materials", "calibrations"])
  );
}
