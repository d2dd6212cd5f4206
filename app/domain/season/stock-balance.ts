import type { LocalDate } from "../dates.ts";
import type { Finding } from "../finding.ts";
import { lbToShortTons } from "../units.ts";

/** What can happen to a pile. Opening and closing are measured; the others are moved. */
export const stockKinds = ["opening", "delivery", "transfer-in", "transfer-out", "closing"] as const;
export type StockKind = (typeof stockKinds)[number];

/** Whether a text names a kind of stock entry. */
export function isStockKind(text: string): text is StockKind {
  return stockKinds.some((kind) => kind === text);
}

export type StockLine = { kind: StockKind; day: LocalDate; quantityLb: number };
export type LogLine = { day: LocalDate; usedLb: number };

/** One material's pile through a season, all in lb. null = not measured, so not known. */
export type StockBalance = {
  openedOn: LocalDate | null;
  closedOn: LocalDate | null;
  openingLb: number | null;
  receivedLb: number;
  transferredInLb: number;
  transferredOutLb: number;
  closingLb: number | null;
  /** Opening + received + transfers in − transfers out − closing. */
  usedLb: number | null;
  /** By the storm log, in the same days; null when no log is kept. */
  loggedLb: number | null;
  unexplainedLb: number | null;
  /** Of what was used, below 0 when more was logged than used; null when nothing was used. */
  unexplainedShare: number | null;
  /** Moved or logged before the opening or after the closing, and left out. */
  leftOutCount: number;
};

/**
 * From which unexplained share on we ask for a look. A choice of ours: no published limit is known, and measuring a
 * pile is itself uncertain.
 */
export const flaggedUnexplainedShare = 0.1;

function measured(lines: readonly StockLine[], kind: "opening" | "closing") {
  const days = lines.filter((line) => line.kind === kind).map((line) => line.day);
  // Measured more than once: the first opening and the last closing span the most of the season.
  const day = days.toSorted().at(kind === "opening" ? 0 : -1);
  if (day === undefined) return { day: null, totalLb: null };
  const piles = lines.filter((line) => line.kind === kind && line.day === day);
  return { day, totalLb: piles.reduce((sum, line) => sum + line.quantityLb, 0) };
}

/**
 * What a pile was drawn down by, against what the storm log says.
 *
 * Piles of one material measured on the same day are added. What was moved or logged before the opening's day or after
 * the closing's day is left out and counted; those days themselves are in.
 *
 * @param lines - the material's stock entries of one season, any order, lb ≥ 0
 * @param log - the material's use by the storm log, any order, lb ≥ 0; null when the town keeps no log of the season
 * @returns quantities in lb; used and unexplained are null until both an opening and a
 *   closing are measured, unexplained also without a log
 *
 * Source: used = opening + received − closing, transfers counted; discrepancy = (used − logged) / used. Bookkeeping.
 * @example stockBalance([{ kind: "opening", day: "2025-10-01", quantityLb: 100 },
 *   { kind: "closing", day: "2026-04-30", quantityLb: 20 }], [{ day: "2026-01-02", usedLb: 72 }]).unexplainedShare // 0.1
 */
export function stockBalance(lines: readonly StockLine[], log: readonly LogLine[] | null): StockBalance {
  const opening = measured(lines, "opening");
  const closing = measured(lines, "closing");
  const isIn = ({ day }: { day: LocalDate }) =>
    (opening.day === null || day >= opening.day) && (closing.day === null || day <= closing.day);
  const moved = lines.filter(({ kind }) => kind !== "opening" && kind !== "closing");
  const sumOf = (kind: StockKind) =>
    moved.filter((line) => line.kind === kind && isIn(line)).reduce((sum, line) => sum + line.quantityLb, 0);
  const receivedLb = sumOf("delivery");
  const transferredInLb = sumOf("transfer-in");
  const transferredOutLb = sumOf("transfer-out");
  const loggedLb = log === null ? null : log.filter(isIn).reduce((sum, line) => sum + line.usedLb, 0);
  const usedLb =
    opening.totalLb === null || closing.totalLb === null
      ? null
      : opening.totalLb + receivedLb + transferredInLb - transferredOutLb - closing.totalLb;
  const unexplainedLb = usedLb === null || loggedLb === null ? null : usedLb - loggedLb;
  return {
    openedOn: opening.day,
    closedOn: closing.day,
    openingLb: opening.totalLb,
    receivedLb,
    transferredInLb,
    transferredOutLb,
    closingLb: closing.totalLb,
    usedLb,
    loggedLb,
    unexplainedLb,
    unexplainedShare: usedLb === null || unexplainedLb === null || usedLb <= 0 ? null : unexplainedLb / usedLb,
    leftOutCount: [...moved, ...(log ?? [])].filter((line) => !isIn(line)).length,
  };
}

function tons(weightLb: number) {
  return lbToShortTons(weightLb).toLocaleString("en-US", { maximumFractionDigits: 1 });
}

/**
 * What is doubtful about a pile, as sentences for the town and the coordinator.
 *
 * @param materialName - as the town calls it
 * @returns at most one check; none while opening or closing is not measured
 */
export function stockFindings(materialName: string, balance: StockBalance): Finding[] {
  const { usedLb, loggedLb, unexplainedShare, unexplainedLb } = balance;
  const check = (code: string, message: string): Finding => ({ code, severity: "check", field: "stock", message });
  const name = materialName.toLowerCase();
  if (usedLb === null) return [];
  if (usedLb < 0) {
    const message = `The pile of ${name} grew: the closing stock is ${tons(-usedLb)} tons above opening and received together. A delivery is probably missing.`;
    return [check("pile-grew", message)];
  }
  if (unexplainedShare === null || unexplainedLb === null || loggedLb === null) return [];
  if (Math.abs(unexplainedShare) <= flaggedUnexplainedShare) return [];
  const percent = Math.abs(100 * unexplainedShare).toFixed(0);
  const words =
    unexplainedShare > 0
      ? `The pile of ${name} lost ${tons(unexplainedLb)} tons more than the ${tons(loggedLb)} logged: ${percent} % of what was used is unexplained.`
      : `The storm log has ${tons(-unexplainedLb)} tons of ${name} more than left the pile: ${percent} % too much.`;
  return [check("stock-unexplained", `${words} We ask from ${100 * flaggedUnexplainedShare} % on.`)];
}
