import { once } from "node:events";
import { createServer } from "node:http";
import { delay, http, HttpResponse, passthrough } from "msw";
import { setupServer } from "msw/node";
import { afterAll, afterEach, beforeAll, expect, test } from "vitest";
import { calendarDays } from "#app/domain/severity/season-days.ts";
import { winterSeverity } from "#app/domain/severity/winter-severity.ts";
import { summariesClient, type SummariesSettings } from "#app/lib/weather/daily-summaries.server.ts";

const baseUrl = "http://weather.test/data/v1";
const server = setupServer();

beforeAll(() => server.listen({ onUnhandledRequest: "error" }));
afterEach(() => server.resetHandlers());
afterAll(() => server.close());

const station = { stationId: "USC00000001", seasonStartYear: 2025 };

/** A client that does not wait between attempts, and the waits it would have made. */
function aClient(settings: Partial<SummariesSettings> = {}) {
  const waitsMs: number[] = [];
  const client = summariesClient({
    fetch: globalThis.fetch,
    baseUrl,
    pause: async (ms) => waitsMs.push(ms),
    ...settings,
  });
  return { ...client, waitsMs };
}

/** Each request takes the next answer; the last one stands for all that follow. */
function answers(...replies: (() => Response | Promise<Response>)[]) {
  const asked: URL[] = [];
  server.use(
    http.get(baseUrl, ({ request }) => {
      asked.push(new URL(request.url));
      const reply = replies[Math.min(asked.length, replies.length) - 1];
      return reply ? reply() : HttpResponse.error();
    }),
  );
  return asked;
}

function rowOf(day: string, own: Record<string, string> = {}) {
  return { DATE: day, STATION: "USC00000001", TMAX: "50", TMIN: "40", SNOW: "0.0", SNWD: "0", PRCP: "0.00", ...own };
}

const season = calendarDays("2025-07-01", "2026-06-30");

test("a good season is asked for as documented and scores: one cold day with 4 inches of snow is 16 points", async () => {
  const rows = season.map((day) =>
    rowOf(day, day === "2026-01-15" ? { TMAX: "20", TMIN: "0", SNOW: "4.0", SNWD: "2" } : {}),
  );
  const asked = answers(() => HttpResponse.json(rows));
  const found = await aClient().season(station);
  expect(Object.fromEntries(asked[0]?.searchParams ?? [])).toEqual({
    dataset: "daily-summaries",
    stations: "USC00000001",
    startDate: "2025-07-01",
    endDate: "2026-06-30",
    dataTypes: "TMAX,TMIN,SNOW,SNWD,PRCP",
    units: "standard",
    includeAttributes: "true",
    format: "json",
  });
  if (!found.ok) throw new Error(found.message);
  expect(found.weather.days).toHaveLength(365);
  expect(winterSeverity(found.weather.days, { seasonStartYear: 2025 })).toMatchObject({
    totalPoints: 2 + 6 + 6 + 2,
    missingDayCounts: { tmax: 0, tmin: 0, snowfall: 0, snowDepth: 0 },
  });
});

test("rows out of order, padded, empty, flagged, traced and absent are what they are, and nothing is filled in", async () => {
  answers(() =>
    HttpResponse.json([
      rowOf("2026-01-17", { TMAX: "  28", TMIN: "", SNOW: "0.0", SNOW_ATTRIBUTES: "T,,W,2400" }),
      rowOf("2026-01-15", { TMAX: "99", TMAX_ATTRIBUTES: ",S,W,2400", SNOW: "T" }),
      { DATE: "2026-01-18", STATION: "USC00000001", TMAX: "30" },
    ]),
  );
  const found = await aClient().season(station);
  if (!found.ok) throw new Error(found.message);
  expect(
    found.weather.days.map(({ day, tmaxF, tminF, snowfallIn, isSnowfallTrace }) => [
      day,
      tmaxF,
      tminF,
      snowfallIn,
      isSnowfallTrace,
    ]),
  ).toEqual([
    ["2026-01-15", null, 40, 0, true],
    ["2026-01-17", 28, null, 0, true],
    ["2026-01-18", 30, null, null, false],
  ]);
  expect(found.weather.tallies.TMAX).toMatchObject({ readCount: 2, failedCheckCount: 1 });
  expect(found.weather.tallies.TMIN).toMatchObject({ readCount: 1, blankCount: 1 });
});

