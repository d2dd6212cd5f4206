import { expect, test } from "vitest";
import { liquidShare, saltInBrineLb } from "#app/domain/season/brine.ts";
import { doubtOf, heaviestFirst } from "#app/domain/season/doubt.ts";
import { logFindings } from "#app/domain/season/log-findings.ts";
import { outlierFindings } from "#app/domain/season/outlier-findings.ts";
import { laneMilesIn, roadsIn } from "#app/domain/season/road-lengths.ts";
import { type MaterialUse, seasonFromLog } from "#app/domain/season/season-from-log.ts";
import { stockBalance } from "#app/domain/season/stock-balance.ts";
import { winterFindings } from "#app/domain/season/winter-findings.ts";

const noPile = stockBalance([], []);
const pile = (usedLb: number, loggedLb: number) =>
  stockBalance(
    [
      { kind: "opening", day: "2025-10-01", quantityLb: usedLb },
      { kind: "closing", day: "2026-04-30", quantityLb: 0 },
    ],
    [{ day: "2026-01-01", usedLb: loggedLb }],
  );

function material(change: Partial<MaterialUse>): MaterialUse {
  return {
    name: "Salt",
    kind: "salt",
    saltShare: 1,
    balance: noPile,
    loggedGal: 0,
    loggedAllLb: 0,
    paidCentsPerTon: null,
    listedCentsPerTon: 7000,
    ...change,
  };
}

const storms = [
  { startedAt: "2026-01-02 04:00", endedAt: "2026-01-02 09:00", laneMilesTreated: 100 },
  { startedAt: "2026-01-05 04:00", endedAt: null, laneMilesTreated: null },
];

test("the pile says what was used where both ends are measured, the log where they are not", () => {
  const draft = seasonFromLog(118, storms, [
    material({ balance: pile(1_000_000, 960_000), loggedAllLb: 960_000 }),
    material({ name: "Sand", kind: "sand", saltShare: 0, loggedAllLb: 40_000, listedCentsPerTon: 1500 }),
  ]);
  expect(draft).toMatchObject({
    laneMiles: 118,
    eventCount: 2,
    saltLb: 1_000_000,
    sandLb: 40_000,
    mixLb: 0,
    mixSaltShare: null,
    brineGal: null,
    laneMilesTreated: 100,
    stockUsedLb: 1_000_000,
    stockLoggedLb: 960_000,
    fromPiles: ["Salt"],
    materialCostCents: 500 * 7000 + 20 * 1500,
  });
});

test("two mixes give their salt share by weight, and brine its gallons without a cost", () => {
  const draft = seasonFromLog(null, storms, [
    material({ name: "Lean mix", kind: "mix", saltShare: 0.1, loggedAllLb: 30_000 }),
    material({ name: "Rich mix", kind: "mix", saltShare: 0.3, loggedAllLb: 10_000 }),
    material({ name: "Brine", kind: "brine", saltShare: 0.233, loggedGal: 900, listedCentsPerTon: null }),
  ]);
  expect(draft.mixLb).toBe(40_000);
  expect(draft.mixSaltShare).toBeCloseTo(0.15, 12);
  expect(draft.brineGal).toBe(900);
  expect(draft.materialCostCents).toBe(20 * 7000);
  expect(draft.laneMiles).toBeNull();
});

test("a material that was used and has no price leaves the cost unknown; one that was not used does not", () => {
  const used = material({ loggedAllLb: 2000, listedCentsPerTon: null });
  expect(seasonFromLog(1, storms, [used])).toMatchObject({ materialCostCents: null, withoutPrice: ["Salt"] });
  const unused = material({ listedCentsPerTon: null });
  expect(seasonFromLog(1, storms, [unused])).toMatchObject({ materialCostCents: 0, withoutPrice: [] });
  const paid = material({ loggedAllLb: 2000, listedCentsPerTon: null, paidCentsPerTon: 6543.6 });
  expect(seasonFromLog(1, storms, [paid]).materialCostCents).toBe(6544);
});

test("a pile that grew is not used backwards: the log then says what was used", () => {
  const grown = stockBalance(
    [
      { kind: "opening", day: "2025-10-01", quantityLb: 0 },
      { kind: "closing", day: "2026-04-30", quantityLb: 5000 },
    ],
    [{ day: "2026-01-01", usedLb: 8000 }],
  );
  const draft = seasonFromLog(1, storms, [material({ balance: grown, loggedAllLb: 8000 })]);
  expect(draft).toMatchObject({ saltLb: 8000, stockUsedLb: null, fromPiles: [] });
});

