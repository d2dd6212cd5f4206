import { mkdir, mkdtemp, rename, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { isBuildStale, sourceHash } from "#scripts/build.js";

let root = "";

beforeEach(async () => {
  root = await mkdtemp(join(tmpdir(), "commonweigh-hash-"));
  await mkdir(join(root, "app", "routes"), { recursive: true });
  await writeFile(join(root, "app", "root.tsx"), "a");
  await writeFile(join(root, "app", "routes", "home.tsx"), "b");
  await writeFile(join(root, "package-lock.json"), "{}");
});

afterEach(() => rm(root, { recursive: true, force: true }));

async function pretendToBuild() {
  await mkdir(join(root, "build", "server"), { recursive: true });
  await writeFile(join(root, "build", "server", "index.js"), "");
  await writeFile(join(root, "build", ".source-hash"), `${sourceHash(root)}\n`);
}

test("without a build, or without its stamp, it is stale", async () => {
  expect(isBuildStale(root)).toBe(true);
  await pretendToBuild();
  await rm(join(root, "build", ".source-hash"));
  expect(isBuildStale(root)).toBe(true);
});

test("an untouched checkout is not built again, also after its files' dates change", async () => {
  await pretendToBuild();
  await writeFile(join(root, "app", "root.tsx"), "a");
  expect(isBuildStale(root)).toBe(false);
});

test.each([
  ["a changed byte", () => writeFile(join(root, "app", "routes", "home.tsx"), "c")],
  ["a new file", () => writeFile(join(root, "app", "routes", "new.tsx"), "")],
  ["a renamed file", () => rename(join(root, "app", "root.tsx"), join(root, "app", "boot.tsx"))],
  ["another lock file", () => writeFile(join(root, "package-lock.json"), '{"x":1}')],
  ["a new public file", () => mkdir(join(root, "public")).then(() => writeFile(join(root, "public", "a.svg"), "x"))],
])("%s makes the build stale", async (_what, change) => {
  await pretendToBuild();
  await change();
  expect(isBuildStale(root)).toBe(true);
});

test("text moved from one file into the next is a change", async () => {
  const before = sourceHash(root);
  await writeFile(join(root, "app", "root.tsx"), "");
  await writeFile(join(root, "app", "routes", "home.tsx"), "ab");
  expect(sourceHash(root)).not.toBe(before);
});
