import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";

/**
 * A place for a file of one's own, in a folder that only this account can look into.
 *
 * @returns the path, where nothing is yet, and how to remove what lies there
 */
export async function temporaryFile(): Promise<{ path: string; remove: () => Promise<void> }> {
  const folder = await mkdtemp(join(tmpdir(), "commonweigh-file-"));
  return { path: join(folder, "file"), remove: () => rm(folder, { recursive: true, force: true }) };
}
