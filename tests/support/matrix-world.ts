import { randomUUID } from "node:crypto";
import type { Role } from "#app/context.ts";
import { startApp, type TestApp } from "./app.ts";
import {
  acceptsTerms,
  aCalibration,
  aMaterial,
  anEdition,
  anUpload,
  aPerson,
  aSeasonFigure,
  aToken,
  aTown,
  aTruck,
  digest,
  type Person,
  reportingTowns,
  signIn,
  type Town,
} from "./factories.ts";
import { insert, minutesFromNow } from "./rows.ts";

/** Somebody who asks. `reader` is what they are to the access table, null when they are nobody to it. */
export type Visitor = {
  name: string;
  door: "session" | "token";
  reader: Role | "worker" | null;
  open: () => Promise<{ cookie?: string; token?: string }>;
};

export type MatrixWorld = {
  app: TestApp;
  visitors: Visitor[];
  recorder: Person;
  director: Person;
  /** What only the other town and the coordinator may ever see. */
  planted: string[];
  /** Ids of the other town's records. */
  other: Ids;
  /** A page's address with ids of the visitors' own town. */
  pathOf: (pattern: string) => string;
  /** A form that would change something there, if its sender were let through. */
  formOf: (pattern: string) => Record<string, string>;
};

type Ids = { townId: number; truckId: number; uploadId: number; figureId: number; calibrationId: number };

/** Words and figures that stand nowhere else. */
const canaries = {
  town: "Quaggywater",
  truck: "ZQ-7741",
  material: "Zephyrite grit",
  file: "zephyr-ledger.csv",
  cell: "zephyr-cell",
  note: "Zephyr question of the coordinator",
  person: "Zebulon Quagg",
  mail: "zebulon.quagg@quaggywater.example",
};
const saltLb = 246_913_578;
const laneMiles = 777.77;
const saltFigures = ["246913578", "123456.789", "123,456.8", "246,913,578"];
const otherFigures = ["777.77", "777.8", "7.0717171", "123,457"];

async function otherTown(app: TestApp): Promise<Ids> {
  const town = await aTown(app, { name: canaries.town });
  const person = await aPerson(app, { role: "director", town, name: canaries.person, email: canaries.mail });
  const truckId = await aTruck(app, town, { unitNumber: canaries.truck });
  const materialId = await aMaterial(app, town, { name: canaries.material });
  const of = { town, truckId, materialId };
  await aCalibration(app, { ...of, gateOpeningIn: 1.5 });
  const calibrationId = await aCalibration(app, { ...of, state: "ready", testedOn: "2024-10-11", lbPerRev: 7.0717171 });
  await aSeasonFigure(app, town, { startYear: 2023, state: "accepted", saltLb, laneMiles });
  const figureId = await aSeasonFigure(app, town, { state: "accepted", saltLb, laneMiles, reviewNote: canaries.note });
  const problem = {
    field: "events",
    value: canaries.cell,
    code: "x",
    severity: "error",
    message: canaries.cell,
  };
  const uploadId = await anUpload(app, { town, person, fileName: canaries.file, problems: [problem] });
  return { townId: town.id, truckId, uploadId, figureId, calibrationId };
}

async function ownTown(app: TestApp, town: Town, person: Person): Promise<Ids> {
  const truckId = await aTruck(app, town);
  const materialId = await aMaterial(app, town);
  await aCalibration(app, { town, truckId, materialId });
  const calibrationId = await aCalibration(app, { town, truckId, materialId, state: "ready", testedOn: "2024-10-11" });
  await aSeasonFigure(app, town, { startYear: 2023, state: "accepted" });
  const figureId = await aSeasonFigure(app, town, { state: "draft" });
  return { townId: town.id, truckId, uploadId: await anUpload(app, { town, person }), figureId, calibrationId };
}

async function visitorsOf(app: TestApp, town: Town, people: { recorder: Person; director: Person; analyst: Person }) {
  const coordinator = await aPerson(app, { role: "coordinator" });
  const shutOut = await aPerson(app, { role: "director", town });
  const lockedAnalyst = await aPerson(app, { role: "analyst" });
  await acceptsTerms(app, people.analyst);
  await acceptsTerms(app, lockedAnalyst);
  await app.db.query("UPDATE user_account SET is_active = 0 WHERE id IN (?, ?)", [shutOut.id, lockedAnalyst.id]);
  const tokens = {
    analyst: await aToken(app, people.analyst),
    revoked: await aToken(app, people.analyst, { isRevoked: true }),
    locked: await aToken(app, lockedAnalyst),
  };
  const bySession = (name: string, person: Person, reader: Role | null, given = {}): Visitor => ({
    name,
    door: "session",
    reader,
    open: async () => ({ cookie: await signIn(app, person, given) }),
  });
  const byToken = (name: string, token: string, reader: Visitor["reader"]): Visitor => ({
    name,
    door: "token",
    reader,
    open: async () => ({ token }),
  });
  return [
    { name: "signed out", door: "session", reader: null, open: async () => ({}) } satisfies Visitor,
    bySession("recorder", people.recorder, "recorder"),
    bySession("director", people.director, "director"),
    bySession("coordinator", coordinator, "coordinator"),
    bySession("analyst", people.analyst, "analyst"),
    bySession("session over", people.director, null, { ageMinutes: 800, leftMinutes: -1 }),
    bySession("session idle too long", people.director, null, { idleMinutes: 121, leftMinutes: 60 }),
    bySession("shut out", shutOut, null),
    byToken("worker's token", app.workerToken, "worker"),
    byToken("analyst's token", tokens.analyst, "analyst"),
    byToken("revoked token", tokens.revoked, null),
    byToken("token of one shut out", tokens.locked, null),
    byToken("made-up token", `cwt_00000000_${"A".repeat(43)}`, null),
  ];
}

