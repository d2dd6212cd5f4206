import { data, Form, redirect, useNavigation } from "react-router";
import { driftSvgs } from "#app/components/charts/drift-svg.server.ts";
import { RateFan } from "#app/components/charts/rate-fan.tsx";
import { rateFanSvgs } from "#app/components/charts/rate-fan-svg.server.ts";
import { BandSentenceWords } from "#app/components/fleet/band-sentence-words.tsx";
import { CalibrationHistory } from "#app/components/fleet/calibration-history.tsx";
import { driftSpec, fanSpec } from "#app/components/fleet/calibration-specs.ts";
import { BeforeAfter, Decision, SavingsWords } from "#app/components/fleet/decision.tsx";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { gateInWords, workingPointWords } from "#app/components/fleet/fleet-words.ts";
import { liquidRateAt } from "#app/components/fleet/liquid-words.tsx";
import { PlaceKey } from "#app/components/fleet/rate-words.tsx";
import { RateTable } from "#app/components/fleet/rate-table.tsx";
import { LiquidSection, RawReadings, VerificationSection } from "#app/components/fleet/reading-tables.tsx";
import { rateUnitWords, readRateView, shownRate, type UnitChoice } from "#app/components/fleet/shown-units.ts";
import { ViewSwitch } from "#app/components/fleet/view-switch.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { Over, Under } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { distanceFromBand } from "#app/domain/calibration/band.ts";
import { bandSentence, type BandSummary } from "#app/domain/calibration/rate-sheet.ts";
import { formatShortDay, formatWhole } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords } from "#app/lib/words.ts";
import { approveCalibration } from "#app/services/fleet/approve.server.ts";
import { type CalibrationDetail, getCalibration } from "#app/services/fleet/calibration.server.ts";
import { ratesOf } from "#app/services/fleet/rates.server.ts";
import type { Route } from "./+types/calibration";

