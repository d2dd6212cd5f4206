import { afterAll, beforeAll, expect, test } from "vitest";
import { followIssuer, inviteFirstCoordinator, loadDemoIfEmpty } from "#scripts/database.js";
import { connect, migrations } from "#scripts/migrate.js";
import { freshDatabase, type TestDatabase } from "#tests/support/database.ts";

let database: TestDatabase;
let app: Awaited<ReturnType<typeof connect>>;
let migrator: Awaited<ReturnType<typeof connect>>;

beforeAll(async () => {
  database = await freshDatabase();
  const { DB_HOST, DB_PORT, DB_NAME, DB_USER, DB_PASSWORD } = database.env;
  app = await connect({
    host: DB_HOST,
    port: Number(DB_PORT),
    database: DB_NAME,
    user: DB_USER,
    password: DB_PASSWORD,
  });
  migrator = await connect(database.migrator);
});

afterAll(async () => {
  await app.end();
  await migrator.end();
  database.drop();
});

async function counted(query: string) {
  const [{ count }] = await migrator.query<[{ count: number }]>(query);
  return count;
}

test.each(["audit_entry", "edition", "edition_cell", "edition_row", "edition_member", "edition_place"])(
  "the application can read %s, and neither change nor empty it",
  async (table) => {
    await expect(app.query(`SELECT * FROM ${table}`)).resolves.toEqual([]);
    await expect(app.query(`DELETE FROM ${table}`)).rejects.toMatchObject({ errno: 1142 });
    await expect(app.query(`UPDATE ${table} SET edition_id = 1`)).rejects.toMatchObject({ errno: 1142 });
  },
);

test("the application can neither alter the schema nor forge what has been migrated nor read accounts", async () => {
  await expect(app.query("DROP TABLE town")).rejects.toMatchObject({ errno: 1142 });
  await expect(app.query("CREATE TABLE extra (id INT)")).rejects.toMatchObject({ errno: 1142 });
  await expect(app.query("DELETE FROM schema_migration")).rejects.toMatchObject({ errno: 1142 });
  await expect(app.query("SELECT * FROM mysql.global_priv")).rejects.toMatchObject({ errno: 1142 });
});

test("the first coordinator's link is replaced until somebody has an account, and then no more", async () => {
  const first = await inviteFirstCoordinator(migrator);
  const second = await inviteFirstCoordinator(migrator);
  expect(first).toMatch(/^[\w-]{43}$/);
  expect(second).not.toBe(first);
  expect(await counted("SELECT COUNT(*) AS count FROM invitation")).toBe(1);

  await migrator.query(
    `INSERT INTO user_account (issuer, subject, name, email, role, created_at)
     VALUES ('http://127.0.0.1:1', 's', 'n', 'n@x.example', 'coordinator', UTC_TIMESTAMP(3))`,
  );
  expect(await inviteFirstCoordinator(migrator)).toBeNull();
});

test("accounts of this machine's provider follow its port, those of another provider stay", async () => {
  await migrator.query(
    `INSERT INTO user_account (issuer, subject, name, email, role, created_at)
     VALUES ('https://sign-in.example', 's', 'n', 'n@x.example', 'analyst', UTC_TIMESTAMP(3))`,
  );
  await followIssuer(migrator, "http://127.0.0.1:2");
  expect(await migrator.query("SELECT issuer FROM user_account ORDER BY issuer")).toEqual([
    { issuer: "http://127.0.0.1:2" },
    { issuer: "https://sign-in.example" },
  ]);
});

test("the demo region is loaded once, migrations go back and forth over it, and repeat without effect", async () => {
  await migrator.query("DELETE FROM user_account");
  expect(await loadDemoIfEmpty(migrator, "http://127.0.0.1:2")).toBe(true);
  expect(await loadDemoIfEmpty(migrator, "http://127.0.0.1:2")).toBe(false);
  expect(await counted("SELECT COUNT(*) AS count FROM town")).toBeGreaterThan(60);

  const umzug = migrations(migrator);
  expect(await umzug.up()).toEqual([]);
  const undone = await umzug.down({ to: 0 });
  expect(await migrator.query("SHOW TABLES")).toHaveLength(1);
  expect(await umzug.up()).toHaveLength(undone.length);
});
