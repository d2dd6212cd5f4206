import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import {
  aCalibration,
  aMaterial,
  aPerson,
  aSeason,
  aSeasonFigure,
  aToken,
  aTown,
  aTruck,
  signIn,
} from "#tests/support/factories.ts";
import { contentDigest, countOf } from "#tests/support/rows.ts";

/* A change is made when one of our own pages asks for it, and never when another site does. */

let app: TestApp;
let director: string;
let coordinator: string;
let bearer: string;
let calibrationId: number;

beforeAll(async () => {
  app = await startApp();
  await aSeason(app, 2024);
  const town = await aTown(app);
  const [truckId, materialId] = [await aTruck(app, town), await aMaterial(app, town)];
  calibrationId = await aCalibration(app, { town, truckId, materialId, state: "ready" });
  await aSeasonFigure(app, town);
  director = await signIn(app, await aPerson(app, { role: "director", town }));
  coordinator = await signIn(app, await aPerson(app, { role: "coordinator" }));
  bearer = await aToken(app, await aPerson(app, { role: "analyst" }));
});

afterAll(async () => expect(await app.close()).toEqual([]));

const methods = ["POST", "PUT", "PATCH", "DELETE"];
const type = "application/x-www-form-urlencoded";

function changes(): { path: string; cookie: string; form: Record<string, string> }[] {
  const invitation = { clientRef: randomUUID(), name: "Some One", email: "some.one@sample.example", role: "analyst" };
  return [
    { path: "/season/2024", cookie: director, form: { version: "1" } },
    { path: "/fleet", cookie: director, form: { calibrationId: String(calibrationId) } },
    { path: "/dataset", cookie: director, form: {} },
    { path: "/logout", cookie: director, form: {} },
    { path: "/network/people", cookie: coordinator, form: invitation },
    { path: "/internal/tick", cookie: coordinator, form: {} },
    { path: "/no/such/page", cookie: director, form: {} },
  ];
}

test.each<[string, Record<string, string>]>([
  ["another site", { origin: "http://elsewhere.example" }],
  ["another port of this machine", { origin: "http://127.0.0.1:1" }],
  ["this machine by another name", { origin: "http://localhost" }],
  ["our own host by https", { origin: "https" }],
  ["a site whose name begins as ours", { origin: "longer" }],
  ["nobody: Origin null", { origin: "null" }],
  ["nobody: an Origin that is no address", { origin: "not an address" }],
  ["nobody: an empty Origin", { origin: "" }],
  ["nobody: no Origin at all", {}],
  ["no Origin, another site by Sec-Fetch-Site", { "sec-fetch-site": "cross-site" }],
  ["no Origin, a neighbouring site by Sec-Fetch-Site", { "sec-fetch-site": "same-site" }],
  ["no Origin, a typed address by Sec-Fetch-Site", { "sec-fetch-site": "none" }],
  ["our Origin, but another site by Sec-Fetch-Site", { origin: "ours", "sec-fetch-site": "cross-site" }],
])("a change asked for by %s is refused, by every method and on every kind of page", async (_who, given) => {
  const written: Record<string, string> = {
    https: app.origin.replace("http:", "https:"),
    longer: `${app.origin}.elsewhere.example`,
    ours: app.origin,
  };
  const headers = given.origin === undefined ? given : { ...given, origin: written[given.origin] ?? given.origin };
  const before = await contentDigest(app);
  const sessions = await countOf(app, "session");
  for (const { path, cookie, form } of changes()) {
    for (const address of [path, `${path}.data`]) {
      for (const method of methods) {
        const body = new URLSearchParams(form).toString();
        const answer = await app.ask(address, { method, cookie, body, headers: { "content-type": type, ...headers } });
        expect([400, 403], `${method} ${address} → ${answer.status}`).toContain(answer.status);
        expect(answer.headers).not.toHaveProperty("set-cookie");
      }
    }
  }
  expect(await contentDigest(app)).toEqual(before);
  expect(await countOf(app, "session")).toBe(sessions);
});

