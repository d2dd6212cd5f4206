import { Timetable } from "#app/components/ui/timetable.tsx";
import type { StagedCalibration } from "#app/domain/calibration/calibration-file.ts";
import type { StagedTruck } from "#app/domain/fleet/truck-file.ts";
import type { StagedSeason } from "#app/domain/season/season-file.ts";
import { type StagedStock, stockKindWords } from "#app/domain/season/stock-file.ts";
import type { StagedStorm } from "#app/domain/season/storm-file.ts";
import { stormKindWords } from "#app/domain/season/storm-kind.ts";
import { unitWords } from "#app/domain/upload/measure.ts";
import { formatDollars, formatOneDecimal, formatShortDay, formatTons, formatWhole } from "#app/lib/format.ts";

import { UploadHolds } from "./upload-holds.tsx";

export type ReadySample = {
  seasons: StagedSeason[];
  calibrations: StagedCalibration[];
  trucks: StagedTruck[];
  storms: (StagedStorm & { sheetRow: number })[];
  stock: (StagedStock & { sheetRow: number })[];
  truckNames: Record<number, string>;
  materialNames: Record<number, string>;
};

function Storms({ sample }: { sample: ReadySample }) {
  const used = (storm: StagedStorm) =>
    storm.uses
      .map(({ materialId, usedLb, usedGal }) => {
        const amount = usedGal === null ? `${formatTons(usedLb)} tons` : `${formatWhole(usedGal)} gal`;
        return `${amount} ${sample.materialNames[materialId] ?? ""}`;
      })
      .join(", ");
  return (
    <Timetable
      caption="The first rows, as they were understood"
      columns={[
        { key: "row", label: "row" },
        { key: "began", label: "began" },
        { key: "kind", label: "kind" },
        { key: "truck", label: "truck" },
        { key: "miles", label: "lane miles", isNumeric: true },
        { key: "hours", label: "hours", isNumeric: true },
        { key: "used", label: "used" },
      ]}
      rows={sample.storms.map((storm) => ({
        key: String(storm.sheetRow),
        cells: {
          row: storm.sheetRow,
          began: `${formatShortDay(storm.startedAt.slice(0, 10))}, ${storm.startedAt.slice(11, 16)}`,
          kind: stormKindWords[storm.kind],
          truck: storm.truckId === null ? "–" : (sample.truckNames[storm.truckId] ?? "–"),
          miles: formatOneDecimal(storm.laneMilesTreated),
          hours: formatOneDecimal(storm.hours),
          used: storm.uses.length === 0 ? "–" : used(storm),
        },
      }))}
    />
  );
}

function Stock({ sample }: { sample: ReadySample }) {
  return (
    <Timetable
      caption="The first rows, as they were understood"
      columns={[
        { key: "row", label: "row" },
        { key: "day", label: "day" },
        { key: "what", label: "what" },
        { key: "material", label: "material" },
        { key: "written", label: "as written" },
        { key: "tons", label: "quantity", unit: "tons", isNumeric: true },
        { key: "price", label: "price", isNumeric: true },
      ]}
      rows={sample.stock.map((entry) => ({
        key: String(entry.sheetRow),
        cells: {
          row: entry.sheetRow,
          day: formatShortDay(entry.day),
          what: stockKindWords[entry.kind],
          material: sample.materialNames[entry.materialId] ?? "–",
          written: `${formatOneDecimal(entry.typedQuantity)} ${unitWords[entry.typedUnit]}`,
          tons: formatTons(entry.quantityLb),
          price: formatDollars(entry.priceCents),
        },
      }))}
    />
  );
}

/** What would be taken in, as it was understood. */
export function ReadyRows({ sample }: { sample: ReadySample }) {
  if (sample.storms.length > 0) return <Storms sample={sample} />;
  if (sample.stock.length > 0) return <Stock sample={sample} />;
  return <UploadHolds upload={sample} />;
}
