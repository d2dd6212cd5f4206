import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aPerson, aSeason, aSeasonFigure, aTown, type Person, signIn, type Town } from "#tests/support/factories.ts";
import { countOf, rows } from "#tests/support/rows.ts";
import { acceptUpload, heads, seasonRow, sendFile, uploadIdOf } from "#tests/support/upload-files.ts";

/* A season goes from draft to sent to returned or accepted, once each way, with one entry in the trail and one mail. */

let app: TestApp;
let town: Town;
let director: Person;
let cookie: string;
let coordinators: Person[];
let [first, second] = ["", ""];

beforeAll(async () => {
  app = await startApp();
  for (const year of [2022, 2023, 2024]) await aSeason(app, year);
  coordinators = [await aPerson(app, { role: "coordinator" }), await aPerson(app, { role: "coordinator" })];
  [first = "", second = ""] = await Promise.all(coordinators.map((person) => signIn(app, person)));
});

beforeEach(async () => {
  town = await aTown(app);
  director = await aPerson(app, { role: "director", town });
  cookie = await signIn(app, director);
});

afterAll(async () => expect(await app.close()).toEqual([]));

const send = (version: number) => app.ask("/season/2024", { cookie, form: { version: String(version) } });
const review = (figureId: number, by: string, form: Record<string, string>) =>
  app.ask(`/network/review/${figureId}`, { cookie: by, form });
const accept = (figureId: number, version: number, by = first) =>
  review(figureId, by, { version: String(version), verdict: "accept" });
const giveBack = (figureId: number, version: number, by = first) =>
  review(figureId, by, { version: String(version), verdict: "return", note: "Are the lane miles right?" });

async function stateOf(figureId: number) {
  const [figure] = await rows<{ state: string; version: number; salt_lb: number }>(
    app,
    "SELECT state, version, salt_lb FROM season_figure WHERE id = ?",
    [figureId],
  );
  return figure;
}

const deeds = (figureId: number, action: string) =>
  countOf(app, `audit_entry WHERE entity = 'season_figure' AND entity_id = ${figureId} AND action = '${action}'`);
const mails = (occasion: string, figureId: number) =>
  rows<{ to_address: string }>(
    app,
    `SELECT to_address FROM outbox_mail WHERE dedupe_key LIKE '${occasion}:${figureId}:%' ORDER BY id`,
  );

test("sent six times at once, a season is sent once: one entry, one mail to each coordinator", async () => {
  const figureId = await aSeasonFigure(app, town);
  const statuses = (await Promise.all([1, 2, 3, 4, 5, 6].map(() => send(1)))).map(({ status }) => status);
  expect(statuses.sort()).toEqual([302, 409, 409, 409, 409, 409]);
  expect(await stateOf(figureId)).toMatchObject({ state: "sent", version: 2 });
  expect(await deeds(figureId, "season-figure.send")).toBe(1);
  expect((await mails("season-sent", figureId)).map((mail) => mail.to_address)).toEqual(
    coordinators.map(({ email }) => email),
  );
});

test("a season that was changed since the director looked is not sent", async () => {
  const figureId = await aSeasonFigure(app, town);
  await app.db.query("UPDATE season_figure SET version = 2 WHERE id = ?", [figureId]);
  const answer = await send(1);
  expect(answer.status).toBe(409);
  expect(answer.body).toContain("were changed since you opened this page");
  expect(await stateOf(figureId)).toMatchObject({ state: "draft", version: 2 });
  expect(await mails("season-sent", figureId)).toEqual([]);
});

test("figures that cannot be right are not sent", async () => {
  const figureId = await aSeasonFigure(app, town, { saltLb: 1e9 });
  expect((await send(1)).status).toBe(409);
  expect(await stateOf(figureId)).toMatchObject({ state: "draft" });
});

test.each(["", "0", "-1", "1.5", "one", "99999999999", "1'"])("the version “%s” sends nothing", async (version) => {
  const figureId = await aSeasonFigure(app, town);
  expect((await app.ask("/season/2024", { cookie, form: { version } })).status).toBe(404);
  expect(await stateOf(figureId)).toMatchObject({ state: "draft" });
});

