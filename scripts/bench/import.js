/* global FormData, Blob */
import { createHash, randomBytes } from "node:crypto";
import { readFileSync } from "node:fs";
import { setTimeout as sleep } from "node:timers/promises";
import { parse } from "csv-parse";
import { connect } from "../migrate.js";
import { startPassingSystem } from "../passing-system.js";

const rowCount = 100_000;
const seasonStartYear = 2024;

/** A storm log of that many lines, one truck's part in a storm each, with salt on every line and brine on some. */
function stormLog() {
  const lines = [
    "start_date,start_time,end_date,end_time,kind,pavement_temp_f,passes,lane_miles,hours,truck,route,salt_tons,brine_gal,note",
  ];
  const start = Date.UTC(seasonStartYear, 10, 1);
  for (let row = 0; row < rowCount; row++) {
    const began = new Date(start + row * 150_000).toISOString();
    const ended = new Date(start + row * 150_000 + 5 * 3_600_000).toISOString();
    const brine = row % 4 === 0 ? String(60 + (row % 90)) : "";
    lines.push(
      [
        began.slice(0, 10),
        began.slice(11, 16),
        ended.slice(0, 10),
        ended.slice(11, 16),
        row % 7 === 0 ? "freezing rain" : "snow",
        (12 + (row % 200) / 10).toFixed(1),
        1 + (row % 3),
        (12 + (row % 170) / 10).toFixed(1),
        (2 + (row % 50) / 10).toFixed(1),
        1 + (row % 20),
        `Route ${1 + (row % 30)}`,
        (1 + (row % 90) / 10).toFixed(2),
        brine,
        "",
      ].join(","),
    );
  }
  return `${lines.join("\r\n")}\r\n`;
}

/** A town with twenty trucks, salt and brine, and somebody signed in. @param {import("mariadb").Connection} db */
async function prepareTown(db) {
  const insert = async (sql, values) => Number((await db.query(sql, values)).insertId);
  await db.query("INSERT IGNORE INTO season (start_year, figures_due_on) VALUES (?, ?)", [
    seasonStartYear,
    "2025-09-15",
  ]);
  const townId = await insert("INSERT INTO town (name, district, created_at) VALUES ('Bench', 'Ridge', NOW(3))", []);
  const truckIds = [];
  for (let unit = 1; unit <= 20; unit++) {
    truckIds.push(
      await insert(
        `INSERT INTO truck (town_id, unit_number, spreader_kind, control, working_speed_mph, working_setting, capacity_tons, created_at)
         VALUES (?, ?, 'hopper-auger', 'manual', 25, 3, 10, NOW(3))`,
        [townId, String(unit)],
      ),
    );
  }
  const material = (name, kind, share) =>
    insert("INSERT INTO material (town_id, name, kind, salt_share) VALUES (?, ?, ?, ?)", [townId, name, kind, share]);
  const [saltId, brineId] = [await material("Salt", "salt", 1), await material("Brine", "brine", 0.23)];
  const userId = await insert(
    `INSERT INTO user_account (issuer, subject, name, email, role, town_id, created_at)
     VALUES ('http://127.0.0.1:1', 'bench', 'Bench', 'bench@commonweigh.example', 'director', ?, NOW(3))`,
    [townId],
  );
  const secret = randomBytes(32).toString("base64url");
  await db.query(
    `INSERT INTO session (token_hash, user_id, created_at, last_seen_at, authenticated_at, expires_at)
     VALUES (?, ?, NOW(3), NOW(3), NOW(3), NOW(3) + INTERVAL 1 HOUR)`,
    [createHash("sha256").update(secret).digest("hex"), userId],
  );
  const cookie = `sid=${encodeURIComponent(Buffer.from(JSON.stringify(secret)).toString("base64"))}`;
  return { townId, truckIds, saltId, brineId, cookie };
}

/** The same rows by the parser and batched inserts alone: nothing is checked, nothing staged, nothing kept. */
async function bareImport(db, town, text) {
  const started = performance.now();
  const storm = `INSERT INTO storm (town_id, season_start_year, started_at, ended_at, kind, pavement_temp_f, passes,
    lane_miles_treated, hours, truck_id, route, note, created_at) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, NOW(3))`;
  const used = "INSERT INTO storm_material (storm_id, material_id, used_lb, used_gal) VALUES (?, ?, ?, ?)";
  await db.beginTransaction();
  let rows = [];
  const flush = async () => {
    await db.batch(
      storm,
      rows.map(({ cells }) => cells),
    );
    const stored = await db.query("SELECT id FROM storm WHERE town_id = ? ORDER BY id DESC LIMIT ?", [
      town.townId,
      rows.length,
    ]);
    const ids = stored.map(({ id }) => id).reverse();
    await db.batch(
      used,
      rows.flatMap(({ saltTons, brineGal }, place) => [
        [ids[place], town.saltId, saltTons * 2000, null],
        ...(brineGal === "" ? [] : [[ids[place], town.brineId, null, Number(brineGal)]]),
      ]),
    );
    rows = [];
  };
  const parser = parse(text, { columns: true, bom: true });
  for await (const row of parser) {
    rows.push({
      cells: [
        town.townId,
        seasonStartYear,
        `${row.start_date} ${row.start_time}:00`,
        `${row.end_date} ${row.end_time}:00`,
        row.kind === "snow" ? "snow" : "freezing-rain",
        Number(row.pavement_temp_f),
        Number(row.passes),
        Number(row.lane_miles),
        Number(row.hours),
        town.truckIds[Number(row.truck) - 1],
        row.route,
        row.note,
      ],
      saltTons: Number(row.salt_tons),
      brineGal: row.brine_gal,
    });
    if (rows.length === 2000) await flush();
  }
  if (rows.length > 0) await flush();
  await db.commit();
  const seconds = (performance.now() - started) / 1000;
  await clear(db, town);
  return seconds;
}

