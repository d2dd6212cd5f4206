import { Form, redirect } from "react-router";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { personActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { indicatorKeys, indicators } from "#app/domain/peers/indicators.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { acceptTerms, hasAcceptedTerms, listDatasetEditions } from "#app/services/dataset.server.ts";
import type { Route } from "./+types/dataset";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = personActor(context);
  const [editions, hasTerms] = await Promise.all([listDatasetEditions(), hasAcceptedTerms(actor)]);
  return { editions, hasTerms, isAnalyst: actor.kind === "analyst" };
}

export async function action({ context }: Route.ActionArgs) {
  await acceptTerms(personActor(context));
  return redirect("/dataset");
}

export const meta: Route.MetaFunction = () => [{ title: "Dataset · Commonweigh" }];

const terms = [
  "Use the figures for research, planning and teaching, and name the network, the season and the edition.",
  "Make no attempt to find out which town stands behind a figure, by itself or together with other sources.",
  "If you believe that a town can be told, tell the coordinator and nobody else.",
  "Figures are rounded, and some are left out, to protect towns; they are estimates, given without warranty.",
];

export default function Dataset({ loaderData: { editions, hasTerms, isAnalyst } }: Route.ComponentProps) {
  const [newest] = editions;
  return (
    <Page>
      <Answer>
        {newest
          ? `The newest edition is ${seasonLabel(newest.seasonStartYear)}, edition ${newest.number}, from ${newest.townBand} contributors.`
          : "No edition is published yet, so there is nothing to download."}
      </Answer>
      <Method>
        Protected figures by indicator and peer group, and single rows where no row can be told from four others. A
        hidden figure is empty and says why. <TextLink to="/protection">How towns are protected</TextLink>
      </Method>
      {!hasTerms && (
        <section>
          <Heading>Terms of use</Heading>
          <ol className="max-w-method list-decimal space-y-1.5 pl-6">
            {terms.map((term) => (
              <li key={term}>{term}</li>
            ))}
          </ol>
          <Form method="post" className="mt-4">
            <Button>Accept the terms</Button>
          </Form>
        </section>
      )}
      <Heading>Editions</Heading>
      {editions.length === 0 ? (
        <EmptyState title="Editions stand here once they are published">
          The coordinator publishes one for each season.
        </EmptyState>
      ) : (
        <Timetable
          caption={
            hasTerms
              ? "Newest first. An edition is never changed; a later one takes its place."
              : "Accept the terms to download."
          }
          columns={[
            { key: "edition", label: "edition" },
            { key: "day", label: "published" },
            { key: "files", label: "files", isProse: true },
            { key: "hash", label: "checksum, first letters", isWideOnly: true },
          ]}
          rows={editions.map((edition) => ({
            key: String(edition.id),
            cells: {
              edition: `${seasonLabel(edition.seasonStartYear)}, edition ${edition.number}`,
              day: formatShortDay(edition.publishedAt.slice(0, 10)),
              files: hasTerms ? <Files {...edition} /> : "after accepting the terms",
              hash: <code className="text-note">{edition.contentSha256.slice(0, 12)}</code>,
            },
          }))}
        />
      )}
      {isAnalyst && (
        <p className="mt-4">
          <TextLink to="/dataset/tokens" weight="bold">
            Fetch them by program, with a token
          </TextLink>
        </p>
      )}
      <Heading>Dictionary</Heading>
      <Timetable
        caption="Indicators"
        isCaptionHidden
        columns={[
          { key: "key", label: "indicator" },
          { key: "name", label: "name" },
          { key: "unit", label: "unit" },
          { key: "formula", label: "how it is worked out", isProse: true },
        ]}
        rows={indicatorKeys.map((key) => ({
          key,
          cells: {
            key: <code className="text-note whitespace-nowrap">{key}</code>,
            name: indicators[key].name,
            unit: indicators[key].unit,
            formula: indicators[key].formula,
          },
        }))}
      />
    </Page>
  );
}

const fileWords: Record<string, string> = {
  "cells.csv": "cells (CSV)",
  "rows.csv": "rows (CSV)",
  "datapackage.json": "description (JSON)",
};

function Files({ id, files }: { id: number; files: readonly string[] }) {
  return files.map((file, position) => (
    <span key={file}>
      {position > 0 && ", "}
      <TextLink to={`/dataset/editions/${id}/${file}`} isDocument>
        {fileWords[file] ?? file}
      </TextLink>
    </span>
  ));
}
