import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import {
  aMaterial,
  aPerson,
  aSeason,
  aSeasonFigure,
  aTown,
  aTruck,
  signIn,
  type Town,
} from "#tests/support/factories.ts";
import { countOf, rows } from "#tests/support/rows.ts";
import { acceptUpload, problemsIn, progressOf, sendFile, uploadIdOf, wordsOf } from "#tests/support/upload-files.ts";

/* Storm logs: columns that are matched and remembered, names explained once, cells put right, rows that give way. */

let app: TestApp;
let town: Town;
let cookie: string;
let ids: { truck12: number; truck7: number; salt: number; brine: number };

beforeAll(async () => {
  app = await startApp();
  for (const year of [2023, 2024]) await aSeason(app, year);
});

beforeEach(async () => {
  town = await aTown(app);
  ids = {
    truck12: await aTruck(app, town, { unitNumber: "12" }),
    truck7: await aTruck(app, town, { unitNumber: "7" }),
    salt: await aMaterial(app, town),
    brine: await aMaterial(app, town, { name: "Brine", kind: "brine" }),
  };
  cookie = await signIn(app, await aPerson(app, { role: "recorder", town }));
});

afterAll(async () => expect(await app.close()).toEqual([]));

const heads = "start_date,start_time,end_date,end_time,kind,truck,lane_miles,salt_tons,brine_gal,note";
const good = [
  "2024-12-04,04:30,2024-12-04,11:00,snow,12,24,5.5,,",
  "2024-12-04,04:40,2024-12-04,10:30,snow,7,20,4.25,120,north hill",
  "2024-12-19,22:00,,05:30,freezing rain,12,24,6,,past midnight",
];
const log = (lines: readonly string[], head = heads) => `${[head, ...lines].join("\r\n")}\r\n`;

async function send(content: string | Uint8Array, fileName = "log.csv") {
  const answer = await sendFile(app, cookie, { content, kind: "storms", fileName });
  expect(answer.status, answer.body.slice(0, 300)).toBe(302);
  return uploadIdOf(answer);
}

function post(uploadId: number, form: [string, string][], path = "") {
  return app.ask(`/uploads/${uploadId}${path}`, { cookie, form });
}

function storms() {
  return rows(
    app,
    `SELECT CAST(s.started_at AS CHAR) AS began, CAST(s.ended_at AS CHAR) AS ended, s.kind, t.unit_number AS truck,
            m.name AS material, u.used_lb, u.used_gal, s.upload_row
       FROM storm s LEFT JOIN truck t ON t.id = s.truck_id LEFT JOIN storm_material u ON u.storm_id = s.id
       LEFT JOIN material m ON m.id = u.material_id WHERE s.town_id = ? ORDER BY s.upload_row, m.name`,
    [town.id],
  );
}

test("a log with the template's heads is checked without a question and stored row by row", async () => {
  const uploadId = await send(log(good));
  expect(await progressOf(app, uploadId)).toMatchObject({ state: "checked", rows_ok: 3, rows_read: 3 });
  expect(await problemsIn(app, uploadId)).toEqual([]);
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(0);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(302);
  expect(await storms()).toEqual([
    {
      began: "2024-12-04 04:30:00",
      ended: "2024-12-04 11:00:00",
      kind: "snow",
      truck: "12",
      material: "Salt",
      used_lb: 11_000,
      used_gal: null,
      upload_row: 2,
    },
    {
      began: "2024-12-04 04:40:00",
      ended: "2024-12-04 10:30:00",
      kind: "snow",
      truck: "7",
      material: "Brine",
      used_lb: null,
      used_gal: 120,
      upload_row: 3,
    },
    {
      began: "2024-12-04 04:40:00",
      ended: "2024-12-04 10:30:00",
      kind: "snow",
      truck: "7",
      material: "Salt",
      used_lb: 8_500,
      used_gal: null,
      upload_row: 3,
    },
    {
      began: "2024-12-19 22:00:00",
      ended: "2024-12-20 05:30:00",
      kind: "freezing-rain",
      truck: "12",
      material: "Salt",
      used_lb: 12_000,
      used_gal: null,
      upload_row: 4,
    },
  ]);
  const page = await app.ask(`/uploads/${uploadId}`, { cookie });
  expect(wordsOf(page)).toContain("Accepted: three lines of the storm log, 4 December 2024 to 19 December 2024.");
});

