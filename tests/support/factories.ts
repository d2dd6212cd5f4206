import { createHash, randomBytes, randomUUID } from "node:crypto";
import type { Role } from "#app/context.ts";
import type { TestApp } from "./app.ts";
import { cookieOf } from "./http.ts";
import { type App, insert, minutesFromNow, rows } from "./rows.ts";

let serial = 0;
/** A number that no other call in this file gets. */
function next() {
  return ++serial;
}

/** 64 hexadecimal digits. */
export function digest(text: string | Uint8Array): string {
  return createHash("sha256").update(text).digest("hex");
}

export type Town = { id: number; name: string };

/** A town of its own. */
export async function aTown(app: App, given: { name?: string; district?: string } = {}): Promise<Town> {
  const name = given.name ?? `Lower Sample ${next()}`;
  const id = await insert(app, "town", { name, district: given.district ?? "Ridge", created_at: minutesFromNow(0) });
  return { id, name };
}

export type Person = { id: number; role: Role; name: string; email: string; subject: string };

/** Somebody who has come in: of a town when the role takes one. */
export async function aPerson(
  app: App,
  given: { role: Role; town?: Town; name?: string; email?: string; subject?: string },
): Promise<Person> {
  const number = next();
  const person = {
    name: given.name ?? `Sample Person ${number}`,
    email: given.email ?? `person.${number}@sample.example`,
    subject: given.subject ?? `subject-${number}`,
  };
  const id = await insert(app, "user_account", {
    ...person,
    issuer: app.issuer,
    role: given.role,
    town_id: given.town?.id ?? null,
    created_at: minutesFromNow(0),
  });
  return { id, role: given.role, ...person };
}

/** Open a session for somebody. @returns the Cookie header of their browser */
export async function signIn(
  app: App,
  person: Pick<Person, "id">,
  given: { idleMinutes?: number; ageMinutes?: number; leftMinutes?: number } = {},
): Promise<string> {
  const secret = randomBytes(32).toString("base64url");
  const { idleMinutes = 0, ageMinutes = 0, leftMinutes = 60 } = given;
  await insert(app, "session", {
    token_hash: digest(secret),
    user_id: person.id,
    created_at: minutesFromNow(-ageMinutes),
    last_seen_at: minutesFromNow(-idleMinutes),
    authenticated_at: minutesFromNow(-ageMinutes),
    expires_at: minutesFromNow(leftMinutes),
  });
  return cookieOf(secret);
}

/** A key for a program. @returns what it sends as its bearer token */
export async function aToken(app: App, owner: Person, given: { isRevoked?: boolean } = {}): Promise<string> {
  const lookupId = randomBytes(4).toString("hex");
  const secret = randomBytes(32).toString("base64url");
  await insert(app, "api_token", {
    client_ref: randomUUID(),
    lookup_id: lookupId,
    secret_sha256: digest(secret),
    user_id: owner.id,
    name: "a program",
    created_at: minutesFromNow(0),
    expires_at: minutesFromNow(60),
    revoked_at: given.isRevoked ? minutesFromNow(0) : null,
  });
  return `cwt_${lookupId}_${secret}`;
}

/** Somebody who has accepted the dataset's terms. */
export async function acceptsTerms(app: App, person: Person): Promise<void> {
  await insert(app, "terms_acceptance", {
    user_id: person.id,
    terms_version: "2026-12",
    accepted_at: minutesFromNow(0),
  });
}

/** A material of a town; salt unless said otherwise. */
export async function aMaterial(app: App, town: Town, given: { name?: string; kind?: string } = {}): Promise<number> {
  const kind = given.kind ?? "salt";
  return insert(app, "material", {
    town_id: town.id,
    name: given.name ?? "Salt",
    kind,
    salt_share: kind === "salt" ? 1 : 0.2,
  });
}

/** A truck of a town, with its working setting 3 at 25 mph. */
export async function aTruck(app: App, town: Town, given: { unitNumber?: string } = {}): Promise<number> {
  return insert(app, "truck", {
    town_id: town.id,
    unit_number: given.unitNumber ?? String(next()),
    body: "dump body",
    spreader_kind: "tailgate-auger",
    control: "manual",
    working_speed_mph: 25,
    working_setting: 3,
    gate_max_in: 6,
    created_at: minutesFromNow(0),
  });
}

