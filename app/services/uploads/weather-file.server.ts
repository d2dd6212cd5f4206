import { FileError } from "#app/lib/file-error.ts";
import type { Step } from "./steps.server.ts";

export async function runStationCheck(_step: Step): Promise<void> {
  throw new FileError("not-yet", "Weather files are not read yet.");
}
