import { afterAll, beforeAll, expect, test } from "vitest";
import type { Role } from "#app/context.ts";
import { startApp, type TestApp } from "#tests/support/app.ts";
import {
  aPerson,
  aSeason,
  aSeasonFigure,
  aToken,
  aTown,
  acceptsTerms,
  type Person,
  signIn,
  type Town,
} from "#tests/support/factories.ts";
import { cookieOf } from "#tests/support/http.ts";
import { countOf, rows } from "#tests/support/rows.ts";

let app: TestApp;
let town: Town;
let coordinator: string;
const people = new Map<Role, Person>();

beforeAll(async () => {
  app = await startApp();
  town = await aTown(app);
  await aSeason(app, 2024);
  for (const role of ["recorder", "director"] as const) people.set(role, await aPerson(app, { role, town }));
  for (const role of ["coordinator", "analyst"] as const) people.set(role, await aPerson(app, { role }));
  coordinator = await signIn(app, personOf("coordinator"));
});

afterAll(async () => expect(await app.close()).toEqual([]));

function personOf(role: Role): Person {
  const person = people.get(role);
  if (!person) throw new Error(`nobody is ${role}`);
  return person;
}

/** 200 while the session holds, 302 to the sign-in page when it does not. */
async function statusWith(cookie: string) {
  return (await app.ask("/account", { cookie })).status;
}

const hours = 60;

test.each<[Role, number]>([
  ["recorder", 12 * hours],
  ["director", 2 * hours],
  ["coordinator", 2 * hours],
  ["analyst", 2 * hours],
])("a %s's session ends after %i idle minutes, and not before", async (role, minutes) => {
  expect(await statusWith(await signIn(app, personOf(role), { idleMinutes: minutes - 1, leftMinutes: 60 }))).toBe(200);
  expect(await statusWith(await signIn(app, personOf(role), { idleMinutes: minutes, leftMinutes: 60 }))).toBe(302);
});

test.each<Role>(["recorder", "director", "coordinator", "analyst"])(
  "a %s's session ends at its end, however busy it was",
  async (role) => {
    expect(await statusWith(await signIn(app, personOf(role), { leftMinutes: 0.5 }))).toBe(200);
    expect(await statusWith(await signIn(app, personOf(role), { leftMinutes: -0.01 }))).toBe(302);
  },
);

test("using a session puts its idle end off, and not the other one", async () => {
  const cookie = await signIn(app, personOf("director"), { idleMinutes: 90, leftMinutes: 100 });
  const newest = "SELECT last_seen_at, expires_at FROM session ORDER BY id DESC LIMIT 1";
  const [before] = await rows<{ last_seen_at: string; expires_at: string }>(app, newest);
  expect(await statusWith(cookie)).toBe(200);
  const [after] = await rows<{ last_seen_at: string; expires_at: string }>(app, newest);
  expect(Date.parse(after?.last_seen_at ?? "") - Date.parse(before?.last_seen_at ?? "")).toBeGreaterThan(89 * 60_000);
  expect(after?.expires_at).toBe(before?.expires_at);
});

test("a signed-out visitor is sent to sign in, and back to the page itself", async () => {
  const backTo = async (path: string, form?: Record<string, string>) => {
    const { headers } = await app.ask(path, form ? { form } : {});
    return headers.location;
  };
  expect(await backTo("/season/2024?x=1")).toBe("/login?returnTo=%2Fseason%2F2024%3Fx%3D1");
  expect(await backTo("/season/2024", { version: "1" })).toBe("/login?returnTo=%2Fseason%2F2024&expired=1");
  const { body } = await app.ask("/season/2024.data?_routes=routes/season/season");
  expect(body).toContain('/login?returnTo=%2Fseason%2F2024"');
});

