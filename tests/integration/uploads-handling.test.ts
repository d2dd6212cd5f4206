import { request } from "node:http";
import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aPerson, aSeason, aTown, signIn, type Town } from "#tests/support/factories.ts";
import { countOf, rows } from "#tests/support/rows.ts";
import { acceptUpload, heads, seasonRow, sendFile, uploadIdOf, uploadsOf } from "#tests/support/upload-files.ts";

/* How files arrive: too large, cut short, twice, by two people at once; and how accepting them counts once. */

let app: TestApp;
let town: Town;
let cookie: string;
let other: string;

beforeAll(async () => {
  app = await startApp();
  await aSeason(app, 2024);
});

beforeEach(async () => {
  town = await aTown(app);
  cookie = await signIn(app, await aPerson(app, { role: "recorder", town }));
  other = await signIn(app, await aPerson(app, { role: "director", town }));
});

afterAll(async () => expect(await app.close()).toEqual([]));

const good = `${heads}\r\n${seasonRow()}\r\n`;
const wrong = `${heads}\r\n${seasonRow({ events: "x" })}\r\n`;
const figures = () => countOf(app, `season_figure WHERE town_id = ${town.id}`);

test.each([
  [5_242_881, "This file is over 5 MB"],
  [5_990_000, "This file is over 5 MB"],
  [6_100_000, "This is more than 6 MB"],
])("a file of %i bytes is refused, and not kept", async (byteCount, words) => {
  const answer = await sendFile(app, cookie, { content: Buffer.alloc(byteCount, "x") });
  expect(answer.status).toBe(413);
  expect(answer.body).toContain(words);
  expect(await uploadsOf(app, town)).toEqual([]);
});

test("a file of 5 MB to the byte is read", async () => {
  const filler = `${seasonRow({ events: "x" })}\r\n`;
  const content = `${heads}\r\n`.padEnd(5_242_880, filler);
  expect(uploadIdOf(await sendFile(app, cookie, { content }))).toBeGreaterThan(0);
});

const disposition = 'Content-Disposition: form-data; name="file"; filename="a.csv"';
const kind = '--b\r\nContent-Disposition: form-data; name="kind"\r\n\r\nseason-figures\r\n';
test.each<[string, string, number]>([
  ["without an end", `${kind}--b\r\n${disposition}\r\n\r\nabc`, 400],
  ["without a beginning", "abc", 400],
  ["with two files", `${kind}--b\r\n${disposition}\r\n\r\na\r\n--b\r\n${disposition}\r\n\r\nb\r\n--b--`, 400],
  [
    "with a head of 20,000 characters",
    `${kind}--b\r\n${disposition}\r\nX-Long: ${"x".repeat(20_000)}\r\n\r\na\r\n--b--`,
    400,
  ],
  ["with 1,500 fields", `${'--b\r\nContent-Disposition: form-data; name="x"\r\n\r\n1\r\n'.repeat(1500)}--b--`, 400],
  ["without a file", `${kind}--b--`, 400],
  ["with a file without a name", `${kind}--b\r\n${disposition.replace("a.csv", "")}\r\n\r\na\r\n--b--`, 400],
  [
    "with a text in the file's place",
    `${kind}--b\r\nContent-Disposition: form-data; name="file"\r\n\r\na\r\n--b--`,
    400,
  ],
  [
    "of a kind nobody knows",
    `${kind.replace("season-figures", "constructor")}--b\r\n${disposition}\r\n\r\na\r\n--b--`,
    400,
  ],
])("a form %s is answered with a sentence, and nothing is kept", async (_what, body, status) => {
  const headers = { origin: app.origin, "content-type": "multipart/form-data; boundary=b" };
  const answer = await app.ask("/uploads", { method: "POST", cookie, body, headers });
  expect(answer.status).toBe(status);
  expect(answer.body).toMatch(/did not arrive whole|Choose/);
  expect(await uploadsOf(app, town)).toEqual([]);
});

test("a sender who goes away in the middle leaves nothing behind", async () => {
  const { hostname, port } = new URL(app.origin);
  const headers = {
    cookie,
    origin: app.origin,
    "content-type": "multipart/form-data; boundary=b",
    "content-length": "1000000",
  };
  await new Promise<void>((resolve) => {
    const sent = request({ hostname, port, path: "/uploads", method: "POST", headers, agent: false });
    sent.on("error", () => resolve());
    sent.write(`${kind}--b\r\n${disposition}\r\n\r\nabc`);
    setTimeout(() => sent.destroy(), 100);
    sent.on("close", () => resolve());
  });
  expect((await app.ask("/uploads", { cookie })).status).toBe(200);
  expect(await uploadsOf(app, town)).toEqual([]);
});

