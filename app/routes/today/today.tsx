import { personActor } from "#app/context.ts";
import { getAnalystToday, getNetworkToday, getTownToday } from "#app/services/today.server.ts";
import { AnalystAgenda } from "#app/components/today/analyst-agenda.tsx";
import { NetworkAgenda } from "#app/components/today/network-agenda.tsx";
import { TownAgenda } from "#app/components/today/town-agenda.tsx";
import type { Route } from "./+types/today";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = personActor(context);
  switch (actor.kind) {
    case "town":
      return { kind: actor.kind, isDirector: actor.role === "director", ...(await getTownToday(actor)) };
    case "network":
      return { kind: actor.kind, ...(await getNetworkToday(actor)) };
    case "analyst":
      return { kind: actor.kind, ...(await getAnalystToday(actor)) };
  }
}

export const meta: Route.MetaFunction = () => [{ title: "Today · Commonweigh" }];

export default function Today({ loaderData }: Route.ComponentProps) {
  switch (loaderData.kind) {
    case "town":
      return <TownAgenda {...loaderData} />;
    case "network":
      return <NetworkAgenda {...loaderData} />;
    case "analyst":
      return <AnalystAgenda {...loaderData} />;
  }
}