test("a form sent after the session's end changes nothing, and the sign-in page says that it is kept", async () => {
  await aSeasonFigure(app, town);
  const cookie = await signIn(app, personOf("director"), { leftMinutes: -1 });
  const answer = await app.ask("/season/2024", { cookie, form: { version: "1" } });
  expect(answer.headers.location).toContain("expired=1");
  expect(await countOf(app, "season_figure WHERE state = 'draft'")).toBe(1);
  const login = await app.ask(answer.headers.location ?? "");
  expect(login.body).toContain("Nothing was sent");
});

test("somebody who is shut out is out at once, with every session and token, and comes in again only by signing in", async () => {
  const person = await aPerson(app, { role: "analyst" });
  await acceptsTerms(app, person);
  const cookies = [await signIn(app, person), await signIn(app, person)];
  const token = await aToken(app, person);
  expect((await app.ask("/api/v1/editions", { token })).status).toBe(200);

  const decide = (intent: string) =>
    app.ask("/network/people", { cookie: coordinator, form: { intent, userId: String(person.id) } });
  expect((await decide("shut-out")).status).toBe(302);
  for (const cookie of cookies) expect(await statusWith(cookie)).toBe(302);
  expect((await app.ask("/api/v1/editions", { token })).status).toBe(401);

  expect((await decide("readmit")).status).toBe(302);
  for (const cookie of cookies) expect(await statusWith(cookie)).toBe(302);
  expect((await app.ask("/api/v1/editions", { token })).status).toBe(401);
  expect(await statusWith(await signIn(app, person))).toBe(200);
  expect(await countOf(app, `audit_entry WHERE entity_id = ${person.id} AND action LIKE 'account.%'`)).toBe(2);
});

test("the coordinator cannot shut themselves out", async () => {
  const form = { intent: "shut-out", userId: String(personOf("coordinator").id) };
  expect((await app.ask("/network/people", { cookie: coordinator, form })).status).toBe(404);
  expect(await statusWith(coordinator)).toBe(200);
});

test("a changed role or town holds from the next request on", async () => {
  const person = await aPerson(app, { role: "director", town });
  const cookie = await signIn(app, person);
  expect((await app.ask("/fleet", { cookie })).status).toBe(200);
  await app.db.query("UPDATE user_account SET role = 'analyst', town_id = NULL WHERE id = ?", [person.id]);
  expect((await app.ask("/fleet", { cookie })).status).toBe(403);
});

test("one ends one's other sessions, and each for itself", async () => {
  const person = await aPerson(app, { role: "recorder", town });
  const [first, second] = [await signIn(app, person), await signIn(app, person)];
  const [oldest] = await rows<{ id: number }>(app, "SELECT id FROM session WHERE user_id = ? ORDER BY id", [person.id]);
  const answer = await app.ask("/account", { cookie: second, form: { sessionId: String(oldest?.id) } });
  expect(answer.status).toBe(302);
  expect(await statusWith(first)).toBe(302);
  expect(await statusWith(second)).toBe(200);
});

test.each([
  ["nothing", "sid="],
  ["no base 64", "sid=%%%"],
  ["a broken escape", "sid=%E0%A4%A"],
  ["no JSON", `sid=${Buffer.from("{").toString("base64")}`],
  ["a list", `sid=${Buffer.from('["a"]').toString("base64")}`],
  ["an object", `sid=${Buffer.from('{"$ne":null}').toString("base64")}`],
  ["a very long text", cookieOf("x".repeat(3000))],
  ["quotes and zero bytes", cookieOf("' OR 1=1 -- \0")],
])("a session cookie that holds %s is nobody's", async (_what, cookie) => {
  expect(await statusWith(cookie)).toBe(302);
  expect((await app.ask("/", { cookie })).status).toBe(200);
});

test("of two session cookies the browser's first counts, and neither signs in somebody else", async () => {
  const cookie = await signIn(app, personOf("director"));
  const answer = await app.ask("/account", { cookie: `${cookie}; ${cookieOf("x".repeat(43))}` });
  expect(answer.body).toContain(personOf("director").name);
});