export async function loader({ context, params, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const calibration = await getCalibration(actor, idParam(params.calibrationId, "calibration"));
  const view = readRateView(url.searchParams);
  const { truck, band, history, id } = calibration;
  const rates = ratesOf(calibration, view.stepMph);
  const fan = rates && fanSpec(rates.rows, truck, band, view);
  const drift = driftSpec(history, id, band, view.units);
  return {
    isDirector: actor.role === "director",
    calibration,
    view,
    rates,
    fan: fan && { spec: fan, svg: rateFanSvgs(fan) },
    drift: drift && { spec: drift, svg: driftSvgs(drift) },
  };
}

export async function action({ context, params }: Route.ActionArgs) {
  const calibrationId = idParam(params.calibrationId, "calibration");
  const approved = await approveCalibration(townActor(context), calibrationId);
  if (approved.ok) return redirect(`/fleet/calibrations/${calibrationId}`);
  return data({ refusal: "This calibration has been approved already; it counts once." }, { status: 409 });
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  {
    title: loaderData
      ? `Truck ${loaderData.calibration.truck.unitNumber}, ${loaderData.calibration.materialName.toLowerCase()}, ${formatShortDay(loaderData.calibration.testedOn)} · Commonweigh`
      : "Calibration · Commonweigh",
  },
];

/** What was done, by whom, and what it counts for now. */
function basisWords(calibration: CalibrationDetail) {
  const { testedOn, gateOpeningIn, gateScaleMark, readings, testerName, truck, verifications, liquids } = calibration;
  const { counts, catches, timedCatches } = readings;
  const by = testerName === null ? "" : ` by ${testerName}`;
  const mark = gateScaleMark === null ? "" : `, scale mark ${gateScaleMark}`;
  const what = [
    ...(counts.length > 0 ? [countWords(counts.length, "setting counted", "settings counted")] : []),
    ...(catches.length > 0 ? [countWords(catches.length, "catch", "catches")] : []),
    ...(timedCatches.length > 0 ? [countWords(timedCatches.length, "timed catch", "timed catches")] : []),
    ...(verifications.length > 0 ? [countWords(verifications.length, "simulated speed", "simulated speeds")] : []),
    ...(liquids.length > 0 ? [countWords(liquids.length, "catch of liquid", "catches of liquid")] : []),
  ];
  const lanes = truck.lanesPerPass === 1 ? "one lane in a pass" : `${truck.lanesPerPass} lanes in a pass`;
  if (gateOpeningIn === null) return `Caught ${formatShortDay(testedOn)}${by}, no gate: ${what.join(", ")}.`;
  const gate = `a gate of ${gateInWords(gateOpeningIn)}${mark}`;
  return `Weighed ${formatShortDay(testedOn)}${by} at ${gate}: ${what.join(", ")}; ${lanes}.`;
}

function stateWords({ state, id, inForceId, approvedOn, approverName, history }: CalibrationDetail) {
  if (state === "ready") return "It waits for the director’s approval and counts for nothing until then.";
  const by = approverName === null ? "" : ` by ${approverName}`;
  const approved = `Approved${by}${approvedOn === null ? "" : `, ${formatShortDay(approvedOn)}`}`;
  if (id === inForceId) return `${approved}: it is in force for this truck and material.`;
  const newer = history.find((line) => line.id === inForceId);
  return `${approved}. It is history: the one in force was weighed ${newer ? formatShortDay(newer.testedOn) : "later"}.`;
}

/** Without a dry rate: what the liquid gives, when it was caught by itself. */
function answerWithoutRates({ gateOpeningIn, liquids, materialName }: CalibrationDetail) {
  if (gateOpeningIn !== null || liquids.length === 0) return "No setting was measured.";
  return `Liquid alone, ${materialName.toLowerCase()}: ${liquids.map(liquidRateAt).join("; ")}.`;
}

export default function Calibration({ loaderData, actionData }: Route.ComponentProps) {
  const { calibration, view, rates, fan, drift } = loaderData;
  const { id, truck, band, materialName, history, changed } = calibration;
  const own = history.find((line) => line.id === id);
  const path = `/fleet/calibrations/${id}`;
  return (
    <Page>
      <p className="mb-2 text-note text-gravel">
        <TextLink to={`/fleet/${truck.id}`}>Truck {truck.unitNumber}</TextLink>, {materialName.toLowerCase()},{" "}
        {formatShortDay(calibration.testedOn)}
      </p>
      <Answer>
        {rates ? (
          <>
            <BandSentenceWords sentence={bandSentence(rates.summary, view.units)} />
            <OwnSetting truck={truck} summary={rates.summary} units={view.units} />
          </>
        ) : (
          answerWithoutRates(calibration)
        )}
      </Answer>
      <Method>
        {basisWords(calibration)} {stateWords(calibration)}
      </Method>
      <FleetPages />
      {actionData && (
        <Notice tone="problem" title={actionData.refusal}>
          Nothing was changed by this click.
        </Notice>
      )}
      <NextStep {...loaderData} />
      {calibration.note !== "" && (
        <p className="mt-4 max-w-measure">
          <b>Note:</b> {calibration.note}
        </p>
      )}
      {rates && (
        <>
          <Heading>Rates, {rateUnitWords(view)}</Heading>
          <ViewSwitch path={path} view={view} />
          <RateTable
            rows={rates.rows}
            view={view}
            workingSetting={truck.workingSetting}
            workingSpeedMph={truck.workingSpeedMph}
            caption={`Rates in ${rateUnitWords(view)}, by feed setting and speed`}
          />
          <p className="mt-2 text-note text-gravel">
            <PlaceKey band={view.units === "us" && view.basis === "lane" ? band : null} /> &ensp; tinted: the working
            setting and speed. ± is about 95 %. Rates are yardsticks: policy, road, weather and the person responsible
            decide how much is applied.
          </p>
          {fan && (
            <>
              <Heading>Rate against speed</Heading>
              <RateFan spec={fan.spec} svg={fan.svg} title={`Rate against speed, truck ${truck.unitNumber}`} />
            </>
          )}
          {calibration.gateOpeningIn !== null && (
            <Decision
              decision={calibration.decision}
              gateOpeningIn={calibration.gateOpeningIn}
              working={own?.working ?? null}
              truck={truck}
              eventCount={calibration.eventCount}
              inBandSettings={rates.summary?.inBandSettings ?? []}
              units={view.units}
            />
          )}
        </>
      )}
      {changed && own && (
        <section>
          <Heading>What the new gate changed</Heading>
          <BeforeAfter
            caption="The earlier opening and this one"
            before={{
              name: `before, ${gateInWords(changed.before.gateOpeningIn)}`,
              working: changed.before.working,
            }}
            after={{ name: `now, ${gateInWords(calibration.gateOpeningIn)}`, working: own.working }}
            savings={changed.savings}
            units={view.units}
          />
          <SavingsWords savings={changed.savings} eventCount={calibration.eventCount} units={view.units} />
        </section>
      )}
      <VerificationSection
        readings={calibration.verifications}
        lanesPerPass={truck.lanesPerPass}
        tolerancePercent={calibration.tolerancePercent}
      />
      <LiquidSection readings={calibration.liquids} />
      <CalibrationHistory
        lines={history}
        ownId={id}
        inForceId={calibration.inForceId}
        chart={drift}
        workingWords={workingPointWords(truck)}
        units={view.units}
      />
      <RawReadings {...calibration.readings} />
    </Page>
  );
}

/** Where the setting that the truck works at lies, when others are in the band and it is not. */
function OwnSetting({
  truck,
  summary,
  units,
}: {
  truck: CalibrationDetail["truck"];
  summary: BandSummary | null;
  units: UnitChoice;
}) {
  const own = summary?.settings.find(({ setting }) => setting === truck.workingSetting);
  if (!summary || !own || own.place === "in" || summary.inBandSettings.length === 0) return null;
  const off = shownRate(Math.abs(distanceFromBand(own.lbPerLaneMile, summary.band)), units);
  const words = `${formatWhole(Math.max(1, off))} ${own.place === "over" ? "above it" : "under it"}`;
  return (
    <>
      {" "}
      The working setting, {own.setting}, lays {formatWhole(shownRate(own.lbPerLaneMile, units))}:{" "}
      {own.place === "over" ? <Over>{words}</Over> : <Under>{words}</Under>}.
    </>
  );
}

/** The one thing to do next: approve it, weigh at the new gate, or print the card. */
function NextStep({ calibration, isDirector }: Pick<Route.ComponentProps["loaderData"], "calibration" | "isDirector">) {
  const { id, truck, materialId, gateOpeningIn, decision, state } = calibration;
  const isSending = useNavigation().formMethod === "POST";
  const newGate = `/fleet/worksheets/new?${new URLSearchParams({ truck: String(truck.id), material: String(materialId), countsFrom: String(id) }).toString()}`;
  const card = `/fleet/calibrations/${id}/card`;
  const mayApprove = state === "ready" && isDirector;
  const isMove = decision.kind === "move";
  return (
    <div className="flex flex-wrap items-center gap-x-6 gap-y-2 print:hidden">
      {mayApprove && (
        <Form method="post">
          <Button busy={isSending && "Approving"}>Approve it</Button>
        </Form>
      )}
      {isMove &&
        (mayApprove ? (
          <TextLink to={newGate} weight="bold">
            Weigh one revolution at the new gate
          </TextLink>
        ) : (
          <ButtonLink to={newGate}>Weigh one revolution at the new gate</ButtonLink>
        ))}
      {gateOpeningIn === null ? (
        <p>Liquid alone has no cab card: its rate is on this page.</p>
      ) : !mayApprove && !isMove && state === "approved" ? (
        <ButtonLink to={card}>Open the cab card</ButtonLink>
      ) : (
        <TextLink to={card}>Cab card</TextLink>
      )}
      {isMove && <TextLink to="#gate">Why that gate</TextLink>}
    </div>
  );
}