test.each(["text/plain", "application/jsonX", "multipart/form-dataX", "application/x-www-form-urlencoded2", ""])(
  "a change of the type “%s” is no form, and refused",
  async (wrongType) => {
    const before = await contentDigest(app);
    for (const { path, cookie, form } of changes()) {
      const headers = { origin: app.origin, "content-type": wrongType };
      const answer = await app.ask(path, {
        method: "POST",
        cookie,
        body: new URLSearchParams(form).toString() || "x=1",
        headers,
      });
      expect(answer.status, path).toBe(400);
    }
    expect(await contentDigest(app)).toEqual(before);
  },
);

test("JSON to a page that reads a form is no form, however it is filled in", async () => {
  const before = await contentDigest(app);
  for (const { path, cookie, form } of changes().filter((change) => Object.keys(change.form).length > 0)) {
    const headers = { origin: app.origin, "content-type": "application/json" };
    const answer = await app.ask(path, { method: "POST", cookie, body: JSON.stringify(form), headers });
    expect(answer.status, path).toBe(400);
  }
  expect(await contentDigest(app)).toEqual(before);
});

test("a body without a type is no form either", async () => {
  const answer = await app.ask("/dataset", {
    method: "POST",
    cookie: director,
    body: "x=1",
    headers: { origin: app.origin },
  });
  expect(answer.status).toBe(400);
});

test("a token and a session together are refused, whatever is asked", async () => {
  for (const method of ["GET", "HEAD", ...methods]) {
    for (const path of ["/api/v1/editions", "/today", "/dataset", "/internal/tick"]) {
      const answer = await app.ask(path, { method, cookie: director, token: bearer });
      expect(answer.status, `${method} ${path}`).toBe(400);
    }
  }
});

test("forms that are broken are answered with a sentence, and change nothing", async () => {
  const before = await contentDigest(app);
  const broken: [string, string][] = [
    ["multipart/form-data; boundary=b", "no boundary in sight"],
    ["multipart/form-data", "--b\r\n\r\n--b--"],
    ["multipart/form-data; boundary=b", '--b\r\nContent-Disposition: form-data; name="version"\r\n\r\n1'],
    ["multipart/form-data; boundary=b", ""],
  ];
  const pages = ["/season/2024", "/fleet", "/account", "/uploads"].map((path) => ({ path, cookie: director }));
  const networkPages = ["/network/people", "/network/review", "/network/editions", "/workshops"];
  for (const { path, cookie } of [...pages, ...networkPages.map((path) => ({ path, cookie: coordinator }))]) {
    for (const [contentType, body] of broken) {
      const headers = { origin: app.origin, "content-type": contentType };
      const answer = await app.ask(path, { method: "POST", cookie, body, headers });
      expect(answer.status, `${path} ${contentType} ${body}`).toBe(400);
      expect(answer.body).toContain("did not arrive whole");
    }
  }
  expect(await contentDigest(app)).toEqual(before);
});

test("the same change asked for by our own page is made, with an Origin or without", async () => {
  const headers = { "sec-fetch-site": "same-origin", "content-type": type };
  const accepted = await app.ask("/dataset", { method: "POST", cookie: director, body: "", headers });
  expect([accepted.status, accepted.headers.location]).toEqual([302, "/dataset"]);
  const sent = await app.ask("/season/2024", { cookie: director, form: { version: "1" } });
  expect([sent.status, sent.headers.location]).toEqual([302, "/season/2024"]);
  expect(await countOf(app, "season_figure WHERE state = 'sent'")).toBe(1);
});

test("a change without a body needs no type", async () => {
  const answer = await app.ask("/dataset", { method: "POST", cookie: coordinator, headers: { origin: app.origin } });
  expect([answer.status, answer.headers.location]).toEqual([302, "/dataset"]);
});

test("signing out is a change too: reading its address ends nothing", async () => {
  const cookie = await signIn(app, { id: 1 });
  expect((await app.ask("/logout", { cookie })).status).toBe(302);
  expect((await app.ask("/today", { cookie })).status).toBe(200);
});
