import { controlWords, spreaderWords, workingPointWords } from "#app/components/fleet/fleet-words.ts";
import { SeasonTable } from "#app/components/season/season-table.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { catchVariationPercent } from "#app/domain/calibration/catch-weight.ts";
import type { StagedCalibration } from "#app/domain/calibration/calibration-file.ts";
import type { StagedTruck } from "#app/domain/fleet/truck-file.ts";
import type { StagedSeason } from "#app/domain/season/season-file.ts";
import { seasonTotals } from "#app/domain/season/season-totals.ts";
import { formatInches, formatOneDecimal, formatShortDay } from "#app/lib/format.ts";

type Props = {
  upload: {
    seasons: readonly StagedSeason[];
    calibrations: readonly StagedCalibration[];
    trucks: readonly StagedTruck[];
  };
};

/** What could be read from a file, as a table of its kind. */
export function UploadHolds({ upload: { seasons, calibrations, trucks } }: Props) {
  if (seasons.length > 0) {
    return (
      <SeasonTable
        caption="As read from the file, and worked out from it"
        seasons={seasons.map(({ seasonStartYear, amounts }) => ({
          seasonStartYear,
          amounts,
          totals: seasonTotals(amounts),
        }))}
      />
    );
  }
  if (calibrations.length > 0) return <CalibrationRows calibrations={calibrations} />;
  return trucks.length > 0 ? <TruckRows trucks={trucks} /> : null;
}

function CalibrationRows({ calibrations }: { calibrations: readonly StagedCalibration[] }) {
  return (
    <Timetable
      caption="Calibrations as read from the file"
      columns={[
        { key: "truck", label: "truck", foldPrefix: "Truck" },
        { key: "material", label: "material" },
        { key: "day", label: "weighed" },
        { key: "gate", label: "gate", unit: "in", isNumeric: true },
        { key: "counts", label: "settings counted", isNumeric: true },
        { key: "catches", label: "catches", isNumeric: true },
        { key: "spread", label: "catches differ by", unit: "%", isNumeric: true },
      ]}
      rows={calibrations.map((calibration) => ({
        key: String(calibration.row),
        cells: {
          truck: calibration.unitNumber,
          material: calibration.materialName,
          day: formatShortDay(calibration.testedOn),
          gate: formatInches(calibration.gateOpeningIn),
          counts: calibration.counts.length,
          catches: calibration.catches.length,
          spread: calibration.catches.length === 0 ? "–" : formatOneDecimal(catchVariationPercent(calibration.catches)),
        },
      }))}
    />
  );
}

function TruckRows({ trucks }: { trucks: readonly StagedTruck[] }) {
  return (
    <Timetable
      caption="Trucks as read from the file"
      columns={[
        { key: "truck", label: "truck", foldPrefix: "Truck" },
        { key: "change", label: "in the fleet" },
        { key: "spreader", label: "spreader" },
        { key: "at", label: "works at" },
        { key: "gate", label: "gate up to", unit: "in", isNumeric: true },
        { key: "service", label: "in service" },
      ]}
      rows={trucks.map((truck) => ({
        key: String(truck.row),
        cells: {
          truck: truck.unitNumber,
          change: truck.truckId === null ? <b>new</b> : "known",
          spreader: `${spreaderWords[truck.spreaderKind]}, ${controlWords[truck.control]}`,
          at: workingPointWords(truck),
          gate: truck.gateMaxIn === null ? "–" : formatInches(truck.gateMaxIn),
          service: truck.isInService ? "yes" : "no",
        },
      }))}
    />
  );
}