test("ten days that the service lacks are ten missing days of the season", async () => {
  const gap = calendarDays("2026-01-10", "2026-01-19");
  answers(() => HttpResponse.json(season.filter((day) => !gap.includes(day)).map((day) => rowOf(day))));
  const found = await aClient().season(station);
  if (!found.ok) throw new Error(found.message);
  expect(winterSeverity(found.weather.days, { seasonStartYear: 2025 })?.missingDayCounts).toEqual({
    tmax: 10,
    tmin: 10,
    snowfall: 10,
    snowDepth: 10,
  });
});

test("an empty list is a good answer without a day", async () => {
  answers(() => HttpResponse.json([]));
  expect(await aClient().season(station)).toMatchObject({ ok: true, weather: { days: [] }, strayRowCount: 0 });
});

test("rows of another station, of no day and outside the season are counted and left out", async () => {
  answers(() =>
    HttpResponse.json([
      rowOf("2026-01-15"),
      rowOf("2026-01-16", { STATION: "USC00000002" }),
      rowOf("2026-02-30"),
      rowOf("2026-07-01"),
    ]),
  );
  const found = await aClient().season(station);
  if (!found.ok) throw new Error(found.message);
  expect(found.strayRowCount).toBe(3);
  expect(found.weather.days.map(({ day }) => day)).toEqual(["2026-01-15"]);
});

test("400 with JSON is a refusal in the service's own words, and is not asked again", async () => {
  const asked = answers(() =>
    HttpResponse.json({ errorCode: 400, errorMessage: "no such\ndata type" }, { status: 400 }),
  );
  expect(await aClient().season(station)).toMatchObject({
    ok: false,
    reason: "refused",
    status: 400,
    detail: '{"errorCode":400,"errorMessage":"no such\\ndata type"}',
    attemptCount: 1,
  });
  expect(asked).toHaveLength(1);
});

test("the service's words are cut to 200 characters on one line", async () => {
  answers(() => HttpResponse.text(`bad\r\n\u0007 request ${"x".repeat(500)}`, { status: 404 }));
  const found = await aClient().season(station);
  if (found.ok) throw new Error("a 404 is no weather");
  expect(found.detail).toHaveLength(200);
  expect(found.detail?.startsWith("bad request xxx")).toBe(true);
});

test("503 twice and then a season: three attempts, half a second and a second apart", async () => {
  const ill = () => new HttpResponse(null, { status: 503 });
  answers(ill, ill, () => HttpResponse.json([rowOf("2026-01-15")]));
  const client = aClient();
  expect(await client.season(station)).toMatchObject({ ok: true, attemptCount: 3 });
  expect(client.waitsMs).toEqual([500, 1000]);
});

test("a wait that the service asks for is kept, to 30 seconds at the most", async () => {
  const busy = (seconds: string) => () => new HttpResponse(null, { status: 429, headers: { "Retry-After": seconds } });
  answers(busy("7"), busy("86400"), busy("soon"), () => HttpResponse.json([]));
  const client = aClient({ attempts: 4 });
  expect(await client.season(station)).toMatchObject({ ok: true, attemptCount: 4 });
  expect(client.waitsMs).toEqual([7000, 30_000, 2000]);
});

test("a service that stays ill is given up after three attempts, one that cannot be reached likewise", async () => {
  const asked = answers(() => new HttpResponse(null, { status: 502 }));
  expect(await aClient().season(station)).toMatchObject({
    ok: false,
    reason: "unavailable",
    status: 502,
    attemptCount: 3,
  });
  expect(asked).toHaveLength(3);
  server.resetHandlers();
  answers(() => HttpResponse.error());
  expect(await aClient().season(station)).toMatchObject({
    ok: false,
    reason: "unreachable",
    status: null,
    attemptCount: 3,
  });
});

test("no answer within the time allowed is a timeout, also when only the body hangs", async () => {
  answers(async () => {
    await delay("infinite");
    return HttpResponse.json([]);
  });
  expect(await aClient({ timeoutMs: 40, attempts: 2 }).season(station)).toMatchObject({
    reason: "timeout",
    attemptCount: 2,
  });
  server.resetHandlers();
  answers(() => new HttpResponse(new ReadableStream({ start: (body) => body.enqueue(new TextEncoder().encode("[")) })));
  expect(await aClient({ timeoutMs: 40, attempts: 1 }).season(station)).toMatchObject({ reason: "timeout" });
});