async function clear(db, town) {
  await db.query("DELETE FROM storm WHERE town_id = ?", [town.townId]);
}

/** Resident memory of a process, MB. @param {number} pid */
function residentMb(pid) {
  const line = /VmRSS:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, "utf8"));
  return Number(line?.[1] ?? 0) / 1024;
}

/** The whole way of the application: sent, kept, read, checked, staged, accepted. */
async function wholeImport(system, db, town, text) {
  let peakMb = 0;
  const watch = setInterval(() => (peakMb = Math.max(peakMb, residentMb(system.appPid))), 50);
  const startMb = residentMb(system.appPid);
  const headers = { cookie: town.cookie, origin: system.origin };
  const started = performance.now();
  const form = new FormData();
  form.set("kind", "storms");
  form.set("file", new Blob([text], { type: "text/csv" }), "bench.csv");
  const sent = await fetch(`${system.origin}/uploads`, { method: "POST", headers, body: form, redirect: "manual" });
  const path = sent.headers.get("location") ?? "";
  const uploadId = Number(/^\/uploads\/(\d+)/.exec(path)?.[1]);
  if (!uploadId) throw new Error(`The file was not taken: ${sent.status}`);
  const until = async (state) => {
    for (;;) {
      const [upload] = await db.query("SELECT state, failure FROM upload WHERE id = ?", [uploadId]);
      if (upload.state === state) return;
      if (["failed", "matching"].includes(upload.state))
        throw new Error(`The upload is ${upload.state}: ${upload.failure}`);
      await sleep(20);
    }
  };
  await until("checked");
  const checkedAt = performance.now();
  const body = new URLSearchParams({ intent: "accept" });
  const accepted = await fetch(`${system.origin}/uploads/${uploadId}`, {
    method: "POST",
    headers,
    body,
    redirect: "manual",
  });
  if (accepted.status !== 302) throw new Error(`The file was not accepted: ${accepted.status}`);
  await until("accepted");
  const seconds = (performance.now() - started) / 1000;
  clearInterval(watch);
  const [{ stored }] = await db.query("SELECT COUNT(*) AS stored FROM storm WHERE upload_id = ?", [uploadId]);
  if (stored !== rowCount) throw new Error(`${stored} rows were stored, not ${rowCount}.`);
  await clear(db, town);
  await db.query("DELETE FROM upload WHERE id = ?", [uploadId]);
  return { seconds, checkSeconds: (checkedAt - started) / 1000, startMb, grownMb: peakMb - startMb };
}

/**
 * A storm log of 100,000 rows, end to end, against the bare parser and batched inserts of the same rows in the same run.
 *
 * @param {object} [given]
 * @param {number} [given.rounds] each a bare import and a whole one, in turn
 * @param {(line: string) => void} [given.say]
 * @returns {Promise<{ rowCount: number, bareSeconds: number, wholeSeconds: number, checkSeconds: number,
 *   speedRatio: number, grownMb: number }>} speedRatio: of the fastest rounds, 1 when the whole way is as fast as the bare
 *   one; grownMb: the most the application's memory grew by in a round after the first, which warms it up
 */
export async function importRates({ rounds = 3, say = console.log } = {}) {
  const text = stormLog();
  const system = await startPassingSystem({ logLevel: "warn", say });
  const db = await connect(system.migrator);
  try {
    const town = await prepareTown(db);
    const [bare, whole] = [[], []];
    for (let round = 0; round < rounds; round++) {
      bare.push(await bareImport(db, town, text));
      whole.push(await wholeImport(system, db, town, text));
      say(
        `round ${round + 1}: bare ${bare.at(-1).toFixed(2)} s, whole ${whole.at(-1).seconds.toFixed(2)} s (checked after ${whole.at(-1).checkSeconds.toFixed(2)} s), memory ${whole.at(-1).startMb.toFixed(0)} MB, +${whole.at(-1).grownMb.toFixed(0)} MB`,
      );
    }
    const best = whole.reduce((one, other) => (other.seconds < one.seconds ? other : one));
    const bareSeconds = Math.min(...bare);
    return {
      rowCount,
      bareSeconds: Number(bareSeconds.toFixed(2)),
      wholeSeconds: Number(best.seconds.toFixed(2)),
      checkSeconds: Number(best.checkSeconds.toFixed(2)),
      speedRatio: Number((bareSeconds / best.seconds).toFixed(2)),
      grownMb: Math.round(Math.max(...whole.map(({ grownMb }) => grownMb))),
    };
  } finally {
    await db.end();
    await system.stop();
  }
}
