import fc from "fast-check";
import { expect, test } from "vitest";
import { type LogLine, stockBalance, stockFindings, type StockLine } from "#app/domain/season/stock-balance.ts";
import { quantityToLb } from "#app/domain/season/stock-quantity.ts";

const lines: StockLine[] = [
  { kind: "opening", day: "2025-10-01", quantityLb: 200_000 },
  { kind: "delivery", day: "2025-11-20", quantityLb: 400_000 },
  { kind: "transfer-in", day: "2026-01-05", quantityLb: 30_000 },
  { kind: "transfer-out", day: "2026-01-25", quantityLb: 10_000 },
  { kind: "closing", day: "2026-04-30", quantityLb: 120_000 },
];
const log: LogLine[] = [
  { day: "2025-12-02", usedLb: 250_000 },
  { day: "2026-02-11", usedLb: 220_000 },
];

test("200,000 lb opened, 400,000 received, 20,000 net transferred in and 120,000 left are 500,000 lb used", () => {
  const balance = stockBalance(lines, log);
  expect(balance).toMatchObject({ usedLb: 500_000, loggedLb: 470_000, unexplainedLb: 30_000, leftOutCount: 0 });
  expect(balance.unexplainedShare).toBeCloseTo(0.06, 12);
  expect(stockFindings("Salt", balance)).toEqual([]);
});

test("without a closing nothing is known of what was used, and nothing is asked", () => {
  const balance = stockBalance(lines.slice(0, -1), log);
  expect(balance).toMatchObject({ usedLb: null, unexplainedLb: null, unexplainedShare: null, loggedLb: 470_000 });
  expect(stockFindings("Salt", balance)).toEqual([]);
});

test("a season without a log leaves the use unexplained neither wholly nor at all: it is not known", () => {
  expect(stockBalance(lines, null)).toMatchObject({ usedLb: 500_000, loggedLb: null, unexplainedShare: null });
  expect(stockBalance(lines, [])).toMatchObject({ loggedLb: 0, unexplainedShare: 1 });
});

test("what moved before the opening or after the closing is left out and counted; the days themselves are in", () => {
  const balance = stockBalance(
    [
      ...lines,
      { kind: "delivery", day: "2025-09-30", quantityLb: 999 },
      { kind: "delivery", day: "2026-05-01", quantityLb: 999 },
      { kind: "delivery", day: "2026-04-30", quantityLb: 1000 },
    ],
    [...log, { day: "2026-05-02", usedLb: 999 }],
  );
  expect(balance).toMatchObject({ receivedLb: 401_000, usedLb: 501_000, loggedLb: 470_000, leftOutCount: 3 });
});

test("two piles measured on one day are added, and of two closings the later counts", () => {
  const balance = stockBalance(
    [
      { kind: "opening", day: "2025-10-01", quantityLb: 100 },
      { kind: "opening", day: "2025-10-01", quantityLb: 50 },
      { kind: "closing", day: "2026-01-31", quantityLb: 90 },
      { kind: "closing", day: "2026-04-30", quantityLb: 20 },
    ],
    [],
  );
  expect(balance).toMatchObject({ openingLb: 150, closingLb: 20, closedOn: "2026-04-30", usedLb: 130 });
});

test("a pile that grew, and one that lost 11 %, are asked about; 10 % is not, and the limit is called ours", () => {
  const grown = stockBalance(
    [
      { kind: "opening", day: "2025-10-01", quantityLb: 1000 },
      { kind: "closing", day: "2026-04-30", quantityLb: 841_000 },
    ],
    log,
  );
  expect(stockFindings("Salt", grown).map(({ code, message }) => `${code}: ${message}`)).toEqual([
    "pile-grew: The pile of salt grew: the closing stock is 420 tons above opening and received together. A delivery is probably missing.",
  ]);
  const lost = (loggedLb: number) =>
    stockFindings("Salt", stockBalance(lines, [{ day: "2026-01-01", usedLb: loggedLb }]));
  expect(lost(450_000)).toEqual([]);
  expect(lost(445_000).map(({ message }) => message)).toEqual([
    "The pile of salt lost 27.5 tons more than the 222.5 logged: 11 % of what was used is unexplained. We ask from 10 % on.",
  ]);
  expect(lost(560_000).map(({ message }) => message)).toEqual([
    "The storm log has 30 tons of salt more than left the pile: 12 % too much. We ask from 10 % on.",
  ]);
});

test("units of stock come to pounds: ton, tonne, kg, lb, and cubic yards only with a density", () => {
  expect(quantityToLb(1.5, "ton", null)).toBe(3000);
  expect(quantityToLb(3000, "lb", null)).toBe(3000);
  expect(quantityToLb(1, "tonne", null)).toBeCloseTo(2204.6226, 4);
  expect(quantityToLb(1000, "kg", null)).toBeCloseTo(2204.6226, 4);
  expect(quantityToLb(5, "cubic-yard", 2160)).toBe(10_800);
  expect(() => quantityToLb(5, "cubic-yard", null)).toThrow(RangeError);
  expect(() => quantityToLb(-1, "ton", null)).toThrow(RangeError);
  expect(() => quantityToLb(NaN, "ton", null)).toThrow(RangeError);
});

const day = fc.integer({ min: 1, max: 28 }).map((number) => `2026-01-${String(number).padStart(2, "0")}`);
const stockLine = fc.record({
  kind: fc.constantFrom("opening", "delivery", "transfer-in", "transfer-out", "closing"),
  day,
  quantityLb: fc.integer({ min: 0, max: 1_000_000 }),
});

test("the order in which entries are written down does not matter", () => {
  fc.assert(
    fc.property(fc.array(stockLine, { maxLength: 12 }), (entries) => {
      const typed = entries as StockLine[];
      expect(stockBalance(typed.toReversed(), [])).toEqual(stockBalance(typed, []));
    }),
  );
});
