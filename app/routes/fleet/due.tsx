import { DueKey, DueMark } from "#app/components/fleet/due-mark.tsx";
import { dueReasonWords, mostUrgent } from "#app/components/fleet/due-words.ts";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { WorkingRateWords } from "#app/components/fleet/rate-words.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Over } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { countWords, listWords, sentenceStart } from "#app/lib/words.ts";
import { listFleet, type MaterialLine, type TruckLine } from "#app/services/fleet/read.server.ts";
import type { Route } from "./+types/due";

export async function loader({ context }: Route.LoaderArgs) {
  const trucks = await listFleet(townActor(context));
  return { trucks: trucks.filter((truck) => truck.isInService) };
}

export const meta: Route.MetaFunction = () => [{ title: "What is due · Commonweigh" }];

function Sentence({ trucks }: { trucks: readonly TruckLine[] }) {
  const inState = (state: string) =>
    trucks.filter(({ materials }) => mostUrgent(materials.map(({ due }) => due))?.state === state);
  const [overdue, due] = [inState("overdue"), inState("due")];
  if (overdue.length === 0 && due.length === 0) return "Every truck that was ever weighed is in date.";
  const names = (some: readonly TruckLine[]) => listWords(some.map(({ unitNumber }) => unitNumber));
  return (
    <>
      {overdue.length > 0 && (
        <>
          <Over>{sentenceStart(countWords(overdue.length, "truck is", "trucks are"))} overdue</Over>: {names(overdue)}
          .{" "}
        </>
      )}
      {due.length > 0 && `${sentenceStart(countWords(due.length, "truck is", "trucks are"))} due: ${names(due)}.`}
    </>
  );
}

export default function DuePage({ loaderData: { trucks } }: Route.ComponentProps) {
  const materials = new Map<number, string>();
  for (const truck of trucks) for (const line of truck.materials) materials.set(line.materialId, line.materialName);
  const columns = [...materials].sort(([a], [b]) => a - b);
  return (
    <Page>
      <Answer>
        <Sentence trucks={trucks} />
      </Answer>
      <Method>
        Each truck is weighed with each material once before the season, again after work on gate, hydraulics, feed or
        controller, and with a new material or supplier. Overdue: still due when the season opened on 1 November.
      </Method>
      <FleetPages />
      {columns.length === 0 ? (
        <EmptyState
          title="Trucks and what they carry belong here"
          action={<ButtonLink to="/fleet">Open the fleet</ButtonLink>}
        >
          Say of each truck which materials it carries.
        </EmptyState>
      ) : (
        <>
          <Timetable
            caption="Trucks by material: what is in force, due, overdue or never done"
            isCaptionHidden
            hasStickyHead
            columns={[
              { key: "truck", label: "truck", foldPrefix: "Truck" },
              ...columns.map(([id, name]) => ({ key: String(id), label: name.toLowerCase() })),
              { key: "work", label: "after work on it" },
            ]}
            rows={trucks.map((truck) => ({
              key: String(truck.id),
              cells: {
                truck: <TextLink to={`/fleet/${truck.id}`}>{truck.unitNumber}</TextLink>,
                ...Object.fromEntries(
                  columns.map(([id]) => [String(id), <Cell key={id} truck={truck} materialId={id} />]),
                ),
                work: (
                  <TextLink to={`/fleet/${truck.id}/work`}>
                    Enter it<span className="sr-only"> for truck {truck.unitNumber}</span>
                  </TextLink>
                ),
              },
            }))}
          />
          <DueKey />
        </>
      )}
    </Page>
  );
}

function Cell({ truck, materialId }: { truck: TruckLine; materialId: number }) {
  const line = truck.materials.find((each) => each.materialId === materialId);
  if (line) return <Carried truck={truck} line={line} />;
  return (
    <span className="text-gravel">
      <span aria-hidden="true">·</span>
      <span className="sr-only">does not carry it</span>
    </span>
  );
}

function Carried({ truck, line }: { truck: TruckLine; line: MaterialLine }) {
  const { due, inForce } = line;
  const [ready] = line.ready;
  return (
    <span className="inline-grid max-sm:justify-items-end">
      <span className="flex flex-wrap items-baseline gap-x-4 max-sm:justify-end">
        <DueMark due={due} isReasonShown={false} />
        {ready ? (
          <TextLink to={`/fleet/calibrations/${ready.id}`}>weighed, waits for approval</TextLink>
        ) : (
          due.state !== "in-date" && (
            <TextLink to={`/fleet/worksheets/new?truck=${truck.id}&material=${line.materialId}`}>
              Weigh it
              <span className="sr-only">
                : truck {truck.unitNumber} with {line.materialName}
              </span>
            </TextLink>
          )
        )}
      </span>
      {inForce && (
        <span className="text-note text-gravel">
          <WorkingRateWords working={inForce.working} /> lb,{" "}
          <TextLink to={`/fleet/calibrations/${inForce.id}`}>{formatShortDay(inForce.testedOn)}</TextLink>
          {due.reason === "work-done" || due.reason === "new-material" ? `, ${dueReasonWords(due)}` : ""}
        </span>
      )}
    </span>
  );
}
