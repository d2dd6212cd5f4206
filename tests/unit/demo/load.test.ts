import type { Connection } from "mariadb";
import { expect, test } from "vitest";
import { loadDemo } from "../../../data/demo/load.js";

type Call = { verb: string; table?: string; columns?: string[]; rows?: unknown[][] };

/** Stands in for the connector and writes down what it is asked, in order. */
function recordingConnection({ townCount = 0, refusedTable = "" } = {}) {
  const calls: Call[] = [];
  const connection = {
    beginTransaction: async () => void calls.push({ verb: "begin" }),
    commit: async () => void calls.push({ verb: "commit" }),
    rollback: async () => void calls.push({ verb: "rollback" }),
    query: async () => [{ townCount }],
    batch: async (statement: string, rows: unknown[][]) => {
      const [, table = "", columns = ""] = /INTO `(\w+)` \((.*?)\)/.exec(statement) ?? [];
      if (table === refusedTable) throw new Error("refused");
      calls.push({ verb: "insert", table, columns: columns.replaceAll("`", "").split(", "), rows });
    },
  };
  return { calls, connection: connection as unknown as Connection };
}

const issuer = "http://127.0.0.1:9999";
const now = new Date("2026-12-01T09:30:00.250Z");

function column(call: Call | undefined, name: string) {
  const index = call?.columns?.indexOf(name) ?? -1;
  return call?.rows?.map((row) => row[index]) ?? [];
}

test("everything goes in between one begin and one commit, stations before towns, and the counts are told", async () => {
  const { calls, connection } = recordingConnection();
  const rowCounts = await loadDemo({ connection, issuer, now });
  expect(calls[0]?.verb).toBe("begin");
  expect(calls.at(-1)?.verb).toBe("commit");
  expect(calls.slice(1, -1).map((call) => call.table)).toEqual(Object.keys(rowCounts));
  expect(calls[1]?.table).toBe("station");
  expect(calls.findIndex((call) => call.table === "station")).toBeLessThan(
    calls.findIndex((call) => call.table === "town"),
  );
  expect(rowCounts.town).toBe(65);
  expect(rowCounts.job).toBe(4);
});

test("people get the issuer, jobs the given time in UTC to the millisecond", async () => {
  const { calls, connection } = recordingConnection();
  await loadDemo({ connection, issuer, now });
  const people = calls.find((call) => call.table === "user_account");
  expect(new Set(column(people, "issuer"))).toEqual(new Set([issuer]));
  const jobs = calls.find((call) => call.table === "job");
  expect(new Set(column(jobs, "run_after"))).toEqual(new Set(["2026-12-01 09:30:00.250"]));
});

test("a town stands before those that report through it", async () => {
  const { calls, connection } = recordingConnection();
  await loadDemo({ connection, issuer, now });
  const towns = calls.find((call) => call.table === "town");
  const ids = column(towns, "id");
  const bodies = column(towns, "reports_through_town_id");
  const pairs = bodies.flatMap((body, index) => (body === null ? [] : [[ids.indexOf(body), index]]));
  expect(pairs).toHaveLength(3);
  for (const [bodyIndex = NaN, townIndex = NaN] of pairs) expect(bodyIndex).toBeLessThan(townIndex);
});

test("a database that holds a town is left as it is", async () => {
  const { calls, connection } = recordingConnection({ townCount: 1 });
  await expect(loadDemo({ connection, issuer, now })).rejects.toThrow("without towns");
  expect(calls.map((call) => call.verb)).toEqual(["begin", "rollback"]);
});

test("a refused table takes all the others back", async () => {
  const { calls, connection } = recordingConnection({ refusedTable: "calibration" });
  await expect(loadDemo({ connection, issuer, now })).rejects.toThrow("refused");
  expect(calls.at(-1)?.verb).toBe("rollback");
  expect(calls.map((call) => call.verb)).not.toContain("commit");
});
