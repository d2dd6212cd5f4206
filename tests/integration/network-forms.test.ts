import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { anEdition, aPerson, aTown, digest, reportingTowns, signIn, type Town } from "#tests/support/factories.ts";
import { contentDigest, countOf, rows } from "#tests/support/rows.ts";

/* The coordinator's forms: sent twice they count once, and what does not fit is told beside the field. */

let app: TestApp;
let cookie: string;
let town: Town;
let editionId: number;

beforeAll(async () => {
  app = await startApp();
  await reportingTowns(app, 14);
  editionId = await anEdition(app);
  town = await aTown(app);
  cookie = await signIn(app, await aPerson(app, { role: "coordinator", name: "Coordinating Person" }));
});

afterAll(async () => expect(await app.close()).toEqual([]));

const post = (path: string, form: Record<string, string>) => app.ask(path, { cookie, form });
const person = (change: Record<string, string> = {}) => ({
  clientRef: randomUUID(),
  name: "New Director",
  email: "new.director@sample.example",
  role: "director",
  townId: String(town.id),
  ...change,
});

test("an invitation sent five times at once invites once, by one mail with the one link", async () => {
  const form = person();
  const answers = await Promise.all([1, 2, 3, 4, 5].map(() => post("/network/people", form)));
  expect(answers.map(({ status }) => status)).toEqual(Array(5).fill(302));
  const invitations = await rows<{ id: number; token_hash: string }>(app, "SELECT id, token_hash FROM invitation");
  expect(invitations).toHaveLength(1);
  const mails = await rows<{ text: string; to_address: string }>(app, "SELECT text, to_address FROM outbox_mail");
  expect(mails).toHaveLength(1);
  const token = /\/invitations\/([\w-]{43})/.exec(mails[0]?.text ?? "")?.[1] ?? "";
  expect(digest(token)).toBe(invitations[0]?.token_hash);
  expect(await countOf(app, "audit_entry WHERE action = 'invitation.send'")).toBe(1);
  // The link stands in the mail and nowhere else.
  for (const path of ["/network/people", "/network/mail", "/network/audit"]) {
    for (const address of [path, `${path}.data`])
      expect((await app.ask(address, { cookie })).body).not.toContain(token);
  }
});

test.each<[string, Record<string, string>]>([
  ["no name", { name: " " }],
  ["a name of 121 letters", { name: "x".repeat(121) }],
  ["no address", { email: "" }],
  ["two addresses", { email: "a@sample.example,b@sample.example" }],
  ["an address with a line end", { email: "a@sample.example\r\nBcc: b@sample.example" }],
  ["an address with a name", { email: "Eve <a@sample.example>" }],
  ["no role", { role: "" }],
  ["a role that is none", { role: "administrator" }],
  ["the worker's role", { role: "worker" }],
  ["a director of no town", { townId: "" }],
  ["a town that is no number", { townId: "1 OR 1=1" }],
  ["no reference", { clientRef: "" }],
  ["a reference that is none", { clientRef: "1" }],
])("an invitation with %s is told so, and nobody is invited", async (_what, change) => {
  const before = await contentDigest(app);
  const answer = await post("/network/people", person(change));
  expect(answer.status).toBe(400);
  expect(await contentDigest(app)).toEqual(before);
});

test("an invitation for a town that is not there answers not found", async () => {
  for (const townId of ["4000000000", "9999999999"]) {
    const before = await contentDigest(app);
    expect((await post("/network/people", person({ townId }))).status, townId).toBe(404);
    expect(await contentDigest(app)).toEqual(before);
  }
});

test("names in every script and with every sign are kept as they are, and never as markup", async () => {
  const names = [
    "<img src=x onerror=alert(1)>",
    "Zoë O'Hara-Nuñez",
    "李小龍",
    "😀 Person",
    "Robert'); DROP TABLE town;--",
    "${7*7} {{7*7}}",
  ];
  for (const name of names) expect((await post("/network/people", person({ name }))).status).toBe(302);
  const kept = await rows<{ name: string }>(
    app,
    "SELECT name FROM invitation WHERE name <> 'New Director' ORDER BY id",
  );
  expect(kept.map((row) => row.name)).toEqual(names);
  const { body } = await app.ask("/network/people", { cookie });
  expect(body).not.toContain("<img src=x");
  expect(body).not.toContain("49 ");
  const [mail] = await rows<{ html: string }>(app, "SELECT html FROM outbox_mail WHERE to_name LIKE '<img%'");
  expect(mail?.html).not.toContain("<img src=x");
});