test("heads nobody knows are asked for, and known in the next file", async () => {
  const other = "Storm Date,Rig,Stuff,How Much";
  const uploadId = await send(log(["12/04/2024,12,Salt,9400", "12/19/2024,7,salt,8800"], other));
  expect((await progressOf(app, uploadId)).state).toBe("matching");
  const page = await app.ask(`/uploads/${uploadId}/columns`, { cookie });
  expect(wordsOf(page)).toContain("Which column holds the material used?");
  const choice: [string, string][] = [
    ["field", "started_on"],
    ["unit", ""],
    ["field", "truck"],
    ["unit", ""],
    ["field", "material"],
    ["unit", ""],
    ["field", ""],
    ["unit", ""],
    ["decimalMark", "point"],
    ["dateOrder", "month-first"],
  ];
  const refused = await post(uploadId, choice, "/columns");
  expect(refused.status).toBe(400);
  expect(wordsOf(refused)).toContain("No column is chosen for: material used.");
  const answered = choice.map(([name, value], place): [string, string] =>
    place === 6 ? [name, "quantity"] : place === 7 ? [name, "lb"] : [name, value],
  );
  expect((await post(uploadId, answered, "/columns")).status).toBe(302);
  expect(await progressOf(app, uploadId)).toMatchObject({ state: "checked", rows_ok: 2 });
  await acceptUpload(app, cookie, uploadId);
  expect(await storms()).toMatchObject([
    { used_lb: 9400, truck: "12" },
    { used_lb: 8800, truck: "7" },
  ]);

  const next = await send(log(["01/14/2025,12,Salt,7000"], other));
  expect(await progressOf(app, next)).toMatchObject({ state: "checked", rows_ok: 1 });
});

test("a name is explained once for all its rows and for the next file", async () => {
  const lines = [...good, ...[5, 6, 7].map((day) => `2025-01-0${day},,,,snow,Old Red,10,2,,`)];
  const uploadId = await send(log(lines));
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 3, rows_error: 3 });
  const page = await app.ask(`/uploads/${uploadId}`, { cookie });
  expect(wordsOf(page)).toContain("3 of 6 rows are ready. The other 3 fall to one answer: which truck is “Old Red”?");
  const form: [string, string][] = [
    ["intent", "names"],
    ["sort", "truck"],
    ["code", "unknown-truck"],
    ["field", "truck"],
    ["name", "Old Red"],
    ["meaning", String(ids.truck7)],
  ];
  expect((await post(uploadId, form)).status).toBe(302);
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 6, rows_error: 0 });
  const next = await send(log(["2025-02-01,,,,snow,OLD RED,10,2,,"]));
  expect(await progressOf(app, next)).toMatchObject({ rows_ok: 1 });
});

test("a name cannot be explained by another town's truck", async () => {
  const other = await aTruck(app, await aTown(app), { unitNumber: "77" });
  const uploadId = await send(log(["2025-01-05,,,,snow,Old Red,10,2,,"]));
  const form: [string, string][] = [
    ["intent", "names"],
    ["sort", "truck"],
    ["code", "unknown-truck"],
    ["field", "truck"],
    ["name", "Old Red"],
    ["meaning", String(other)],
  ];
  expect((await post(uploadId, form)).status).toBe(404);
  expect(await countOf(app, `other_name WHERE town_id = ${town.id}`)).toBe(0);
});

test("tons that are pounds are read as pounds in one answer", async () => {
  const uploadId = await send(log([...good, "2025-01-05,,,,snow,12,10,9400,,", '2025-01-06,,,,snow,7,10,"12,200",,']));
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 3, rows_check: 2 });
  const page = await app.ask(`/uploads/${uploadId}`, { cookie });
  expect(wordsOf(page)).toContain("Read all 2 as pounds");
  const form: [string, string][] = [
    ["intent", "as-pounds"],
    ["code", "tons-or-pounds"],
    ["field", `used:${ids.salt}`],
  ];
  expect((await post(uploadId, form)).status).toBe(302);
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 5, rows_check: 0 });
  await acceptUpload(app, cookie, uploadId);
  const used = (await storms()) as { used_lb: number; upload_row: number }[];
  expect(used.filter(({ upload_row }) => upload_row > 4).map(({ used_lb }) => used_lb)).toEqual([9400, 12_200]);
});

