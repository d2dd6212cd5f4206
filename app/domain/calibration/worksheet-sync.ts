import type { Finding } from "#app/domain/finding.ts";
import type { Worksheet } from "./worksheet.ts";

/** What the server answers to a worksheet that a phone sends. */
export type SyncAnswer =
  | { outcome: "saved"; version: number }
  | { outcome: "finished"; version: number; calibrationId: number }
  /** Saved, but its figures do not make a calibration yet. */
  | { outcome: "not-finished"; version: number; problems: Finding[] }
  /** Somebody sent another version first. Both are kept; `theirs` is the one that stands. */
  | {
      outcome: "conflict";
      theirs: Worksheet;
      version: number;
      device: string;
      keptVersionId: number;
      /** Set when theirs is finished already, and so can no longer be changed. */
      calibrationId: number | null;
    }
  /** Not taken: a message that cannot be right, now or later. */
  | { outcome: "refused"; message: string };

/** The server's copy of a worksheet. */
export type WorksheetCopy = {
  sheet: Worksheet;
  version: number;
  calibrationId: number | null;
};
