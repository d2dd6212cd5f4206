import { CabCard } from "#app/components/fleet/cab-card.tsx";
import { DueMark } from "#app/components/fleet/due-mark.tsx";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { PrintButton } from "#app/components/fleet/print-button.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { type LeftOut, listCards } from "#app/services/fleet/cards.server.ts";
import type { Route } from "./+types/cards";

export async function loader({ context }: Route.LoaderArgs) {
  return listCards(townActor(context));
}

export const meta: Route.MetaFunction = () => [{ title: "Cab cards · Commonweigh" }];

export default function Cards({ loaderData: { cards, leftOut } }: Route.ComponentProps) {
  return (
    <Page>
      <div className="print:hidden">
        <Answer>
          {cards.length === 0
            ? "No cab card is ready to print."
            : `${sentenceStart(countWords(cards.length, "cab card is", "cab cards are"))} ready to print, one a page.`}
        </Answer>
        <Method>
          What is in force and in date gets a card. What is due gets none, because a card that no longer holds is worse
          than none.
        </Method>
        <FleetPages />
        {cards.length > 0 && <PrintButton>{`Print ${countWords(cards.length, "card", "cards")}`}</PrintButton>}
        {leftOut.length > 0 && <Left leftOut={leftOut} />}
        {cards.length > 0 && <Heading>The cards</Heading>}
      </div>
      {cards.length === 0 && leftOut.length === 0 && (
        <EmptyState title="Cards of weighed trucks belong here">
          Weigh a truck and let the director approve it.
        </EmptyState>
      )}
      {cards.map((printed) => (
        <CabCard key={printed.calibrationId} printed={printed} />
      ))}
    </Page>
  );
}

function Left({ leftOut }: { leftOut: readonly LeftOut[] }) {
  return (
    <>
      <Heading>Without a card</Heading>
      <Timetable
        caption="Trucks and materials that get no card, and why"
        isCaptionHidden
        columns={[
          { key: "truck", label: "truck", foldPrefix: "Truck" },
          { key: "material", label: "material" },
          { key: "why", label: "calibration" },
        ]}
        rows={leftOut.map(({ truckId, unitNumber, materialName, line }) => ({
          key: `${truckId} ${line.materialId}`,
          cells: {
            truck: <TextLink to={`/fleet/${truckId}`}>{unitNumber}</TextLink>,
            material: materialName,
            why: line.due.state === "in-date" ? "no feed setting measured, so no card" : <DueMark due={line.due} />,
          },
        }))}
      />
    </>
  );
}
