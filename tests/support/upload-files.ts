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
  return Number(/^\/uploads\/(\d+)$/.exec(headers.location ?? "")?.[1] ?? 0);
}

/** Accept an upload as its page does. */
export function acceptUpload(app: TestApp, cookie: string, uploadId: number): Promise<Answer> {
  return app.ask(`/uploads/${uploadId}`, { cookie, form: {} });
}

/** A town's uploads, oldest first. */
export function uploadsOf(app: TestApp, town: Town): Promise<{ id: number; state: string }[]> {
  return rows(app, "SELECT id, state FROM upload WHERE town_id = ? ORDER BY id", [town.id]);
}
