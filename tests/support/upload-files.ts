import type { TestApp } from "./app.ts";
import type { Town } from "./factories.ts";
import type { Answer } from "./http.ts";
import { rows } from "./rows.ts";

/** The first line of a file of season figures. */
export const heads =
  "season,lane_miles,events,salt_tons,mix_tons,mix_salt_percent,sand_tons,brine_gal,material_cost_usd";

const usual: Record<string, string> = {
  season: "2024-25",
  lane_miles: "100",
  events: "20",
  salt_tons: "600",
  mix_tons: "0",
  mix_salt_percent: "",
  sand_tons: "0",
  brine_gal: "",
  material_cost_usd: "48000",
};

/** A row with nothing wrong in it, but for what is changed. */
export function seasonRow(change: Record<string, string> = {}): string {
  const cells = { ...usual, ...change };
  return heads
    .split(",")
    .map((column) => cells[column] ?? "")
    .join(",");
}

type SentFile = { content: string | Uint8Array; kind?: string; fileName?: string };

/** Send a file as the uploads page does. */
export function sendFile(app: TestApp, cookie: string, file: SentFile): Promise<Answer> {
  return app.ask("/uploads", { cookie, upload: { kind: "season-figures", fileName: "figures.csv", ...file } });
}

/** The upload that an answer leads to; 0 when it leads to none. */
export function uploadIdOf({ headers }: Answer): number {
  return Number(/^\/uploads\/(\d+)(?:\?known)?$/.exec(headers.location ?? "")?.[1] ?? 0);
}

/** Accept an upload as its page does. */
export function acceptUpload(app: TestApp, cookie: string, uploadId: number): Promise<Answer> {
  return app.ask(`/uploads/${uploadId}`, { cookie, form: { intent: "accept" } });
}

/** A town's uploads, oldest first. */
export function uploadsOf(app: TestApp, town: Town): Promise<{ id: number; state: string }[]> {
  return rows(app, "SELECT id, state FROM upload WHERE town_id = ? ORDER BY id", [town.id]);
}

/** What was found in an upload, in the order of its rows; row 0 is the file as a whole. */
export type Found = {
  row: number;
  field: string;
  value: string | null;
  code: string;
  severity: string;
  message: string;
};

export function problemsIn(app: TestApp, uploadId: number): Promise<Found[]> {
  return rows(
    app,
    `SELECT sheet_row AS \`row\`, field, value, code, severity, message FROM upload_problem
      WHERE upload_id = ? ORDER BY sheet_row, position`,
    [uploadId],
  );
}

export type Progress = {
  state: string;
  failure: string | null;
  rows_read: number;
  rows_ok: number;
  rows_check: number;
  rows_error: number;
  rows_left_out: number;
};

/** How far an upload has got. */
export async function progressOf(app: TestApp, uploadId: number): Promise<Progress> {
  const [upload] = await rows<Progress>(
    app,
    "SELECT state, failure, rows_read, rows_ok, rows_check, rows_error, rows_left_out FROM upload WHERE id = ?",
    [uploadId],
  );
  if (!upload) throw new Error(`There is no upload ${uploadId}.`);
  return upload;
}

/** Wait until nothing is under way in an upload. */
export async function settled(app: TestApp, uploadId: number, limitMs = 60_000): Promise<Progress> {
  for (const deadline = Date.now() + limitMs; Date.now() < deadline; await new Promise((go) => setTimeout(go, 100))) {
    const upload = await progressOf(app, uploadId);
    if (!["received", "checking", "accepting"].includes(upload.state)) return upload;
  }
  throw new Error(`The upload ${uploadId} is still under way.`);
}

/** The words of a page as a person reads them, without its marks; shortened to what stands in its main part. */
export function wordsOf({ body }: Answer): string {
  const main = /<main[\s\S]*?<\/main>[\s\S]*?(?=<script)/.exec(body)?.[0] ?? body;
  return main
    .replace(/<!--.*?-->/g, "")
    .replace(/<[^>]+>/g, " ")
    .replace(/&#x27;/g, "'")
    .replace(/&amp;/g, "&")
    .replace(/&quot;/g, '"')
    .replace(/\s+/g, " ")
    .replace(/ ([,.;:)])/g, "$1");
}