test("single cells are put right in place, and a rejected row can be left out on purpose", async () => {
  const uploadId = await send(log([...good, "2025-02-31,,,,snow,12,10,2,,", "2025-01-06,,,,snow,7,10,-4,,"]));
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 3, rows_error: 2 });
  expect(await problemsIn(app, uploadId)).toMatchObject([
    { row: 5, field: "started_on", value: "2025-02-31", code: "not-a-date", severity: "error" },
    { row: 6, field: `used:${ids.salt}`, value: "-4", code: "negative", severity: "error" },
  ]);
  const list = await app.ask(`/uploads/${uploadId}/problems`, { cookie });
  expect(list.body).toContain("row_in_file,state,reason,start_date");
  expect(list.body).toContain(`5,not taken,"start_date: This is no day. Write it as`);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(409);
  const cells: [string, string][] = [
    ["intent", "cells"],
    ["cellField", "started_on"],
    ["row", "5"],
    ["was", "2025-02-31"],
    ["text", "2025-02-28"],
  ];
  expect((await post(uploadId, cells)).status).toBe(302);
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 4, rows_error: 1 });
  expect((await post(uploadId, [["intent", "accept-without"]])).status).toBe(302);
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(4);
  expect(await countOf(app, `storm WHERE town_id = ${town.id} AND started_at = '2025-02-28'`)).toBe(1);
});

test("a row that stands twice is asked about, and may stand or be left out", async () => {
  const uploadId = await send(log([...good, good[0] ?? ""]));
  expect(await problemsIn(app, uploadId)).toMatchObject([{ row: 5, code: "twice", severity: "check" }]);
  await post(uploadId, [
    ["intent", "left-out"],
    ["code", "twice"],
    ["field", ""],
  ]);
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_ok: 3, rows_check: 0, rows_left_out: 1 });
  await post(uploadId, [["intent", "bring-back"]]);
  expect(await progressOf(app, uploadId)).toMatchObject({ rows_left_out: 0 });
  await acceptUpload(app, cookie, uploadId);
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(4);
});

test("a newer file of the same days takes the place of the older one, which stays in the history", async () => {
  const first = await send(log(good));
  await acceptUpload(app, cookie, first);
  const second = await send(
    log([...good.slice(0, 2), "2024-12-19,22:00,,05:30,freezing rain,12,24,6.5,,corrected"]),
    "log2.csv",
  );
  const page = await app.ask(`/uploads/${second}`, { cookie });
  expect(wordsOf(page)).toContain("of these days are in already");
  await acceptUpload(app, cookie, second);
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(3);
  expect(await countOf(app, `storm WHERE town_id = ${town.id} AND upload_id = ${second}`)).toBe(3);
  expect(wordsOf(await app.ask(`/uploads/${first}`, { cookie }))).toContain("have since given way to a newer file");
  expect(await countOf(app, `upload_row WHERE upload_id = ${first}`)).toBe(3);
  const third = await send(log(["2024-12-19,22:00,,,snow,7,24,6,,another truck"]), "log3.csv");
  await post(third, [
    ["intent", "accept"],
    ["isReplacing", "0"],
  ]);
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(4);
});

test("a season sent in between checking and accepting takes nothing of the file", async () => {
  const uploadId = await send(log(good));
  await aSeasonFigure(app, town, { startYear: 2024, state: "sent" });
  const answer = await acceptUpload(app, cookie, uploadId);
  expect(answer.status).toBe(409);
  expect(wordsOf(answer)).toContain("2024–25 was sent in meanwhile");
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(0);
});

test("an upload is taken back before it counts, and the same file may come again", async () => {
  const uploadId = await send(log(good));
  expect((await post(uploadId, [["intent", "cancel"]])).status).toBe(302);
  expect(await progressOf(app, uploadId)).toMatchObject({ state: "cancelled" });
  expect(await countOf(app, `upload_row WHERE upload_id = ${uploadId}`)).toBe(0);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(409);
  expect(await send(log(good))).toBe(uploadId);
  expect(await progressOf(app, uploadId)).toMatchObject({ state: "checked", rows_ok: 3 });
});

test("the file is given back byte for byte, to the town that sent it alone", async () => {
  const content = Buffer.from(log(good));
  const uploadId = await send(content);
  expect((await app.ask(`/uploads/${uploadId}/file`, { cookie })).bytes.equals(content)).toBe(true);
  const other = await signIn(app, await aPerson(app, { role: "director", town: await aTown(app) }));
  for (const path of ["", "/columns", "/problems", "/file"]) {
    expect((await app.ask(`/uploads/${uploadId}${path}`, { cookie: other })).status).toBe(404);
  }
});