test("a town without figures, and a season nobody opened, answer not found", async () => {
  expect((await send(1)).status).toBe(404);
  expect((await app.ask("/season/2031", { cookie, form: { version: "1" } })).status).toBe(404);
  expect((await app.ask("/season/2031", { cookie })).status).toBe(404);
});

test("two coordinators decide at once: one of them decides, the other is told", async () => {
  for (let turn = 0; turn < 6; turn++) {
    const figureId = await aSeasonFigure(app, await aTown(app), { state: "sent" });
    const answers = await Promise.all([
      accept(figureId, 1, first),
      giveBack(figureId, 1, second),
      accept(figureId, 1, second),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([302, 409, 409]);
    expect(await stateOf(figureId)).toMatchObject({ version: 2 });
    const decided = [await deeds(figureId, "season-figure.accept"), await deeds(figureId, "season-figure.return")];
    expect(decided.sort()).toEqual([0, 1]);
  }
});

test("what was decided stays decided", async () => {
  const figureId = await aSeasonFigure(app, town, { state: "sent" });
  expect((await accept(figureId, 1)).status).toBe(302);
  expect((await accept(figureId, 2)).status).toBe(409);
  expect((await giveBack(figureId, 2)).status).toBe(409);
  expect((await send(2)).status).toBe(409);
  expect(await stateOf(figureId)).toMatchObject({ state: "accepted", version: 2 });
  expect(await mails("season-accepted", figureId)).toEqual([{ to_address: director.email }]);
});

test("a coordinator who looked at an older version decides nothing", async () => {
  const figureId = await aSeasonFigure(app, town, { state: "sent" });
  await app.db.query("UPDATE season_figure SET version = 3 WHERE id = ?", [figureId]);
  const answer = await accept(figureId, 2);
  expect(answer.status).toBe(409);
  expect(answer.body).toContain("settled or changed since you opened it");
  expect(await stateOf(figureId)).toMatchObject({ state: "sent" });
});

test.each([
  ["nothing", ""],
  ["a word", "short"],
  ["2,001 letters", "x".repeat(2001)],
  ["blanks", "       ?      "],
])("sending back asks for a question, not %s", async (_what, note) => {
  const figureId = await aSeasonFigure(app, town, { state: "sent" });
  const answer = await review(figureId, first, { version: "1", verdict: "return", note });
  expect(answer.status).toBe(400);
  expect(answer.body).toContain("Write the question");
  expect(await stateOf(figureId)).toMatchObject({ state: "sent" });
});

test("a season goes back, is corrected by a file, sent again and accepted, with a mail at each turn", async () => {
  const figureId = await aSeasonFigure(app, town);
  expect((await send(1)).status).toBe(302);
  expect((await giveBack(figureId, 2)).status).toBe(302);
  expect(await mails("season-returned", figureId)).toEqual([{ to_address: director.email }]);
  expect((await app.ask("/season/2024", { cookie })).body).toContain("Are the lane miles right?");

  const content = `${heads}\r\n${seasonRow({ salt_tons: "650" })}\r\n`;
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content }));
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(302);
  expect((await send(3)).status).toBe(409);
  expect((await send(4)).status).toBe(302);
  expect((await accept(figureId, 5)).status).toBe(302);
  expect(await stateOf(figureId)).toMatchObject({ state: "accepted", salt_lb: 1_300_000 });
  expect(await mails("season-sent", figureId)).toHaveLength(4);
  expect(await mails("season-accepted", figureId)).toHaveLength(1);
});

test("nothing changes in a season after it was sent, not by a file that was checked before", async () => {
  const figureId = await aSeasonFigure(app, town);
  const content = `${heads}\r\n${seasonRow({ salt_tons: "777" })}\r\n`;
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content }));
  await send(1);
  const answer = await acceptUpload(app, cookie, uploadId);
  expect(answer.status).toBe(409);
  expect(answer.body).toContain("Ask the coordinator to send it back first");
  expect(await stateOf(figureId)).toMatchObject({ state: "sent", version: 2, salt_lb: 1_200_000 });
  expect(await countOf(app, `upload WHERE id = ${uploadId} AND state = 'checked'`)).toBe(1);
});