test("a road's length holds from its season until a later one; 0 ends it; before the first it is not known", () => {
  const lengths = [
    { name: "Local", seasonStartYear: 2021, laneMiles: 80 },
    { name: "Local", seasonStartYear: 2024, laneMiles: 82.5 },
    { name: "Alley", seasonStartYear: 2022, laneMiles: 4 },
    { name: "Alley", seasonStartYear: 2025, laneMiles: 0 },
  ];
  expect(laneMilesIn(lengths, 2020)).toBeNull();
  expect(laneMilesIn(lengths, 2023)).toBe(84);
  expect(laneMilesIn(lengths, 2024)).toBe(86.5);
  expect(roadsIn(lengths, 2026).map(({ name, laneMiles }) => [name, laneMiles])).toEqual([["Local", 82.5]]);
});

test("a fifth wetted and none as brine are 20 %; brine adds its own salt; nothing reported is not known", () => {
  expect(liquidShare({ totalSaltLb: 100_000, wettedSaltLb: 20_000, brineGal: null })).toBeCloseTo(0.2, 12);
  const brineSalt = saltInBrineLb(10_000);
  expect(liquidShare({ totalSaltLb: 100_000, wettedSaltLb: null, brineGal: 10_000 })).toBeCloseTo(
    brineSalt / (100_000 + brineSalt),
    12,
  );
  expect(liquidShare({ totalSaltLb: 100, wettedSaltLb: 500, brineGal: 0 })).toBe(1);
  expect(liquidShare({ totalSaltLb: 100, wettedSaltLb: null, brineGal: null })).toBeNull();
  expect(liquidShare({ totalSaltLb: 0, wettedSaltLb: 0, brineGal: 0 })).toBeNull();
});

const amounts = {
  laneMiles: 118,
  eventCount: 26,
  saltLb: 1_000_000,
  mixLb: 0,
  mixSaltShare: null,
  sandLb: 0,
  brineGal: null,
  materialCostCents: null,
};

test("reported figures are held against roads, log and piles, and agree within a twentieth and a tenth", () => {
  const lines = Array.from({ length: 26 }, (_, place) => ({
    startedAt: `2026-01-${String(place + 1).padStart(2, "0")} 04:00`,
    endedAt: null,
    laneMilesTreated: null,
  }));
  const draft = seasonFromLog(118, lines, [material({ loggedAllLb: 960_000 })]);
  const codes = (change: Partial<typeof amounts>) =>
    logFindings({ ...amounts, ...change }, draft).map(({ code, field }) => `${code} ${field}`);
  expect(codes({})).toEqual([]);
  expect(codes({ laneMiles: 123.8 })).toEqual([]);
  expect(codes({ laneMiles: 124 })).toEqual(["unlike-roads laneMiles"]);
  expect(codes({ eventCount: 28 })).toEqual([]);
  expect(codes({ eventCount: 29 })).toEqual(["unlike-log eventCount"]);
  expect(codes({ saltLb: 1_070_000 })).toEqual(["unlike-log saltLb"]);
  expect(codes({ sandLb: 100 })).toEqual(["unlike-log sandLb"]);
});

test("nothing written down is nothing to compare with", () => {
  expect(logFindings(amounts, seasonFromLog(null, [], [material({})]))).toEqual([]);
});

test("twice the salt in the same winter is asked about; twice the salt in twice the winter is not", () => {
  const earlier = [
    { saltLbPerLaneMile: 6000, awssiPoints: 1000 },
    { saltLbPerLaneMile: 7200, awssiPoints: 1200 },
  ];
  const codes = (saltLbPerLaneMile: number, awssiPoints: number | null, before = earlier) =>
    winterFindings({ saltLbPerLaneMile, awssiPoints }, before).map(({ code }) => code);
  expect(codes(12_000, 1000)).toEqual(["unlike-winter"]);
  expect(codes(12_000, 2000)).toEqual([]);
  expect(codes(3000, 1000)).toEqual(["unlike-winter"]);
  expect(codes(12_000, null)).toEqual([]);
  expect(codes(12_000, 1000, earlier.slice(1))).toEqual([]);
});

test("a town at ten times the others is far off; with eleven towns nothing is said", () => {
  const others = Array.from({ length: 30 }, (_, place) => 5000 + 100 * place);
  expect(outlierFindings(65_000, [...others, 65_000]).map(({ code }) => code)).toEqual(["unlike-all"]);
  expect(outlierFindings(7000, [...others, 7000])).toEqual([]);
  expect(outlierFindings(65_000, [...others.slice(0, 10), 65_000])).toEqual([]);
});

test("an error weighs more than any check, and the heaviest is said first", () => {
  const finding = (code: string, severity: "error" | "check" = "check") => ({
    code,
    severity,
    field: "x",
    message: code,
  });
  const found = [finding("few-events"), finding("stock-unexplained"), finding("unlike-earlier"), finding("x", "error")];
  expect(heaviestFirst(found).map(({ code }) => code)).toEqual([
    "x",
    "unlike-earlier",
    "stock-unexplained",
    "few-events",
  ]);
  expect(doubtOf([])).toBe(0);
  expect(doubtOf([finding("x", "error")])).toBeGreaterThan(doubtOf([finding("unlike-earlier"), finding("few-events")]));
});
