import { mkdtemp, readFile, rm, stat, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { loadSettings } from "#scripts/settings.js";

let folder = "";

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), "commonweigh-settings-"));
});

afterEach(() => rm(folder, { recursive: true, force: true }));

test("secrets are made once, kept, and readable by their owner only", async () => {
  const first = loadSettings(folder);
  expect(Object.values(first).every((secret) => /^[\w-]{43}$/.test(secret))).toBe(true);
  expect(new Set(Object.values(first)).size).toBe(4);
  expect(loadSettings(folder)).toEqual(first);
  expect((await stat(join(folder, "settings.json"))).mode & 0o777).toBe(0o600);
});

test("a secret that is missing is added, the others stay", async () => {
  await writeFile(join(folder, "settings.json"), JSON.stringify({ workerToken: "kept" }));
  expect(loadSettings(folder).workerToken).toBe("kept");
  expect(await readFile(join(folder, "settings.json"), "utf8")).toContain("oidcClientSecret");
});

test("a damaged file is a sentence with the remedy", async () => {
  await writeFile(join(folder, "settings.json"), "{ half");
  expect(() => loadSettings(folder)).toThrow("is damaged. Delete it and start again");
});
