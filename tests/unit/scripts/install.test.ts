import { expect, test } from "vitest";
import { assertNodeVersion, missingPackages } from "#scripts/install.js";

const lock = {
  packages: {
    "": { version: "0.1.0" },
    "node_modules/react": { version: "19.3.1" },
    "node_modules/only-elsewhere": { version: "1.0.0", optional: true },
  },
};

test("nothing is missing when every package stands there in the locked version", () => {
  expect(missingPackages(lock, { packages: { "node_modules/react": { version: "19.3.1" } } })).toEqual([]);
});

test("an absent package and another version are both missing, an optional one is not", () => {
  expect(missingPackages(lock, {})).toEqual(["node_modules/react"]);
  expect(missingPackages(lock, { packages: { "node_modules/react": { version: "19.3.0" } } })).toEqual([
    "node_modules/react",
  ]);
});

test.each(["20.19.0", "20.20.2", "22.0.0"])("Node %s is new enough", (version) => {
  expect(() => assertNodeVersion(version)).not.toThrow();
});

test.each(["18.20.0", "20.18.9"])("Node %s is refused with the version to install", (version) => {
  expect(() => assertNodeVersion(version)).toThrow("Install Node 20.19 or later");
});
