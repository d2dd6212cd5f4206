import { Timetable } from "#app/components/ui/timetable.tsx";
import { seasonLabel } from "#app/domain/dates.ts";
import type { SeasonAmounts, SeasonTotals } from "#app/domain/season/season-totals.ts";
import { formatDollars, formatOneDecimal, formatShare, formatTons, formatWhole } from "#app/lib/format.ts";

export type SeasonColumn = { seasonStartYear: number; amounts: SeasonAmounts; totals: SeasonTotals };

/** One line of the table: its name with the unit, and how to read it from a season. */
type Line = { label: string; read: (season: SeasonColumn) => string };

const reportedLines: readonly Line[] = [
  { label: "Lane miles", read: ({ amounts }) => formatOneDecimal(amounts.laneMiles) },
  { label: "Events", read: ({ amounts }) => formatWhole(amounts.eventCount) },
  { label: "Salt, tons", read: ({ amounts }) => formatTons(amounts.saltLb) },
  { label: "Sand and salt mix, tons", read: ({ amounts }) => formatTons(amounts.mixLb) },
  { label: "Salt in the mix", read: ({ amounts }) => formatShare(amounts.mixSaltShare) },
  { label: "Sand and grit, tons", read: ({ amounts }) => formatTons(amounts.sandLb) },
  { label: "Brine, gallons", read: ({ amounts }) => formatWhole(amounts.brineGal) },
  { label: "Material cost", read: ({ amounts }) => formatDollars(amounts.materialCostCents) },
];

const workedOutLines: readonly Line[] = [
  { label: "Salt per lane mile, tons", read: ({ totals }) => formatOneDecimal(totals.saltTonsPerLaneMile) },
  { label: "Salt per lane mile and event, lb", read: ({ totals }) => formatWhole(totals.saltLbPerLaneMileEvent) },
  { label: "Chloride per lane mile, lb", read: ({ totals }) => formatWhole(totals.chlorideLbPerLaneMile) },
  { label: "Cost per lane mile", read: ({ totals }) => formatDollars(totals.materialCostCentsPerLaneMile) },
];

/** Seasons side by side, the one in question first: what was reported, then what is worked out from it. */
export function SeasonTable({ seasons, caption }: { seasons: readonly SeasonColumn[]; caption: string }) {
  const isSingle = seasons.length === 1;
  return (
    <div className={isSingle ? "max-w-measure" : ""}>
      <Timetable
        caption={caption}
        onPhone={isSingle ? "keep" : "stack"}
        columns={[
          { key: "line", label: "season" },
          ...seasons.map(({ seasonStartYear }) => ({
            key: String(seasonStartYear),
            label: seasonLabel(seasonStartYear),
            isNumeric: true,
          })),
        ]}
        rows={[...reportedLines, ...workedOutLines].map((line) => ({
          key: line.label,
          isPartStart: line === workedOutLines[0],
          cells: {
            line: line.label,
            ...Object.fromEntries(seasons.map((season) => [String(season.seasonStartYear), line.read(season)])),
          },
        }))}
      />
    </div>
  );
}
