import { createServer, type Server } from "node:http";
import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import {
  aMaterial,
  aPerson,
  aSeason,
  aSeasonFigure,
  aTown,
  countOf,
  insert,
  minutesFromNow,
  type Person,
  rows,
  signIn,
} from "#tests/support/factories.ts";

let app: TestApp;
let weather: Server;
let reply: { status: number; body: string } = { status: 200, body: "[]" };
let asked: URL[] = [];
let coordinator: string;

beforeAll(async () => {
  weather = createServer((request, response) => {
    asked.push(new URL(request.url ?? "/", "http://weather.example"));
    response.writeHead(reply.status, { "content-type": "application/json" }).end(reply.body);
  });
  await new Promise<void>((resolve) => weather.listen(0, "127.0.0.1", resolve));
  const address = weather.address();
  const port = typeof address === "object" ? address?.port : null;
  process.env.WEATHER_URL = `http://127.0.0.1:${port}/access/services/data/v1`;
  app = await startApp();
  coordinator = await signIn(app, await aPerson(app, { role: "coordinator" }));
});

afterAll(async () => {
  expect(await app.close()).toEqual([]);
  await new Promise((resolve) => weather.close(resolve));
});

async function subjectsTo(person: Person) {
  const mails = await rows<{ subject: string }>(app, "SELECT subject FROM outbox_mail WHERE to_address = ?", [
    person.email,
  ]);
  return mails.map(({ subject }) => subject);
}

test("opening a season writes once to everybody of every town, but for those who said no", async () => {
  const town = await aTown(app);
  const [willing, unwilling] = [
    await aPerson(app, { role: "director", town }),
    await aPerson(app, { role: "recorder", town }),
  ];
  const cookie = await signIn(app, unwilling);
  expect((await app.ask("/account", { cookie })).body).toContain("a season is opened for figures");
  const choice: [string, string][] = [
    ["intent", "mail"],
    ["occasion", "season-reminder"],
  ];
  expect((await app.ask("/account", { cookie, form: choice })).status).toBe(302);

  const open = { intent: "open", startYear: "2031", opensOn: "2031-09-01", figuresDueOn: "2032-08-31", closesOn: "" };
  expect((await app.ask("/network/seasons", { cookie: coordinator, form: open })).status).toBe(302);
  expect((await app.ask("/network/seasons", { cookie: coordinator, form: open })).status).toBe(409);
  expect(
    (await app.ask("/network/seasons", { cookie: coordinator, form: { ...open, startYear: "2032", figuresDueOn: "" } }))
      .status,
  ).toBe(400);
  expect(await subjectsTo(willing)).toEqual(["2031–32 is open: figures are due 31 August 2032"]);
  expect(await subjectsTo(unwilling)).toEqual([]);
});

test("three days before figures are due the towns that have not sent are reminded, once, and the others are not", async () => {
  const [late, done] = [await aTown(app), await aTown(app)];
  const [lateDirector, doneDirector] = [
    await aPerson(app, { role: "director", town: late }),
    await aPerson(app, { role: "director", town: done }),
  ];
  await aSeason(app, 2017);
  const due = new Date(Date.now() + 2 * 86_400_000).toISOString().slice(0, 10);
  await app.db.query("UPDATE season SET figures_due_on = ? WHERE start_year = 2017", [due]);
  await aSeasonFigure(app, done, { startYear: 2017, state: "sent" });
  await app.tick();
  await app.tick();
  expect(await subjectsTo(lateDirector)).toEqual(["The figures of 2017–18 are due in 2 days"]);
  expect(await subjectsTo(doneDirector)).toEqual([]);
});

async function aStation() {
  return insert(app, "station", {
    code: `USC0099${String(Math.floor(Math.random() * 9000) + 1000)}`,
    name: "Sample Hill",
  });
}

async function fetchWeather(stationId: number) {
  const form = { intent: "fetch", stationId: String(stationId), seasonStartYear: "2016", clientRef: randomUUID() };
  expect((await app.ask("/network/stations?season=2016", { cookie: coordinator, form })).status).toBe(302);
  expect((await app.ask("/network/stations?season=2016", { cookie: coordinator, form })).status).toBe(302);
  await app.tick();
}

test("the worker asks the weather service once for a season, stores its days and leaves out what failed a check", async () => {
  await aSeason(app, 2016);
  const stationId = await aStation();
  const [station] = await rows<{ code: string }>(app, `SELECT code FROM station WHERE id = ${stationId}`);
  const day = (date: string, more: Record<string, string>) => ({ STATION: station?.code, DATE: date, ...more });
  asked = [];
  reply = {
    status: 200,
    body: JSON.stringify([
      day("2017-01-03", {
        TMAX: " 20",
        TMAX_ATTRIBUTES: ",,7,0700",
        TMIN: "-4",
        SNOW: "0.0",
        SNOW_ATTRIBUTES: "T,,7,0700",
        SNWD: "3.0",
      }),
      day("2017-01-02", { TMAX: "88", TMAX_ATTRIBUTES: ",X,7,0700", TMIN: "", SNOW: "4.1" }),
    ]),
  };
  await fetchWeather(stationId);
  expect(asked).toHaveLength(1);
  expect(asked[0]?.searchParams.get("startDate")).toBe("2016-07-01");
  expect(
    await rows(
      app,
      `SELECT DATE_FORMAT(day, '%m-%d') AS day, tmax_f, tmin_f, snowfall_in, snow_depth_in, has_trace_snowfall AS trace, source
         FROM weather_day WHERE station_id = ${stationId} ORDER BY day`,
    ),
  ).toEqual([
    { day: "01-02", tmax_f: null, tmin_f: null, snowfall_in: 4.1, snow_depth_in: null, trace: 0, source: "service" },
    { day: "01-03", tmax_f: 20, tmin_f: -4, snowfall_in: 0, snow_depth_in: 3, trace: 1, source: "service" },
  ]);
});