test("a file accepted while the season is being sent: the one or the other, never both", async () => {
  for (let turn = 0; turn < 6; turn++) {
    const place = await aTown(app);
    const person = await signIn(app, await aPerson(app, { role: "director", town: place }));
    const figureId = await aSeasonFigure(app, place);
    const content = `${heads}\r\n${seasonRow({ salt_tons: "777" })}\r\n`;
    const uploadId = uploadIdOf(await sendFile(app, person, { content }));
    const [sent, filled] = await Promise.all([
      app.ask("/season/2024", { cookie: person, form: { version: "1" } }),
      acceptUpload(app, person, uploadId),
    ]);
    expect([sent.status, filled.status].sort()).toEqual([302, 409]);
    const isSent = sent.status === 302;
    expect(await stateOf(figureId)).toEqual({
      state: isSent ? "sent" : "draft",
      version: 2,
      salt_lb: isSent ? 1_200_000 : 1_554_000,
    });
  }
});

test("a draft is the town's own: the coordinator finds it nowhere, not beside a later season either", async () => {
  await aSeasonFigure(app, town, { startYear: 2022, saltLb: 987_654_321 });
  const draftId = await aSeasonFigure(app, town, { startYear: 2023, saltLb: 876_543_210 });
  const sentId = await aSeasonFigure(app, town, { state: "sent" });
  expect((await app.ask(`/network/review/${draftId}`, { cookie: first })).status).toBe(404);
  expect((await accept(draftId, 1)).status).toBe(404);
  for (const path of [`/network/review/${sentId}`, "/network/review", "/network"]) {
    for (const address of [path, `${path}.data`]) {
      const { status, body } = await app.ask(address, { cookie: first });
      expect(status).toBe(200);
      for (const figure of ["987654321", "493,827", "876543210", "438,271"])
        expect(body, address).not.toContain(figure);
      // Nor what a check would say from comparing with it.
      expect(body.includes(town.name) && /Salt per lane mile is about/.test(body), address).toBe(false);
    }
  }
});

test("clean seasons accepted together by two coordinators at once are accepted once each", async () => {
  await app.db.query("UPDATE season_figure SET state = 'accepted' WHERE state = 'sent'");
  const ids: number[] = [];
  for (let turn = 0; turn < 5; turn++) ids.push(await aSeasonFigure(app, await aTown(app), { state: "sent" }));
  const unseenId = await aSeasonFigure(app, await aTown(app), { state: "sent" });
  const seen: [string, string][] = [["season", "2024"], ...ids.map((id): [string, string] => ["figure", `${id}|1`])];
  const answers = await Promise.all(
    [first, second].map((by) => app.ask("/network/review", { cookie: by, form: seen })),
  );
  expect(answers.map(({ status }) => status)).toEqual([302, 302]);
  expect(await stateOf(unseenId)).toMatchObject({ state: "sent", version: 1 });
  for (const id of ids) {
    expect(await stateOf(id)).toMatchObject({ state: "accepted", version: 2 });
    expect(await deeds(id, "season-figure.accept")).toBe(1);
  }
});

test("every change has its entry in the trail: who, what, of which town, in which request", async () => {
  const figureId = await aSeasonFigure(app, town);
  const answer = await send(1);
  const [entry] = await rows(
    app,
    "SELECT actor_user_id, actor_role, town_id, action, request_id FROM audit_entry WHERE entity = 'season_figure' AND entity_id = ?",
    [figureId],
  );
  expect(entry).toEqual({
    actor_user_id: director.id,
    actor_role: "director",
    town_id: town.id,
    action: "season-figure.send",
    request_id: answer.headers["x-request-id"],
  });
});