test("the same file twice is one upload, checked against what is stored now", async () => {
  const first = uploadIdOf(await sendFile(app, cookie, { content: good }));
  const again = uploadIdOf(await sendFile(app, other, { content: good, fileName: "another-name.csv" }));
  expect(again).toBe(first);
  await acceptUpload(app, cookie, first);
  expect(uploadIdOf(await sendFile(app, cookie, { content: good }))).toBe(first);
  expect(await uploadsOf(app, town)).toEqual([{ id: first, state: "accepted" }]);
  expect(await countOf(app, `season_figure WHERE town_id = ${town.id} AND version = 1`)).toBe(1);
});

test("the same file by two people at once is one upload for both", async () => {
  for (let turn = 0; turn < 8; turn++) {
    const content = `${good}\r\n,,,,,,,,${" ".repeat(turn)}\r\n`;
    const people = [cookie, other, cookie, other];
    const answers = await Promise.all(people.map((person) => sendFile(app, person, { content })));
    expect(answers.map(({ status }) => status)).toEqual([302, 302, 302, 302]);
    expect(new Set(answers.map(uploadIdOf)).size).toBe(1);
  }
  expect(await uploadsOf(app, town)).toHaveLength(8);
});

test("the same file by two towns is an upload of each", async () => {
  const neighbour = await aTown(app);
  const theirs = await signIn(app, await aPerson(app, { role: "recorder", town: neighbour }));
  const [mine, their] = await Promise.all([cookie, theirs].map((person) => sendFile(app, person, { content: good })));
  expect(mine && their && uploadIdOf(mine) !== uploadIdOf(their)).toBe(true);
});

test("accepting five times at once counts once", async () => {
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content: good }));
  const answers = await Promise.all([1, 2, 3, 4, 5].map(() => acceptUpload(app, cookie, uploadId)));
  expect(answers.map(({ status }) => status).sort()).toEqual([302, 409, 409, 409, 409]);
  expect(await figures()).toBe(1);
  const audit = `audit_entry WHERE town_id = ${town.id} AND action`;
  expect(await countOf(app, `${audit} = 'upload.accept'`)).toBe(1);
  expect(await countOf(app, `${audit} = 'season-figure.fill'`)).toBe(1);
});

test("two files for the same season accepted at once: one counts after the other, or waits", async () => {
  const files = ["600", "700", "800"].map((salt_tons) => `${heads}\r\n${seasonRow({ salt_tons })}\r\n`);
  const ids: number[] = [];
  for (const content of files) ids.push(uploadIdOf(await sendFile(app, cookie, { content })));
  const statuses = (await Promise.all(ids.map((id) => acceptUpload(app, cookie, id)))).map(({ status }) => status);
  const accepted = statuses.filter((status) => status === 302).length;
  expect(accepted).toBeGreaterThan(0);
  expect(statuses.filter((status) => status !== 302)).toEqual(Array(3 - accepted).fill(409));
  expect(await countOf(app, `upload WHERE town_id = ${town.id} AND state = 'accepted'`)).toBe(accepted);
  const [figure] = await rows<{ version: number }>(app, "SELECT version FROM season_figure WHERE town_id = ?", [
    town.id,
  ]);
  expect(figure?.version).toBe(accepted);
});

test("a file with errors is not accepted, however it is asked for", async () => {
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content: wrong }));
  for (const person of [cookie, other]) {
    const answer = await acceptUpload(app, person, uploadId);
    expect(answer.status).toBe(409);
    expect(answer.body).toContain("Errors stand in this file");
  }
  const forged = await app.ask(`/uploads/${uploadId}`, { cookie, form: { problems: "[]", state: "accepted" } });
  expect(forged.status).toBe(409);
  expect(await figures()).toBe(0);
});

test.each([
  "../../../etc/passwd",
  "..\\\\..\\\\windows.csv",
  "<script>alert(1)</script>.csv",
  "CON.csv",
  `${"long".repeat(100)}.csv`,
  "\u202Evsc.exe",
  "a%00b.csv",
  "😀".repeat(150),
])("the file name %s is shown as words, and leads nowhere", async (fileName) => {
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content: good, fileName }));
  expect(uploadId).toBeGreaterThan(0);
  const page = await app.ask(`/uploads/${uploadId}`, { cookie });
  expect(page.status).toBe(200);
  expect(page.body).not.toContain("<script>alert(1)");
  expect((await app.ask(`/uploads/${uploadId}/problems`, { cookie })).headers["content-disposition"]).toBe(
    `attachment; filename="upload-${uploadId}-problems.csv"`,
  );
});
