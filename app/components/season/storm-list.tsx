import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import type { StormEntry, StormKnowledge } from "#app/domain/season/storm-cells.ts";
import { stormKindWords } from "#app/domain/season/storm.ts";
import { formatLocalTime, formatOneDecimal, formatTons, formatWhole } from "#app/lib/format.ts";

type Props = {
  storms: readonly (StormEntry & { id: number })[];
  known: StormKnowledge;
  /** Of a line's own form; null when nothing may be changed. */
  lineTo: ((stormId: number) => string) | null;
};

/** The storm log to read: a table, and labelled blocks on a phone. */
export function StormList({ storms, known, lineTo }: Props) {
  return (
    <Timetable
      caption="Storms, oldest first, in local time"
      columns={[
        { key: "start", label: "start" },
        { key: "end", label: "end" },
        { key: "kind", label: "kind" },
        { key: "pavement", label: "pavement", unit: "°F", isNumeric: true },
        { key: "miles", label: "lane miles", isNumeric: true },
        ...known.materials.map(({ id, name, kind }) => ({
          key: String(id),
          label: name.toLowerCase(),
          unit: kind === "brine" ? "gal" : "tons",
          isNumeric: true,
        })),
        { key: "truck", label: "truck or route" },
      ]}
      rows={storms.map((storm) => ({
        key: String(storm.id),
        cells: {
          start:
            lineTo === null ? (
              formatLocalTime(storm.startedAt)
            ) : (
              <TextLink to={lineTo(storm.id)}>{formatLocalTime(storm.startedAt)}</TextLink>
            ),
          end: storm.endedAt === null ? "–" : formatLocalTime(storm.endedAt),
          kind: stormKindWords[storm.kind],
          pavement: formatWhole(storm.pavementTempF),
          miles: formatOneDecimal(storm.laneMilesTreated),
          ...Object.fromEntries(
            known.materials.map(({ id }) => {
              const used = storm.used.find(({ materialId }) => materialId === id);
              return [String(id), used?.usedLb == null ? formatWhole(used?.usedGal ?? null) : formatTons(used.usedLb)];
            }),
          ),
          truck:
            [known.trucks.find(({ id }) => id === storm.truckId)?.unitNumber, storm.route]
              .filter((words) => words !== undefined && words !== "")
              .join(", ") || "–",
        },
      }))}
    />
  );
}