async function networkRecords(app: TestApp) {
  const editionId = await anEdition(app);
  const workshopId = await insert(app, "workshop", {
    client_ref: randomUUID(),
    title: "Autumn workshop",
    held_on: "2025-11-12",
    edition_id: editionId,
    created_at: minutesFromNow(0),
  });
  await insert(app, "board", {
    client_ref: randomUUID(),
    workshop_id: workshopId,
    position: 1,
    indicator: "salt-per-event",
    group_key: "all",
    question: "What would a turn of the gate save?",
  });
  const invitation = "B".repeat(43);
  await insert(app, "invitation", {
    token_hash: digest(invitation),
    client_ref: randomUUID(),
    name: "Somebody Invited",
    email: "invited@sample.example",
    role: "analyst",
    town_id: null,
    created_at: minutesFromNow(0),
    expires_at: minutesFromNow(600),
  });
  const sent = await aSeasonFigure(app, await aTown(app), { state: "sent" });
  return { editionId, workshopId, invitation, sentFigureId: sent };
}

/** A network with an edition, two towns of interest and one visitor of each kind. */
export async function matrixWorld(): Promise<MatrixWorld> {
  const app = await startApp({ devPages: true });
  await reportingTowns(app, 14, 2024);
  await app.db.query("INSERT INTO season (start_year, figures_due_on) VALUES (2023, '2024-09-15')");
  const town = await aTown(app, { name: "Ownbrook" });
  const recorder = await aPerson(app, { role: "recorder", town });
  const director = await aPerson(app, { role: "director", town });
  const own = await ownTown(app, town, recorder);
  const other = await otherTown(app);
  const network = await networkRecords(app);
  const analyst = await aPerson(app, { role: "analyst" });
  const ids: Record<string, string | number> = {
    ":token": network.invitation,
    ":truckId": own.truckId,
    ":seasonStartYear": 2024,
    ":kind": "calibrations",
    ":uploadId": own.uploadId,
    ":workshopId": network.workshopId,
    ":position": 1,
    ":editionId": network.editionId,
    ":file": "cells.csv",
    ":figureId": network.sentFigureId,
    ":calibrationId": own.calibrationId,
    "*": "no/such/page",
  };
  const truck = { spreaderKind: "conveyor", control: "manual", lanesPerPass: "1", workingSpeedMph: "25" };
  const forms: Record<string, Record<string, string>> = {
    "/fleet/trucks/new": { ...truck, unitNumber: "One more", workingSetting: "3" },
    "/fleet/:truckId/edit": { ...truck, unitNumber: "Renamed", workingSetting: "4" },
    "/fleet/:truckId/work": { clientRef: randomUUID(), part: "gate", doneOn: "2025-10-20" },
    "/fleet/bands": { "salt-low": "200", "salt-high": "280" },
    "/network/bands": { "salt-low": "220", "salt-high": "310", tolerance: "7" },
    "/fleet": { calibrationId: String(own.calibrationId) },
    "/season/:seasonStartYear": { version: "1" },
    "/workshops": {
      clientRef: randomUUID(),
      title: "Another",
      heldOn: "2025-12-01",
      editionId: String(network.editionId),
    },
    "/workshops/:workshopId": { clientRef: randomUUID(), shows: "salt-per-event|all", question: "What is to be done?" },
    "/dataset/tokens": { clientRef: randomUUID(), name: "a token" },
    "/network/review": { season: "2024" },
    "/network/review/:figureId": { version: "1", verdict: "accept" },
    "/network/editions": { season: "2024", number: "2" },
    "/network/people": { clientRef: randomUUID(), name: "Some One", email: "some.one@sample.example", role: "analyst" },
  };
  return {
    app,
    visitors: await visitorsOf(app, town, { recorder, director, analyst }),
    recorder,
    director,
    planted: [...Object.values(canaries), ...saltFigures, ...otherFigures],
    other,
    pathOf: (pattern) =>
      pattern
        .split("/")
        .map((part) => ids[part] ?? part)
        .join("/"),
    formOf: (pattern) => forms[pattern] ?? {},
  };
}