test("a real connection that begins its answer and falls silent is a timeout too", async () => {
  const silent = createServer((_, reply) => reply.write("["));
  silent.listen(0, "127.0.0.1");
  await once(silent, "listening");
  const address = silent.address();
  if (address === null || typeof address === "string") throw new Error("the server has a port");
  const ownUrl = `http://127.0.0.1:${address.port}/`;
  server.use(http.get(ownUrl, () => passthrough()));
  const found = await aClient({ baseUrl: ownUrl, timeoutMs: 80, attempts: 1 }).season(station);
  silent.closeAllConnections();
  silent.close();
  expect(found).toMatchObject({ ok: false, reason: "timeout" });
});

test("CSV, HTML and cut-off JSON are no JSON, and JSON of another shape is unexpected", async () => {
  const reasons: string[] = [];
  for (const body of ['"STATION","DATE"\n"USC00000001","2026-01-15"', "<html>", '[{"DATE":"2026-']) {
    answers(() => HttpResponse.text(body));
    const found = await aClient().season(station);
    reasons.push(found.ok ? "ok" : found.reason);
  }
  for (const body of [{}, ["2026-01-15"], [{ TMAX: { value: 1 } }], Array.from({ length: 2001 }, () => ({}))]) {
    answers(() => HttpResponse.json(body));
    const found = await aClient().season(station);
    reasons.push(found.ok ? "ok" : found.reason);
  }
  expect(reasons).toEqual(["not-json", "not-json", "not-json", "unexpected", "unexpected", "unexpected", "unexpected"]);
});

test("a body of over 4 MB is not read to its end", async () => {
  answers(() => HttpResponse.text("x".repeat(4_000_001)));
  expect(await aClient().season(station)).toMatchObject({ ok: false, reason: "too-long" });
});

test("a redirect is not followed", async () => {
  const elsewhere: string[] = [];
  server.use(
    http.get("http://elsewhere.test/", ({ request }) => {
      elsewhere.push(request.url);
      return HttpResponse.json([]);
    }),
  );
  answers(() => HttpResponse.redirect("http://elsewhere.test/", 302));
  expect(await aClient({ attempts: 1 }).season(station)).toMatchObject({ ok: false, reason: "unreachable" });
  expect(elsewhere).toEqual([]);
});

test("three seasons are three requests, and the running one is asked for to its last day", async () => {
  const asked = answers(() => HttpResponse.json([]));
  const pages = aClient().seasons({
    stationId: "USC00000001",
    seasonStartYears: [2023, 2024, 2025],
    throughDay: "2026-01-15",
  });
  const years: number[] = [];
  for await (const page of pages) years.push(page.seasonStartYear);
  expect(years).toEqual([2023, 2024, 2025]);
  expect(asked.map(({ searchParams }) => [searchParams.get("startDate"), searchParams.get("endDate")])).toEqual([
    ["2023-07-01", "2024-06-30"],
    ["2024-07-01", "2025-06-30"],
    ["2025-07-01", "2026-01-15"],
  ]);
});

test("a season that fails is the last page", async () => {
  const asked = answers(
    () => HttpResponse.json([]),
    () => new HttpResponse(null, { status: 400 }),
  );
  const outcomes: boolean[] = [];
  for await (const page of aClient().seasons({ stationId: "USC00000001", seasonStartYears: [2022, 2023, 2024] })) {
    outcomes.push(page.ok);
  }
  expect(outcomes).toEqual([true, false]);
  expect(asked).toHaveLength(2);
});

test("a caller who gives up gets the own reason back, and no further request is made", async () => {
  const asked = answers(() => new HttpResponse(null, { status: 503 }));
  const giveUp = new AbortController();
  const client = aClient({ pause: async () => giveUp.abort(new Error("the page was left")) });
  await expect(client.season({ ...station, signal: giveUp.signal })).rejects.toThrow("the page was left");
  expect(asked).toHaveLength(1);
});

test("what is no identifier, no day of the season or no number of attempts never leaves the program", async () => {
  const client = aClient();
  await expect(client.season({ ...station, stationId: "USC1&stations=x" })).rejects.toThrow(RangeError);
  await expect(client.season({ ...station, throughDay: "2026-07-01" })).rejects.toThrow(RangeError);
  expect(() => summariesClient({ fetch: globalThis.fetch, baseUrl, attempts: 0 })).toThrow(RangeError);
});
