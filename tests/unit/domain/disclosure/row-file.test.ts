import { expect, test } from "vitest";
import { defaultPolicy } from "#app/domain/disclosure/policy.ts";
import { type RowRecord, protectedRows } from "#app/domain/disclosure/row-file.ts";
import { seededRandom } from "../region.ts";

/** Rates that spread evenly from 200 to 498 over the towns of each size. */
function records(sizes: readonly { laneMiles: number; towns: number }[]): RowRecord[] {
  return sizes.flatMap(({ laneMiles, towns }) =>
    Array.from({ length: towns }, (_, place) => ({ laneMiles, values: { rate: 200.3 + (298 * place) / towns } })),
  );
}

function rowsOf(input: readonly RowRecord[]) {
  const result = protectedRows(input, defaultPolicy, seededRandom(7));
  return result.state === "published" ? result.rows : [];
}

test("49 towns are too few for rows, 50 are enough", () => {
  expect(protectedRows(records([{ laneMiles: 100, towns: 49 }]), defaultPolicy, seededRandom(1))).toEqual({
    state: "withheld",
    reason: "too-few",
  });
  expect(rowsOf(records([{ laneMiles: 100, towns: 50 }]))).toHaveLength(50);
});

test("9 large towns are merged with the 20 below them and go out as one band", () => {
  const rows = rowsOf(
    records([
      { laneMiles: 100, towns: 30 },
      { laneMiles: 200, towns: 20 },
      { laneMiles: 500, towns: 9 },
    ]),
  );
  expect(new Set(rows.map(({ laneMileBand }) => laneMileBand))).toEqual(new Set(["under 150", "150 and more"]));
  expect(rows.filter(({ laneMileBand }) => laneMileBand === "150 and more")).toHaveLength(29);
});

test("a band whose towns all lay the same is left out, the other stays", () => {
  const alike = records([{ laneMiles: 100, towns: 30 }]).map((one) => ({ ...one, values: { rate: 241.7 } }));
  const rows = rowsOf([...alike, ...records([{ laneMiles: 200, towns: 30 }])]);
  expect(new Set(rows.map(({ laneMileBand }) => laneMileBand))).toEqual(new Set(["150 and more"]));
});

test("a band with two figures only is left out, however far apart they are", () => {
  const two = records([{ laneMiles: 100, towns: 30 }]).map((one, place) => ({
    ...one,
    values: { rate: place < 15 ? 203.3 : 417.7 },
  }));
  const rows = rowsOf([...two, ...records([{ laneMiles: 200, towns: 30 }])]);
  expect(new Set(rows.map(({ laneMileBand }) => laneMileBand))).toEqual(new Set(["150 and more"]));
});

test("when no band passes, nothing goes out", () => {
  const alike = records([{ laneMiles: 100, towns: 60 }]).map((one) => ({ ...one, values: { rate: 241.7 } }));
  expect(protectedRows(alike, defaultPolicy, seededRandom(1))).toEqual({ state: "withheld", reason: "too-similar" });
});

test("two towns that alone lack a figure would stand out, so they go", () => {
  const marked = records([{ laneMiles: 100, towns: 58 }]).map((one) => ({
    ...one,
    values: { ...one.values, event: one.values.rate ?? null },
  }));
  const lacking = marked.slice(0, 2).map((one) => ({ ...one, values: { ...one.values, event: null } }));
  const rows = rowsOf([...lacking, ...marked.slice(2)]);
  expect(rows).toHaveLength(56);
  expect(rows.every(({ values }) => values.event !== null)).toBe(true);
});

test("ids and order come from random alone: another seed, other ids, the same figures", () => {
  const input = records([{ laneMiles: 100, towns: 60 }]);
  const [first, second] = [7, 8].map((seed) => protectedRows(input, defaultPolicy, seededRandom(seed)));
  if (first?.state !== "published" || second?.state !== "published") throw new Error("rows were expected");
  expect(first.rows.every(({ id }) => /^r-[0-9a-f]{8}$/.test(id))).toBe(true);
  expect(new Set(first.rows.map(({ id }) => id)).size).toBe(60);
  const ids = new Set(first.rows.map(({ id }) => id));
  expect(second.rows.filter(({ id }) => ids.has(id))).toEqual([]);
  const figures = (rows: typeof first.rows) => rows.map(({ values }) => values.rate ?? 0).sort((a, b) => a - b);
  expect(figures(first.rows)).toEqual(figures(second.rows));
  expect(first.rows.map(({ values }) => values.rate)).not.toEqual(figures(first.rows));
});

test("a random that stands still is refused instead of running on", () => {
  expect(() => protectedRows(records([{ laneMiles: 100, towns: 60 }]), defaultPolicy, () => 0.5)).toThrow(RangeError);
});