const workshop = (change: Record<string, string> = {}) => ({
  clientRef: randomUUID(),
  title: "Autumn workshop",
  heldOn: "2025-11-12",
  editionId: String(editionId),
  ...change,
});

test("a workshop prepared five times at once is one workshop for all five", async () => {
  const form = workshop();
  const answers = await Promise.all([1, 2, 3, 4, 5].map(() => post("/workshops", form)));
  expect(new Set(answers.map(({ status, headers }) => `${status} ${headers.location ?? ""}`)).size).toBe(1);
  expect(answers[0]?.status).toBe(302);
  expect(await countOf(app, "workshop")).toBe(1);
  expect(await countOf(app, "audit_entry WHERE action = 'workshop.create'")).toBe(1);
});

test.each<[string, Record<string, string>, number]>([
  ["no title", { title: "" }, 400],
  ["a title of 121 letters", { title: "x".repeat(121) }, 400],
  ["no day", { heldOn: "" }, 400],
  ["31 February", { heldOn: "2025-02-31" }, 400],
  ["the year zero", { heldOn: "0000-01-01" }, 400],
  ["no edition", { editionId: "" }, 400],
  ["an edition that is not there", { editionId: "4000000000" }, 404],
  ["an edition beyond any number", { editionId: "9999999999" }, 404],
])("a workshop with %s is not prepared", async (_what, change, status) => {
  const before = await contentDigest(app);
  expect((await post("/workshops", workshop(change))).status).toBe(status);
  expect(await contentDigest(app)).toEqual(before);
});

test("boards added at once stand one after the other, and the same one once", async () => {
  const { headers } = await post("/workshops", workshop());
  const page = headers.location ?? "";
  const board = () => ({
    clientRef: randomUUID(),
    shows: "salt-per-event|all",
    question: "What would a turn of the gate save?",
  });
  const same = board();
  const answers = await Promise.all([same, same, board(), board(), same].map((form) => post(page, form)));
  expect(answers.map(({ status }) => status)).toEqual(Array(5).fill(302));
  const workshopId = Number(page.split("/").at(-1));
  const boards = await rows<{ position: number }>(
    app,
    "SELECT position FROM board WHERE workshop_id = ? ORDER BY position",
    [workshopId],
  );
  expect(boards.map(({ position }) => position)).toEqual([1, 2, 3]);
  expect((await app.ask(`${page}/boards/3`, { cookie })).status).toBe(200);
  expect((await app.ask(`${page}/boards/4`, { cookie })).status).toBe(404);
  for (const wrong of [{ shows: "salt-per-event|nobody" }, { shows: "constructor|all" }]) {
    expect((await post(page, { ...board(), ...wrong })).status).toBe(404);
  }
  for (const wrong of [{ shows: "" }, { shows: "a" }, { question: "" }, { question: "x".repeat(201) }]) {
    expect((await post(page, { ...board(), ...wrong })).status).toBe(400);
  }
});

test.each([
  ["/network/editions", { season: "2024", number: "0" }, 404],
  ["/network/editions", { season: "1800", number: "1" }, 404],
  ["/network/editions", { season: "2031", number: "1" }, 404],
  ["/network/editions", { season: "2024", number: "7" }, 409],
  ["/network/editions", {}, 404],
  ["/network/review", { season: "2031" }, 404],
  ["/network/review", { season: "' OR 1=1" }, 404],
  ["/network/review", {}, 404],
  ["/network/people", { intent: "shut-out", userId: "4000000000" }, 404],
  ["/network/people", { intent: "shut-out", userId: "" }, 404],
  ["/network/people", { intent: "shut-out" }, 404],
  ["/network/people", {}, 400],
])("%s with %j answers %i, and changes nothing", async (path, form, status) => {
  const before = await contentDigest(app);
  expect((await post(path, form as Record<string, string>)).status).toBe(status);
  expect(await contentDigest(app)).toEqual(before);
});

test.each(["?season=2031", "?season=x", "?season=", "?before=0", "?before=x", "?edition=%00"])(
  "the query %s breaks no page of the network",
  async (query) => {
    for (const path of [
      "/network",
      "/network/review",
      "/network/audit",
      "/network/people",
      "/network/mail",
      "/network/editions",
    ]) {
      expect([200, 404], path).toContain((await app.ask(path + query, { cookie })).status);
    }
  },
);