test("a service that refuses changes nothing, and its reason stands on the page", async () => {
  await aSeason(app, 2016);
  const stationId = await aStation();
  await insert(app, "weather_day", {
    station_id: stationId,
    day: "2017-01-02",
    tmax_f: 11,
    source: "service",
    fetched_at: minutesFromNow(0),
  });
  reply = { status: 400, body: JSON.stringify({ errorMessage: "no such station" }) };
  await fetchWeather(stationId);
  for (let turn = 0; turn < 3; turn++) {
    await app.db.query("UPDATE job SET run_after = ? WHERE kind = 'fetch-weather' AND state = 'ready'", [
      minutesFromNow(-1),
    ]);
    await app.tick();
  }
  expect(await rows(app, `SELECT tmax_f FROM weather_day WHERE station_id = ${stationId}`)).toEqual([{ tmax_f: 11 }]);
  const page = (await app.ask("/network/stations?season=2016", { cookie: coordinator })).body;
  expect(page).toContain("refused the request");
});

test("a town attached to a station sees its winter; missing days are counted, not filled in", async () => {
  const town = await aTown(app);
  const stationId = await aStation();
  const cookie = await signIn(app, await aPerson(app, { role: "recorder", town }));
  await aSeason(app, 2015);
  expect((await app.ask("/season/2015/winter", { cookie })).body).toContain("not attached to a weather station");
  const attach = { intent: "attach", townId: String(town.id), stationId: String(stationId), seasonStartYear: "2015" };
  expect((await app.ask("/network/stations", { cookie: coordinator, form: attach })).status).toBe(302);
  expect((await app.ask("/season/2015/winter", { cookie })).body).toContain("Nothing was reported");
  // December to February with a high of 30 and a low of 20 °F each day: 1 + 2 points; six days are missing.
  for (let place = 0; place < 91; place++) {
    const day = new Date(Date.UTC(2015, 11, 1 + place)).toISOString().slice(0, 10);
    if (place >= 40 && place < 46) continue;
    await insert(app, "weather_day", {
      station_id: stationId,
      day,
      tmax_f: 30,
      tmin_f: 20,
      snowfall_in: 0,
      snow_depth_in: 0,
      source: "upload",
      fetched_at: minutesFromNow(0),
    });
  }
  // Days outside the winter, so that its span is known.
  for (const day of ["2015-10", "2015-11", "2016-03", "2016-04"]) {
    for (let date = 1; date <= 30; date++) {
      await insert(app, "weather_day", {
        station_id: stationId,
        day: `${day}-${String(date).padStart(2, "0")}`,
        tmax_f: 50,
        tmin_f: 35,
        snowfall_in: 0,
        snow_depth_in: 0,
        source: "upload",
        fetched_at: minutesFromNow(0),
      });
    }
  }
  const page = (await app.ask("/season/2015/winter", { cookie })).body;
  expect(page).toContain("came to 255 points");
  expect(page).toContain("highest temperature on six days");
});

test("roads and materials are the town's own: another town's id is not there, and a recorder sets no price", async () => {
  const [town, other] = [await aTown(app), await aTown(app)];
  const [recorder, director] = [
    await signIn(app, await aPerson(app, { role: "recorder", town })),
    await signIn(app, await aPerson(app, { role: "director", town })),
  ];
  const foreign = await signIn(app, await aPerson(app, { role: "director", town: other }));
  await aSeason(app, 2024);
  const road = { name: "Local", laneMiles: "80.5", seasonStartYear: "2024" };
  expect((await app.ask("/season/roads", { cookie: recorder, form: road })).status).toBe(302);
  expect((await app.ask("/season/roads", { cookie: recorder, form: { ...road, laneMiles: "81" } })).status).toBe(302);
  const [length] = await rows<{ id: number; lane_miles: number }>(
    app,
    `SELECT id, lane_miles FROM road_class WHERE town_id = ${town.id}`,
  );
  expect(length?.lane_miles).toBe(81);
  const removal = { intent: "remove", roadClassId: String(length?.id) };
  expect((await app.ask("/season/roads", { cookie: foreign, form: removal })).status).toBe(404);

  const materialId = await aMaterial(app, town);
  const price = { materialId: String(materialId), seasonStartYear: "2024", saltPercent: "98", usdPerTon: "71.25" };
  expect((await app.ask("/season/materials", { cookie: recorder, form: price })).status).toBe(403);
  expect((await app.ask("/season/materials", { cookie: foreign, form: price })).status).toBe(404);
  expect((await app.ask("/season/materials", { cookie: director, form: price })).status).toBe(302);
  expect(await rows(app, `SELECT cents_per_ton FROM material_price WHERE material_id = ${materialId}`)).toEqual([
    { cents_per_ton: 7125 },
  ]);
  const again = { intent: "add", seasonStartYear: "2024", name: "Salt", kind: "salt", saltPercent: "100" };
  expect((await app.ask("/season/materials", { cookie: director, form: again })).status).toBe(409);
  expect(await countOf(app, `material WHERE town_id = ${town.id}`)).toBe(1);
});