/** A calibration of three settings and three catches; approved unless said otherwise. */
export async function aCalibration(
  app: App,
  given: {
    town: Town;
    truckId: number;
    materialId: number;
    testedOn?: string;
    state?: string;
    lbPerRev?: number;
    gateOpeningIn?: number;
  },
): Promise<number> {
  const id = await insert(app, "calibration", {
    client_ref: randomUUID(),
    town_id: given.town.id,
    truck_id: given.truckId,
    material_id: given.materialId,
    tested_on: given.testedOn ?? "2024-10-09",
    gate_opening_in: given.gateOpeningIn ?? 2,
    state: given.state ?? "approved",
    created_at: minutesFromNow(0),
  });
  for (const setting of [1, 2, 3]) {
    await insert(app, "calibration_count", { calibration_id: id, setting, revolutions: 8 * setting, seconds: 60 });
  }
  for (const position of [1, 2, 3]) {
    const gross_lb = (given.lbPerRev ?? 5) + 1.5;
    await insert(app, "calibration_catch", { calibration_id: id, position, revolutions: 1, gross_lb, tare_lb: 1.5 });
  }
  return id;
}

/** A season that the network has opened. */
export async function aSeason(app: App, startYear: number): Promise<number> {
  await app.db.query("INSERT IGNORE INTO season (start_year, figures_due_on) VALUES (?, ?)", [
    startYear,
    `${startYear + 1}-09-15`,
  ]);
  return startYear;
}

/** A town's figures of one season: 100 lane miles, 20 events, 600 tons of salt, unless said otherwise. */
export async function aSeasonFigure(
  app: App,
  town: Town,
  given: { startYear?: number; state?: string; laneMiles?: number; saltLb?: number; reviewNote?: string } = {},
): Promise<number> {
  return insert(app, "season_figure", {
    town_id: town.id,
    season_start_year: given.startYear ?? 2024,
    state: given.state ?? "draft",
    lane_miles: given.laneMiles ?? 100,
    event_count: 20,
    salt_lb: given.saltLb ?? 1_200_000,
    mix_lb: 0,
    sand_lb: 0,
    review_note: given.reviewNote ?? null,
    created_at: minutesFromNow(0),
    sent_at: given.state === "draft" || given.state === undefined ? null : minutesFromNow(0),
  });
}

/** A problem of an upload's first row. */
export type AProblem = { field?: string; value?: string | null; code: string; severity?: string; message: string };

/** A file of season figures that is checked and waits, with nothing wrong in it unless problems are given. */
export async function anUpload(
  app: App,
  given: { town: Town; person: Person; fileName?: string; problems?: AProblem[]; state?: string },
): Promise<number> {
  const content = Buffer.from(`file ${next()}`);
  const problems = given.problems ?? [];
  const hasError = problems.some(({ severity = "error" }) => severity === "error");
  const id = await insert(app, "upload", {
    town_id: given.town.id,
    kind: "season-figures",
    file_name: given.fileName ?? "figures.csv",
    byte_count: content.length,
    sha256: digest(content),
    rows_read: 1,
    rows_ok: problems.length === 0 ? 1 : 0,
    rows_error: hasError ? 1 : 0,
    rows_check: problems.length > 0 && !hasError ? 1 : 0,
    state: given.state ?? "checked",
    created_by_id: given.person.id,
    created_at: minutesFromNow(0),
  });
  await insert(app, "upload_chunk", { upload_id: id, position: 0, content });
  await insert(app, "upload_row", { upload_id: id, sheet_row: 2, state: hasError ? "error" : "ok", cells: "[]" });
  for (const [position, { field = "", value = null, severity = "error", ...problem }] of problems.entries()) {
    await insert(app, "upload_problem", { upload_id: id, sheet_row: 2, position, field, value, severity, ...problem });
  }
  return id;
}

/** Towns with accepted figures and one weighed salt truck each, different enough for an edition to show groups. */
export async function reportingTowns(app: App, count: number, startYear = 2024): Promise<Town[]> {
  await aSeason(app, startYear);
  const towns: Town[] = [];
  for (let place = 0; place < count; place++) {
    const town = await aTown(app);
    const [truckId, materialId] = [await aTruck(app, town), await aMaterial(app, town)];
    await aCalibration(app, {
      town,
      truckId,
      materialId,
      lbPerRev: 4.01 + 0.37 * place,
      testedOn: `${startYear}-10-09`,
    });
    await aSeasonFigure(app, town, { startYear, state: "accepted", saltLb: 600_013 + 41_003 * place });
    towns.push(town);
  }
  return towns;
}

/** Have an edition published by the worker. @returns its id */
export async function anEdition(app: TestApp, given: { startYear?: number; number?: number } = {}): Promise<number> {
  const { startYear = 2024, number = 1 } = given;
  await insert(app, "job", {
    kind: "publish-edition",
    payload: JSON.stringify({ seasonStartYear: startYear, number }),
    dedupe_key: `publish-edition:${startYear}:${number}`,
    run_after: minutesFromNow(-1),
    created_at: minutesFromNow(0),
  });
  await app.tick();
  const [edition] = await rows<{ id: number }>(
    app,
    "SELECT id FROM edition WHERE season_start_year = ? AND number = ?",
    [startYear, number],
  );
  if (!edition) throw new Error("The edition was not published.");
  return edition.id;
}
