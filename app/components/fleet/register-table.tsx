import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import type { DueReason } from "#app/domain/calibration/due.ts";
import type { ControlKind, SpreaderKind } from "#app/domain/fleet/truck.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { DueMark } from "./due-mark.tsx";
import { controlWords, gateWords, spreaderWords, workingPointWords } from "./fleet-words.ts";
import { LaysWords, type Liquid } from "./liquid-words.tsx";
import { mainLine, urgentLine } from "./register-view.ts";

type Working = {
  lbPerLaneMile: number;
  plusMinusLbPerLaneMile: number | null;
  place: "under" | "in" | "over" | null;
} | null;
type Line = {
  materialName: string;
  materialKind: string;
  due: DueReason;
  inForce: {
    id: number;
    testedOn: string;
    gateOpeningIn: number | null;
    working: Working;
    liquids: readonly Liquid[];
  } | null;
};
type Truck = {
  id: number;
  unitNumber: string;
  body: string;
  spreaderKind: SpreaderKind;
  control: ControlKind;
  workingSetting: number;
  workingSpeedMph: number;
  isInService: boolean;
  materials: readonly Line[];
};

/** Every truck in a row: what it is, what it lays of its main material, and whether it is to be weighed. */
export function RegisterTable({ trucks }: { trucks: readonly Truck[] }) {
  return (
    <Timetable
      caption="Trucks: what they lay at the working setting and speed, and when they were weighed"
      isCaptionHidden
      hasStickyHead
      columns={[
        { key: "truck", label: "truck", foldPrefix: "Truck" },
        { key: "spreader", label: "spreader", isWideOnly: true },
        { key: "at", label: "works at", isWideOnly: true },
        { key: "material", label: "material" },
        { key: "gate", label: "gate", unit: "in", isNumeric: true, isWideOnly: true },
        { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
        { key: "weighed", label: "weighed", isNumeric: true },
        { key: "due", label: "calibration" },
      ]}
      rows={trucks.map((truck) => ({ key: String(truck.id), cells: rowCells(truck) }))}
    />
  );
}

function rowCells(truck: Truck) {
  const line = mainLine(truck);
  const others = truck.materials.length - 1;
  const inForce = line?.inForce ?? null;
  const urgent = urgentLine(truck);
  return {
    truck: <TextLink to={`/fleet/${truck.id}`}>{truck.unitNumber}</TextLink>,
    spreader: (
      <span>
        {spreaderWords[truck.spreaderKind]}
        {truck.control === "ground-speed" && `, ${controlWords[truck.control]}`}
        {truck.body !== "" && <span className="block text-note leading-snug text-gravel">{truck.body}</span>}
      </span>
    ),
    at: <span className="whitespace-nowrap">{workingPointWords(truck)}</span>,
    material: line ? `${line.materialName}${others > 0 ? ` and ${others} more` : ""}` : "–",
    gate: inForce ? <span className="whitespace-nowrap">{gateWords(inForce.gateOpeningIn)}</span> : "–",
    lays: inForce ? (
      <TextLink to={`/fleet/calibrations/${inForce.id}`} className="no-underline hover:underline">
        <LaysWords line={inForce} />
      </TextLink>
    ) : (
      "–"
    ),
    weighed: inForce ? <span className="whitespace-nowrap">{formatShortDay(inForce.testedOn)}</span> : "–",
    due: <DueCell isInService={truck.isInService} urgent={urgent} isMain={urgent === line} />,
  };
}

/** The state of the material that is to be weighed first; named when it is not the one that the row shows. */
function DueCell({ isInService, urgent, isMain }: { isInService: boolean; urgent: Line | undefined; isMain: boolean }) {
  if (!isInService) return <span className="text-gravel">out of service</span>;
  if (!urgent) return "–";
  if (urgent.due.state === "in-date" || isMain) return <DueMark due={urgent.due} />;
  return <DueMark due={urgent.due} of={urgent.materialName.toLowerCase()} />;
}
