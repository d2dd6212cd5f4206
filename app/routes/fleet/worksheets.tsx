import { useEffect, useSyncExternalStore } from "react";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { formatInstant } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { OnThisPhone } from "#app/offline/on-this-phone.client.tsx";
import { keepProgram } from "#app/offline/worker.client.ts";
import { listWorksheets, type WorksheetLine } from "#app/services/worksheets/list.server.ts";
import type { Route } from "./+types/worksheets";

export async function loader({ context }: Route.LoaderArgs) {
  return { lines: await listWorksheets(townActor(context)) };
}

export const meta: Route.MetaFunction = () => [{ title: "Worksheets · Commonweigh" }];

const nothing = () => () => undefined;

function stateWords(line: WorksheetLine) {
  if (line.unsettledCount > 0) return <b>{countWords(line.unsettledCount, "version", "versions")} to settle</b>;
  return line.state === "finished" ? "finished" : "open";
}

function ArrivedTable({ caption, lines }: { caption: string; lines: readonly WorksheetLine[] }) {
  return (
    <Timetable
      caption={caption}
      isCaptionHidden
      columns={[
        { key: "truck", label: "truck and material" },
        { key: "state", label: "state" },
        { key: "by", label: "last by" },
        { key: "at", label: "arrived", isNumeric: true },
      ]}
      rows={lines.map((line) => ({
        key: line.clientRef,
        cells: {
          truck: (
            <TextLink
              isDocument
              to={
                line.calibrationId === null
                  ? `/fleet/worksheets/${line.clientRef}`
                  : `/fleet/calibrations/${line.calibrationId}`
              }
            >
              Truck {line.unitNumber}, {line.materialName.toLowerCase()}
            </TextLink>
          ),
          state: stateWords(line),
          by: `${line.byName}${line.device === "" ? "" : `, ${line.device}`}`,
          at: formatInstant(line.updatedAt),
        },
      }))}
    />
  );
}

export default function Worksheets({ loaderData: { lines } }: Route.ComponentProps) {
  const isInBrowser = useSyncExternalStore(
    nothing,
    () => true,
    () => false,
  );
  useEffect(() => keepProgram(), []);
  const open = lines.filter(({ state }) => state === "open");
  const finished = lines.filter(({ state }) => state === "finished");
  return (
    <Page>
      <Answer>
        {open.length === 0
          ? "No worksheet is open."
          : `${sentenceStart(countWords(open.length, "worksheet is", "worksheets are"))} open.`}
      </Answer>
      <Method>
        A worksheet works without signal once this page has been open on the phone. Nothing typed is lost: it waits on
        the phone until it has arrived here.
      </Method>
      <p className="mt-4">
        <ButtonLink to="/fleet/worksheets/new" isDocument>
          Start a worksheet
        </ButtonLink>
      </p>
      <Heading>On this phone</Heading>
      {isInBrowser ? <OnThisPhone /> : <p className="text-gravel">Looking on the phone …</p>}
      <Heading>Arrived, and open</Heading>
      {open.length === 0 ? (
        <EmptyState title="Worksheets in work belong here">
          Whoever starts one in the yard, on whichever phone: it can be gone on with here as soon as it has arrived.
        </EmptyState>
      ) : (
        <ArrivedTable caption="Worksheets that have arrived and are open" lines={open} />
      )}
      {finished.length > 0 && (
        <>
          <Heading>Finished</Heading>
          <ArrivedTable caption="Worksheets that have become calibrations" lines={finished} />
        </>
      )}
      <p className="mt-6">
        <TextLink to="/fleet">All trucks</TextLink>
      </p>
    </Page>
  );
}
