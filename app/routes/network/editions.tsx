import { useEffect } from "react";
import { data, Form, redirect, useRevalidator } from "react-router";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Facts } from "#app/components/ui/facts.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { reasonWords } from "#app/domain/peers/cell.ts";
import { indicators } from "#app/domain/peers/indicators.ts";
import { readForm } from "#app/lib/form.ts";
import { formatInstant } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { listEditions } from "#app/services/editions.server.ts";
import { listJobs } from "#app/services/jobs.server.ts";
import { previewEdition, requestEdition } from "#app/services/publish-edition.server.ts";
import { getReviewQueue } from "#app/services/review.server.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/editions";

export const handle = { notForSharing: true };

export async function loader({ context }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const startYear = await workingSeason();
  const [editions, jobs] = await Promise.all([listEditions(), listJobs("publish-edition")]);
  const isComputing = jobs.some(({ state }) => state === "ready" || state === "running");
  // While one is computed the page asks again each second, and shows no preview.
  const preview = startYear === null || isComputing ? null : await previewEdition(actor, startYear);
  const queue = startYear === null ? null : await getReviewQueue(actor, startYear);
  const [latestJob] = jobs;
  return {
    editions,
    preview,
    waiting: queue ? queue.doubtful.length + queue.clean.length : 0,
    missing: queue?.missingTowns.length ?? 0,
    isComputing,
    failure: latestJob?.state === "failed" ? latestJob.lastError : null,
  };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const [season, number] = ["season", "number"].map((name) => form.get(name));
  const outcome = await requestEdition(
    networkActor(context),
    seasonParam(typeof season === "string" ? season : ""),
    idParam(typeof number === "string" ? number : "", "edition"),
  );
  if (outcome.ok) return redirect("/network/editions");
  return data(
    { refusal: "Another edition was published since you opened this page. Look at what it holds first." },
    { status: 409 },
  );
}

export const meta: Route.MetaFunction = () => [{ title: "Editions · Commonweigh" }];

export default function Editions({ loaderData, actionData }: Route.ComponentProps) {
  const { editions, preview, waiting, missing, isComputing, failure } = loaderData;
  const { revalidate } = useRevalidator();
  useEffect(() => {
    if (!isComputing) return;
    const timer = setInterval(() => void revalidate(), 1000);
    return () => clearInterval(timer);
  }, [isComputing, revalidate]);
  const label = preview && `${seasonLabel(preview.seasonStartYear)}, edition ${preview.nextNumber}`;
  const out = editions.find(({ seasonStartYear }) => seasonStartYear === preview?.seasonStartYear) ?? null;
  return (
    <Page>
      <Answer>
        {isComputing
          ? "An edition is being computed."
          : out
            ? `${seasonLabel(out.seasonStartYear)}, edition ${out.number} is out, from ${out.townCount} contributors.`
            : preview && preview.townCount > 0
              ? `${label ?? ""} would show ${preview.shownCount} of ${preview.shownCount + preview.withheld.length} groups, from ${preview.townCount} contributors.`
              : "There is nothing to publish yet."}
      </Answer>
      <Method>
        An edition is computed once, frozen, and never changed.{" "}
        {sentenceStart(countWords(waiting, "season waits", "seasons wait"))} for review
        {waiting > 0 && " and would not be in the next one"};{" "}
        {missing === 0 ? "no town is missing" : `${countWords(missing, "town has", "towns have")} not sent`}.
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {actionData && <Notice tone="problem" title={actionData.refusal} />}
      {failure !== null && !isComputing && (
        <Notice tone="problem" title="The last edition could not be computed.">
          Nothing of it was published. Publish it again; if that fails too, tell whoever runs this service what it says:
          “{failure}”
        </Notice>
      )}
      {isComputing && (
        <Notice title="Working on it">
          The page follows by itself; you may leave it. Directors are told by mail when it is out.
        </Notice>
      )}
      {preview && preview.townCount > 0 && !isComputing && (
        <section>
          <Heading>{out ? "The next edition" : "What it would hold"}</Heading>
          {out && (
            <p className="mb-3 max-w-method">
              It would take the place of edition {out.number}; publish it once figures were accepted or corrected since.
            </p>
          )}
          <Facts
            facts={[
              { name: "contributors", value: preview.townCount },
              { name: "groups shown", value: preview.shownCount },
              { name: "groups hidden", value: preview.withheld.length },
              {
                name: "row file",
                value:
                  preview.rows.state === "published"
                    ? `${preview.rows.count} protected rows`
                    : `withheld: ${preview.rows.reason.replace("-", " ")}`,
              },
            ]}
          />
          <Form method="post" className="mt-4">
            <input type="hidden" name="season" value={preview.seasonStartYear} />
            <input type="hidden" name="number" value={preview.nextNumber} />
            <Button variant={out ? "quiet" : "primary"}>Publish {label}</Button>
          </Form>
          {preview.withheld.length > 0 && (
            <>
              <Heading>Hidden to protect members</Heading>
              <Timetable
                caption="Groups that members would not be shown"
                isCaptionHidden
                columns={[
                  { key: "indicator", label: "indicator" },
                  { key: "group", label: "peer group" },
                  { key: "reason", label: "why" },
                ]}
                rows={preview.withheld.map(({ indicator, groupLabel, reason }) => ({
                  key: `${indicator} ${groupLabel}`,
                  cells: { indicator: indicators[indicator].name, group: groupLabel, reason: reasonWords(reason) },
                }))}
              />
            </>
          )}
        </section>
      )}
      <Heading>Published</Heading>
      {editions.length === 0 ? (
        <EmptyState title="Published editions stand here">The first one takes at least six accepted towns.</EmptyState>
      ) : (
        <Timetable
          caption="Editions, newest first"
          isCaptionHidden
          columns={[
            { key: "edition", label: "edition" },
            { key: "when", label: "published" },
            { key: "towns", label: "contributors", isNumeric: true },
            { key: "hash", label: "checksum, first letters", isWideOnly: true },
          ]}
          rows={editions.map((edition) => ({
            key: String(edition.id),
            cells: {
              edition: `${seasonLabel(edition.seasonStartYear)}, edition ${edition.number}`,
              when: formatInstant(edition.publishedAt),
              towns: edition.townCount,
              hash: <code className="text-note">{edition.contentSha256.slice(0, 12)}</code>,
            },
          }))}
        />
      )}
    </Page>
  );
}
