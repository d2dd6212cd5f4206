import type { TestProject } from "vitest/node";
import { type PassingSystem, startPassingSystem } from "#scripts/passing-system.js";

/** Where the running network of this test run is. */
export type WholeSystem = Omit<PassingSystem, "stop" | "appPid">;

declare module "vitest" {
  // Adding to a declaration of the library takes an interface.
  // eslint-disable-next-line @typescript-eslint/consistent-type-definitions
  export interface ProvidedContext {
    wholeSystem: WholeSystem;
  }
}

/** The whole network as `npm start` brings it up, with the demo region, on free ports and with data of its own. */
export default async function setup(project: TestProject) {
  const { stop, appPid: _appPid, ...system } = await startPassingSystem({ faults: "1" });
  project.provide("wholeSystem", system);
  return stop;
}
