import type { JobHandlers } from "../jobs.server.ts";
import { runAccept } from "./accept-step.server.ts";
import { runCheck } from "./check-step.server.ts";
import { runRead } from "./read-step.server.ts";
import { stepHandler } from "./steps.server.ts";

/** The jobs of uploads: reading a file, checking its rows, taking them in. */
export const uploadHandlers: JobHandlers = {
  ...stepHandler("upload-read", "failed", runRead),
  ...stepHandler("upload-check", "failed", (step) => runCheck(step)),
  ...stepHandler("upload-accept", "checked", runAccept),
};
