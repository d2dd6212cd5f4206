import { cellNumber } from "../cell-number.ts";
import { parseSeasonLabel, seasonLabel } from "../dates.ts";
import { cellProblem, cellText, type FileProblem, type FileRow } from "../file-problem.ts";
import { shortTonsToLb } from "../units.ts";
import { lbPerCubicYardOf } from "./bulk-density.ts";
import { seasonFindings } from "./season-findings.ts";
import type { SeasonAmounts } from "./season-totals.ts";

/** The columns of a file of season figures, in the template's order. Each carries its unit. */
export const seasonFileColumns = [
  "season",
  "lane_miles",
  "events",
  "salt_tons",
  "mix_tons",
  "mix_salt_percent",
  "sand_tons",
  "brine_gal",
  "material_cost_usd",
] as const;

export type StagedSeason = { row: number; seasonStartYear: number; amounts: SeasonAmounts };

/** What is known of the town before its file is read. */
export type SeasonKnowledge = {
  /** Seasons the network has opened. */
  seasonStartYears: readonly number[];
  /** Seasons that were sent in or accepted: a file no longer changes them. */
  closedStartYears: readonly number[];
  /** The town's accepted seasons. */
  earlier: readonly { seasonStartYear: number; amounts: SeasonAmounts }[];
};

const findingColumns: Record<string, string> = {
  laneMiles: "lane_miles",
  eventCount: "events",
  saltLb: "salt_tons",
  mixLb: "mix_tons",
  sandLb: "sand_tons",
  materialCostCents: "material_cost_usd",
};

function readSeason(fileRow: FileRow, known: SeasonKnowledge, problems: FileProblem[]): number | null {
  const text = cellText(fileRow, "season");
  const startYear = parseSeasonLabel(text);
  if (startYear === null) {
    problems.push(cellProblem(fileRow, "season", "not-a-season", "Write the season by its two years, as in 2025-26."));
    return null;
  }
  if (!known.seasonStartYears.includes(startYear)) {
    problems.push(
      cellProblem(fileRow, "season", "season-not-open", `The network has not opened ${seasonLabel(startYear)}.`),
    );
    return null;
  }
  if (known.closedStartYears.includes(startYear)) {
    const message = `${seasonLabel(startYear)} has been sent in, so a file no longer changes it. Ask the coordinator to send it back first.`;
    problems.push(cellProblem(fileRow, "season", "season-sent", message));
    return null;
  }
  return startYear;
}

function readAmounts(fileRow: FileRow, problems: FileProblem[]): SeasonAmounts | null {
  const before = problems.length;
  const tons = { min: 0, max: 500_000, unit: "ton" } as const;
  const laneMiles = cellNumber(
    fileRow,
    "lane_miles",
    { what: "lane miles", min: 0.1, max: 10_000, unit: "mile" },
    problems,
  );
  const eventCount = cellNumber(
    fileRow,
    "events",
    { what: "number of events", min: 0, max: 120, isWhole: true },
    problems,
  );
  const saltTons = cellNumber(
    fileRow,
    "salt_tons",
    { what: "tons of salt", ...tons, lbPerCubicYard: lbPerCubicYardOf.salt },
    problems,
  );
  const mixTons = cellNumber(
    fileRow,
    "mix_tons",
    { what: "tons of sand and salt mix", ...tons, lbPerCubicYard: lbPerCubicYardOf.mix },
    problems,
  );
  const sandTons = cellNumber(
    fileRow,
    "sand_tons",
    { what: "tons of sand and grit", ...tons, lbPerCubicYard: lbPerCubicYardOf.sand },
    problems,
  );
  const mixPercent = cellNumber(
    fileRow,
    "mix_salt_percent",
    { what: "salt in the mix, percent", min: 0, max: 100, sign: "%", mayBeBlank: mixTons === 0 },
    problems,
  );
  const brineGal = cellNumber(
    fileRow,
    "brine_gal",
    { what: "gallons of brine", min: 0, max: 50_000_000, unit: "gal", mayBeBlank: true },
    problems,
  );
  const costUsd = cellNumber(
    fileRow,
    "material_cost_usd",
    { what: "material cost, dollars", min: 0, max: 40_000_000, sign: "$", mayBeBlank: true },
    problems,
  );
  if (problems.length > before || laneMiles === null || eventCount === null) return null;
  return {
    laneMiles,
    eventCount,
    saltLb: shortTonsToLb(saltTons ?? 0),
    mixLb: shortTonsToLb(mixTons ?? 0),
    mixSaltShare: mixTons === 0 || mixPercent === null ? null : mixPercent / 100,
    sandLb: shortTonsToLb(sandTons ?? 0),
    brineGal,
    materialCostCents: costUsd === null ? null : Math.round(costUsd * 100),
  };
}

/**
 * Season figures out of a file's rows.
 *
 * @param rows - as read, in the file's order; may be empty
 * @param known - what the network and the town have already
 * @returns every row that is right, in storage units, and every problem by row and column
 */
export function readSeasonRows(rows: readonly FileRow[], known: SeasonKnowledge) {
  const staged: StagedSeason[] = [];
  const problems: FileProblem[] = [];
  for (const fileRow of rows) {
    const seasonStartYear = readSeason(fileRow, known, problems);
    const amounts = readAmounts(fileRow, problems);
    if (seasonStartYear === null || amounts === null) continue;
    if (staged.some((other) => other.seasonStartYear === seasonStartYear)) {
      problems.push(
        cellProblem(fileRow, "season", "twice", `${seasonLabel(seasonStartYear)} stands twice in this file.`),
      );
      continue;
    }
    const earlier = known.earlier
      .filter((season) => season.seasonStartYear < seasonStartYear)
      .map((season) => season.amounts);
    for (const finding of seasonFindings(amounts, earlier)) {
      const column = findingColumns[finding.field] ?? "season";
      problems.push(cellProblem(fileRow, column, finding.code, finding.message, finding.severity));
    }
    staged.push({ row: fileRow.row, seasonStartYear, amounts });
  }
  return { staged, problems };
}
