import { CabCard } from "#app/components/fleet/cab-card.tsx";
import { PrintButton } from "#app/components/fleet/print-button.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { idParam } from "#app/lib/params.ts";
import { getCard } from "#app/services/fleet/cards.server.ts";
import type { Route } from "./+types/card";

export async function loader({ context, params }: Route.LoaderArgs) {
  return { printed: await getCard(townActor(context), idParam(params.calibrationId, "calibration")) };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  {
    title: loaderData?.printed
      ? `Cab card: truck ${loaderData.printed.card.unitNumber}, ${loaderData.printed.card.materialName.toLowerCase()} · Commonweigh`
      : "Cab card · Commonweigh",
  },
];

const answers = {
  "in-force": (unit: string) => `The cab card of truck ${unit} is ready to print.`,
  ready: (unit: string) => `This card of truck ${unit} is not approved yet, and says so.`,
  history: (unit: string) => `This card of truck ${unit} has been replaced, and says so.`,
};

export default function CardPage({ loaderData: { printed }, params }: Route.ComponentProps) {
  const rates = `/fleet/calibrations/${params.calibrationId}`;
  if (!printed) {
    return (
      <Page>
        <Answer>There is no cab card of this calibration.</Answer>
        <EmptyState title="A card needs rates" action={<TextLink to={rates}>Back to the calibration</TextLink>}>
          No feed setting was measured in it: liquids and ground-speed checks alone make no card.
        </EmptyState>
      </Page>
    );
  }
  return (
    <Page>
      <div className="mb-6 print:hidden">
        <Answer>{answers[printed.standing](printed.card.unitNumber)}</Answer>
        <Method>
          One page, on Letter or A4, in black and white. Print it from your browser, or save it as a PDF there.
        </Method>
        <div className="mt-5 flex flex-wrap items-center gap-x-6 gap-y-2">
          <PrintButton>Print the card</PrintButton>
          <TextLink to={rates}>Its rates</TextLink>
          <TextLink to="/fleet/cards">All cards of the fleet</TextLink>
        </div>
      </div>
      <CabCard printed={printed} />
    </Page>
  );
}
