import { DueMark } from "#app/components/fleet/due-mark.tsx";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { controlWords, gateWords, spreaderWords, workingPointWords } from "#app/components/fleet/fleet-words.ts";
import { LaysWords, liquidRateAt } from "#app/components/fleet/liquid-words.tsx";
import { PlaceKey } from "#app/components/fleet/rate-words.tsx";
import { mainLine } from "#app/components/fleet/register-view.ts";
import { WorkTable } from "#app/components/fleet/work-table.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { Facts } from "#app/components/ui/facts.tsx";
import { MarginSection, WithMargin } from "#app/components/ui/side-by-side.tsx";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { distanceFromBand } from "#app/domain/calibration/band.ts";
import { formatInches, formatOneDecimal, formatShortDay, formatWhole } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { getTruck, type MaterialLine, type TruckDetail } from "#app/services/fleet/read.server.ts";
import type { Route } from "./+types/truck";

export async function loader({ context, params }: Route.LoaderArgs) {
  return { truck: await getTruck(townActor(context), idParam(params.truckId, "truck")) };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Truck ${loaderData?.truck.unitNumber ?? ""} · Commonweigh` },
];

function Sentence({ truck }: { truck: TruckDetail }) {
  const line = mainLine(truck);
  const name = `Truck ${truck.unitNumber}`;
  const working = line?.inForce?.working ?? null;
  if (!line?.inForce) return `${name} has never been weighed${line ? ` with ${line.materialName.toLowerCase()}` : ""}.`;
  if (working === null && line.inForce.liquids.length > 0) {
    return `${name} lays ${line.materialName.toLowerCase()}: ${line.inForce.liquids.map(liquidRateAt).join("; ")}.`;
  }
  if (working === null) return `${name} was not measured at its working setting, ${truck.workingSetting}.`;
  const rate = formatWhole(working.lbPerLaneMile);
  const head = `${name} lays ${rate} lb of ${line.materialName.toLowerCase()} per lane mile at ${workingPointWords(truck)}`;
  if (line.band === null || working.place === null) return `${head}.`;
  const off = formatWhole(Math.max(1, Math.abs(distanceFromBand(working.lbPerLaneMile, line.band))));
  return (
    <>
      {head}:{" "}
      {working.place === "over" ? (
        <Over>{off} above the band</Over>
      ) : working.place === "under" ? (
        <Under>{off} under the band</Under>
      ) : (
        <InBand>in the band</InBand>
      )}
      .
    </>
  );
}

export default function Truck({ loaderData: { truck } }: Route.ComponentProps) {
  const line = mainLine(truck);
  const weigh = `/fleet/worksheets/new?truck=${truck.id}${line ? `&material=${line.materialId}` : ""}`;
  return (
    <Page>
      <Answer>
        <Sentence truck={truck} />
      </Answer>
      <Method>
        {truck.body === "" ? "" : `${truck.body}, `}
        {spreaderWords[truck.spreaderKind]}, {controlWords[truck.control]} control.{" "}
        {truck.isInService ? "" : "Out of service: nothing is due, and it counts in no figure."}
      </Method>
      <FleetPages />
      <div className="flex flex-wrap items-center gap-x-6 gap-y-2">
        {truck.isInService && <ButtonLink to={weigh}>Weigh truck {truck.unitNumber}</ButtonLink>}
        <TextLink to={`/fleet/${truck.id}/work`} weight="bold">
          Enter work done on it
        </TextLink>
        <TextLink to={`/fleet/${truck.id}/edit`}>Change the truck</TextLink>
      </div>
      <WithMargin margin={<Margin truck={truck} />}>
        <h2 className="mb-3 border-t-2 border-line pt-2 text-l leading-snug font-bold">By material</h2>
        <Materials truck={truck} />
        <Heading>All calibrations</Heading>
        <Calibrations truck={truck} />
        {truck.work.length > 0 && (
          <>
            <Heading>Work done</Heading>
            <WorkTable work={truck.work} />
          </>
        )}
      </WithMargin>
    </Page>
  );
}

function Margin({ truck }: { truck: TruckDetail }) {
  const known = (value: number | null, words: string) => (value === null ? [] : [words]);
  const facts = [
    { name: "works at", value: workingPointWords(truck) },
    {
      name: "spreads",
      value: truck.lanesPerPass === 1 ? "one lane in a pass" : `${truck.lanesPerPass} lanes in a pass`,
    },
    ...known(truck.workingRpm, `${formatWhole(truck.workingRpm)} rpm`).map((value) => ({ name: "engine", value })),
    ...known(truck.gateMaxIn, `up to ${formatInches(truck.gateMaxIn ?? 0)} in`).map((value) => ({
      name: "gate",
      value,
    })),
    ...known(truck.capacityTons, `${formatOneDecimal(truck.capacityTons)} tons`).map((value) => ({
      name: "load",
      value,
    })),
  ];
  return (
    <MarginSection title={`Truck ${truck.unitNumber}`}>
      <div className="mt-1">
        <Facts facts={facts} />
      </div>
    </MarginSection>
  );
}

function materialCells(truck: TruckDetail, line: MaterialLine) {
  const { inForce } = line;
  const weigh = `/fleet/worksheets/new?truck=${truck.id}&material=${line.materialId}`;
  return {
    material: line.materialName,
    state: <DueMark due={line.due} />,
    lays: <LaysWords line={inForce} />,
    gate: inForce ? gateWords(inForce.gateOpeningIn) : "–",
    weighed: inForce ? formatShortDay(inForce.testedOn) : "–",
    next: inForce ? (
      <>
        <TextLink to={`/fleet/calibrations/${inForce.id}`}>
          Rates<span className="sr-only"> with {line.materialName}</span>
        </TextLink>
        {inForce.gateOpeningIn !== null && (
          <>
            ,{" "}
            <TextLink to={`/fleet/calibrations/${inForce.id}/card`}>
              cab card<span className="sr-only"> for {line.materialName}</span>
            </TextLink>
          </>
        )}
      </>
    ) : (
      <TextLink to={weigh}>
        Weigh it<span className="sr-only"> with {line.materialName}</span>
      </TextLink>
    ),
  };
}

function Materials({ truck }: { truck: TruckDetail }) {
  if (truck.materials.length === 0) {
    return (
      <p>
        Nobody has said what it carries. <TextLink to={`/fleet/${truck.id}/edit`}>Say which materials</TextLink>.
      </p>
    );
  }
  return (
    <>
      <Timetable
        caption="What is in force for each material, and whether it is to be weighed again"
        isCaptionHidden
        columns={[
          { key: "material", label: "material" },
          { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
          { key: "gate", label: "gate", unit: "in", isNumeric: true },
          { key: "weighed", label: "weighed", isNumeric: true },
          { key: "state", label: "calibration" },
          { key: "next", label: "look at" },
        ]}
        rows={truck.materials.map((line) => ({ key: String(line.materialId), cells: materialCells(truck, line) }))}
      />
      <p className="mt-2 text-note text-gravel">
        <PlaceKey />
      </p>
    </>
  );
}

function Calibrations({ truck }: { truck: TruckDetail }) {
  if (truck.calibrations.length === 0) {
    return (
      <p className="text-gravel">None yet: count the shaft’s turns at each setting, weigh what one turn lets fall.</p>
    );
  }
  const inForce = new Set(truck.materials.map((line) => line.inForce?.id));
  const stateWords = (id: number, state: "ready" | "approved") => {
    if (state === "ready") return <b>waits for approval</b>;
    return inForce.has(id) ? "in force" : <span className="text-gravel">history</span>;
  };
  return (
    <Timetable
      caption="Newest first"
      isCaptionHidden
      columns={[
        { key: "day", label: "weighed" },
        { key: "material", label: "material" },
        { key: "gate", label: "gate", unit: "in", isNumeric: true },
        { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
        { key: "state", label: "state" },
      ]}
      rows={truck.calibrations.map((calibration) => ({
        key: String(calibration.id),
        cells: {
          day: <TextLink to={`/fleet/calibrations/${calibration.id}`}>{formatShortDay(calibration.testedOn)}</TextLink>,
          material: calibration.materialName,
          gate: gateWords(calibration.gateOpeningIn),
          lays: <LaysWords line={calibration} />,
          state: stateWords(calibration.id, calibration.state),
        },
      }))}
    />
  );
}
