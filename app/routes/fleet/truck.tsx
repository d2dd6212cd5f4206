import { RateWords } from "#app/components/fleet/fleet-table.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { bandPlace } from "#app/domain/calibration/band.ts";
import { calibrationRates, rateAtSetting } from "#app/domain/calibration/rates.ts";
import { formatInches, formatShortDay, formatWhole } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { getTruck, type TruckView } from "#app/services/fleet.server.ts";
import type { Route } from "./+types/truck";

const speedsMph = [15, 20, 25, 30, 35];

export async function loader({ context, params }: Route.LoaderArgs) {
  return { truck: await getTruck(townActor(context), idParam(params.truckId, "truck")) };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Truck ${loaderData?.truck.unitNumber ?? ""} · Commonweigh` },
];

type Calibration = TruckView["calibrations"][number];

function Sentence({ truck, calibration }: { truck: TruckView; calibration: Calibration }) {
  const { workingRateLbPerLaneMile: rate, workingPlace: place, band, materialName } = calibration;
  const at = `at setting ${truck.workingSetting} and ${truck.workingSpeedMph} mph`;
  if (rate === null) return `Truck ${truck.unitNumber} has no count at its working setting, ${truck.workingSetting}.`;
  const head = `Truck ${truck.unitNumber} lays ${formatWhole(rate)} lb of ${materialName.toLowerCase()} per lane mile ${at}`;
  if (band === null || place === null) return `${head}.`;
  if (place === "over") {
    return (
      <>
        {head}: <Over>{formatWhole(rate - band.highLbPerLaneMile)} above the band</Over>.
      </>
    );
  }
  if (place === "under") {
    return (
      <>
        {head}: <Under>{formatWhole(band.lowLbPerLaneMile - rate)} under the band</Under>.
      </>
    );
  }
  return (
    <>
      {head}: <InBand>in the band</InBand>.
    </>
  );
}

function RateTable({ truck, calibration }: { truck: TruckView; calibration: Calibration }) {
  const rates = calibrationRates(calibration);
  return (
    <Timetable
      caption={`Pounds of ${calibration.materialName.toLowerCase()} per lane mile, by feed setting and speed`}
      onPhone="keep"
      columns={[
        { key: "setting", label: "setting" },
        ...speedsMph.map((mph) => ({ key: String(mph), label: `${mph} mph`, isNumeric: true })),
      ]}
      rows={rates.settings.map(({ setting, isAtHydraulicLimit }) => ({
        key: String(setting),
        isOurs: setting === truck.workingSetting,
        cells: {
          setting: isAtHydraulicLimit ? (
            <>
              {setting}
              <span className="block text-s font-normal sm:inline">
                <span className="max-sm:hidden">, </span>hydraulics at their limit
              </span>
            </>
          ) : (
            String(setting)
          ),
          ...Object.fromEntries(
            speedsMph.map((mph) => {
              const rate = rateAtSetting(rates, setting, mph, truck.lanesPerPass);
              const place = rate === null || calibration.band === null ? null : bandPlace(rate, calibration.band);
              return [String(mph), <RateWords key={mph} rate={rate} place={place} />];
            }),
          ),
        },
      }))}
    />
  );
}

export default function Truck({ loaderData: { truck } }: Route.ComponentProps) {
  const newest = truck.calibrations.find(({ state }) => state === "approved") ?? truck.calibrations[0];
  if (!newest) {
    return (
      <Page>
        <Answer>Truck {truck.unitNumber} has never been weighed.</Answer>
        <EmptyState
          title="Its calibrations belong here"
          action={<ButtonLink to="/uploads?kind=calibrations">Upload the readings</ButtonLink>}
        >
          Count the shaft’s turns at each setting, weigh what one turn lets fall, and upload the readings.
        </EmptyState>
      </Page>
    );
  }
  return (
    <Page>
      <Answer>
        <Sentence truck={truck} calibration={newest} />
      </Answer>
      <Method>
        Weighed {formatShortDay(newest.testedOn)} at a gate of {formatInches(newest.gateOpeningIn)} in, one{" "}
        {truck.lanesPerPass === 1 ? "lane" : `pass over ${truck.lanesPerPass} lanes`}. Rates are yardsticks: policy,
        road, weather and the person responsible decide how much is applied.
      </Method>
      <div className="mt-6">
        <RateTable truck={truck} calibration={newest} />
      </div>
      <p className="mt-2 text-note text-gravel">
        <InBand>in the band</InBand> &ensp; <Over>above it</Over> &ensp; <Under>under it</Under> &ensp; tinted row: the
        working setting
      </p>
      <Heading>All calibrations</Heading>
      <Timetable
        caption="Newest first"
        columns={[
          { key: "day", label: "weighed" },
          { key: "material", label: "material" },
          { key: "gate", label: "gate", unit: "in", isNumeric: true, isWideOnly: true },
          { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
          { key: "state", label: "state" },
        ]}
        rows={truck.calibrations.map((calibration) => ({
          key: String(calibration.id),
          cells: {
            day: formatShortDay(calibration.testedOn),
            material: calibration.materialName,
            gate: formatInches(calibration.gateOpeningIn),
            lays: <RateWords rate={calibration.workingRateLbPerLaneMile} place={calibration.workingPlace} />,
            state: calibration.state === "approved" ? "approved" : "waits for approval",
          },
        }))}
      />
      <p className="mt-6">
        <TextLink to="/fleet">All trucks</TextLink>
      </p>
    </Page>
  );
}
