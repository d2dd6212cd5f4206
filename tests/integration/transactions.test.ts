import { afterAll, beforeAll, expect, test, vi } from "vitest";
import { connect } from "#scripts/migrate.js";
import { freshDatabase, type TestDatabase } from "#tests/support/database.ts";

/* What happens in one transaction happens whole or not at all, and a deadlock is tried again from its beginning. */

let database: TestDatabase;
let db: Awaited<ReturnType<typeof connect>>;
let service: typeof import("#app/lib/db.server.ts");
let audit: typeof import("#app/services/audit.server.ts");
let outbox: typeof import("#app/services/outbox.server.ts");
const errorConsole = vi.spyOn(console, "error");

beforeAll(async () => {
  database = await freshDatabase();
  Object.assign(process.env, database.env, {
    PUBLIC_ORIGIN: "http://127.0.0.1:1",
    OIDC_ISSUER: "http://127.0.0.1:2",
    OIDC_CLIENT_ID: "commonweigh",
    OIDC_CLIENT_SECRET: "x".repeat(32),
    SMTP_HOST: "127.0.0.1",
    SMTP_PORT: "1",
    MAIL_FROM: "network@commonweigh.example",
    WORKER_TOKEN: "y".repeat(32),
    LOG_LEVEL: "silent",
  });
  service = await import("#app/lib/db.server.ts");
  audit = await import("#app/services/audit.server.ts");
  outbox = await import("#app/services/outbox.server.ts");
  db = await connect(database.migrator);
  await db.query(
    "INSERT INTO town (id, name, district, created_at) VALUES (1, 'Upper', '0', NOW()), (2, 'Lower', '0', NOW())",
  );
});

afterAll(async () => {
  await service.db.close();
  await db.end();
  database.drop();
  expect(errorConsole).not.toHaveBeenCalled();
});

const worker = { kind: "worker", role: "worker", requestId: "a-request" } as const;
const deed = { action: "test.deed", entity: "town", entityId: 1 };

async function countOf(tableAndWhere: string) {
  const [row] = await db.query<{ count: number }[]>(`SELECT COUNT(*) AS count FROM ${tableAndWhere}`);
  return row?.count ?? 0;
}

/** Goes on when as many as were expected have come. */
function meetingPoint(expected: number) {
  let come = 0;
  let open: () => void = () => undefined;
  const all = new Promise<void>((resolve) => (open = resolve));
  return async () => {
    if (++come === expected) open();
    await all;
  };
}

/** Two transactions that each hold one town and want the other's: the database ends one of them. */
async function crossing(work: (townId: number, attempt: number) => Promise<void> | void) {
  const meet = meetingPoint(2);
  const attempts = [0, 0];
  const add = (townId: number, transaction: Parameters<Parameters<typeof service.inTransaction>[0]>[0]) =>
    service.db.query("UPDATE town SET district = district + 1 WHERE id = ?", { replacements: [townId], transaction });
  await Promise.all(
    [1, 2].map((own) =>
      service.inTransaction(async (transaction) => {
        const attempt = (attempts[own - 1] ?? 0) + 1;
        attempts[own - 1] = attempt;
        await add(own, transaction);
        await audit.recordAudit(worker, { ...deed, entityId: own }, transaction);
        if (attempt === 1) await meet();
        await add(3 - own, transaction);
        await work(own, attempt);
      }),
    ),
  );
  return attempts;
}

test("of two transactions in each other's way one is run again whole, and both count once", async () => {
  const attempts = await crossing(() => undefined);
  expect([...attempts].sort()).toEqual([1, 2]);
  expect(await db.query("SELECT district FROM town ORDER BY id")).toEqual([{ district: "2" }, { district: "2" }]);
  expect(await countOf("audit_entry WHERE action = 'test.deed'")).toBe(2);
});

test("twelve at once on the same two rows all come through", async () => {
  await db.query("UPDATE town SET district = '0'");
  await Promise.all(
    Array.from({ length: 12 }, (_, place) =>
      service.inTransaction(async (transaction) => {
        for (const townId of place % 2 === 0 ? [1, 2] : [2, 1]) {
          await service.db.query("UPDATE town SET district = district + 1 WHERE id = ?", {
            replacements: [townId],
            transaction,
          });
        }
      }),
    ),
  );
  expect(await db.query("SELECT district FROM town ORDER BY id")).toEqual([{ district: "12" }, { district: "12" }]);
});

test("any other error is not tried again, and takes trail and mail back with it", async () => {
  let runs = 0;
  const before = [await countOf("audit_entry"), await countOf("outbox_mail")];
  const letter = { toName: "A", toAddress: "a@sample.example", subject: "S", text: "T", html: "H" };
  const failing = service.inTransaction(async (transaction) => {
    runs++;
    await audit.recordAudit(worker, deed, transaction);
    await outbox.queueMail("an occasion", letter, transaction);
    await service.db.query("UPDATE town SET district = '99' WHERE id = 1", { transaction });
    throw new RangeError("no");
  });
  await expect(failing).rejects.toThrow(RangeError);
  expect(runs).toBe(1);
  expect([await countOf("audit_entry"), await countOf("outbox_mail")]).toEqual(before);
  expect(await countOf("town WHERE district = '99'")).toBe(0);
});

test("a lock that is held too long is tried again, and given up after five times", { timeout: 60_000 }, async () => {
  await db.beginTransaction();
  await db.query("UPDATE town SET district = 'held' WHERE id = 1");
  let runs = 0;
  const waiting = service.inTransaction(async (transaction) => {
    runs++;
    await service.db.query("SET SESSION innodb_lock_wait_timeout = 1", { transaction });
    await service.db.query("UPDATE town SET district = '1' WHERE id = 1", { transaction });
  });
  await expect(waiting).rejects.toMatchObject({ original: { code: "ER_LOCK_WAIT_TIMEOUT" } });
  expect(runs).toBe(5);
  await db.rollback();
});

test("a mail for an occasion that had its mail is not queued a second time", async () => {
  const letter = { toName: "A", toAddress: "a@sample.example", subject: "S", text: "T", html: "H" };
  for (let turn = 0; turn < 3; turn++) {
    await service.inTransaction((transaction) => outbox.queueMail("one occasion", letter, transaction));
  }
  expect(await countOf("outbox_mail WHERE dedupe_key = 'one occasion'")).toBe(1);
});

test("measures, instants and counts come back from the database as they went in", async () => {
  const value = 123_456.789_012_345;
  const [row] = await service.db.query(
    "SELECT CAST(? AS DOUBLE) AS measure, CAST(9007199254740991 AS SIGNED) AS largest, COUNT(*) AS towns, SUM(id) AS ids FROM town",
    { type: "SELECT", replacements: [value] },
  );
  expect(row).toMatchObject({ measure: value, largest: 9_007_199_254_740_991, towns: 2 });
  const beyond = service.db.query("SELECT CAST(9007199254740993 AS SIGNED) AS beyond", { type: "SELECT" });
  await expect(beyond).rejects.toThrow();
});
