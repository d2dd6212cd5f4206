import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";

/**
 * Do something with a file of one's own that is gone afterwards, however it goes.
 *
 * @param work - gets the path of a file that is not there yet, in a folder that only this account can look into
 * @returns what `work` returns
 */
export async function withTemporaryFile<T>(work: (path: string) => Promise<T>): Promise<T> {
  const folder = await mkdtemp(join(tmpdir(), "commonweigh-file-"));
  try {
    return await work(join(folder, "file"));
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
