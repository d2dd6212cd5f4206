import type { TestApp } from "./app.ts";

type Value = string | number | Buffer | null;
export type App = Pick<TestApp, "db" | "issuer">;

/** An instant as the database takes it, so many minutes from now. */
export function minutesFromNow(minutes: number): string {
  return new Date(Date.now() + minutes * 60_000).toISOString().replace("T", " ").replace("Z", "");
}

/** Put one row in. @returns its id */
export async function insert(app: App, table: string, row: Record<string, Value>): Promise<number> {
  const columns = Object.keys(row);
  const { insertId } = await app.db.query<{ insertId: number }>(
    `INSERT INTO ${table} (${columns.join(", ")}) VALUES (${columns.map(() => "?").join(", ")})`,
    Object.values(row),
  );
  return Number(insertId);
}

/** The rows of a query. */
export async function rows<Row>(app: App, query: string, values: Value[] = []): Promise<Row[]> {
  return app.db.query<Row[]>(query, values);
}

/** How many rows a table has, with what follows it. @example countOf(app, "job WHERE state = 'done'") */
export async function countOf(app: App, tableAndWhere: string): Promise<number> {
  const [row] = await rows<{ count: number }>(app, `SELECT COUNT(*) AS count FROM ${tableAndWhere}`);
  return row?.count ?? 0;
}

/** What the database holds, but for the marks that reading itself leaves. The same as long as nothing was changed. */
export async function contentDigest(app: App): Promise<string[]> {
  const tables = await rows<{ name: string }>(
    app,
    `SELECT TABLE_NAME AS name FROM information_schema.TABLES
      WHERE TABLE_SCHEMA = DATABASE() AND TABLE_NAME NOT IN ('session', 'api_token', 'sign_in_attempt')`,
  );
  const names = tables.map(({ name }) => name).join(", ");
  const sums = await rows<{ Table: string; Checksum: number }>(app, `CHECKSUM TABLE ${names}`);
  return [...sums.map((sum) => `${sum.Table} ${sum.Checksum}`), `tokens ${await countOf(app, "api_token")}`];
}
