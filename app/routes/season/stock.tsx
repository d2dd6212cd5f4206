import { randomUUID } from "node:crypto";
import { data, redirect } from "react-router";
import { chartSvgs } from "#app/components/charts/chart-svg.server.ts";
import { stockLadderPlot } from "#app/components/charts/stock-ladder-plot.ts";
import { stockLadder } from "#app/components/charts/stock-ladder-spec.ts";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { readStockForm } from "#app/components/season/stock-form.ts";
import { StockForm } from "#app/components/season/stock-form-fields.tsx";
import { StockEntries, StockPile } from "#app/components/season/stock-pile.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { flaggedUnexplainedShare } from "#app/domain/season/stock-balance.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { formatShareOneDecimal, formatTons } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { listWords } from "#app/lib/words.ts";
import { getSeasonYears } from "#app/services/season-figures.server.ts";
import { addStockEntry, getStock, removeStockEntry } from "#app/services/stock.server.ts";
import type { Route } from "./+types/stock";

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const [{ materials, entries, refusal }, seasonStartYears] = await Promise.all([
    getStock(actor, seasonStartYear),
    getSeasonYears(),
  ]);
  return {
    seasonStartYear,
    seasonStartYears,
    userId: actor.userId,
    clientRef: randomUUID(),
    entries,
    refusal,
    piles: materials.map(({ id, name, kind, balance }) => {
      const spec = stockLadder(name, balance);
      return { id, name, kind, balance, ladder: spec && { spec, svg: chartSvgs(stockLadderPlot, spec) } };
    }),
  };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const values = formTexts(await readForm(request));
  if (values.intent === "remove") {
    const refusal = await removeStockEntry(actor, seasonStartYear, idParam(values.entryId, "stock entry"));
    if (refusal !== null) return data({ errors: {}, refusal, values }, { status: 409 });
    return redirect(`/season/${seasonStartYear}/stock`);
  }
  const reading = readStockForm(values, seasonStartYear);
  if (!reading.ok) return data({ errors: reading.errors, refusal: null, values }, { status: 400 });
  const refusal = await addStockEntry(actor, seasonStartYear, reading.entry);
  if (refusal !== null) return data({ errors: {}, refusal, values }, { status: 409 });
  return redirect(`/season/${seasonStartYear}/stock`);
}

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Stock of ${seasonLabel(Number(params.seasonStartYear))} · Commonweigh` },
];

function sentence({ piles, seasonStartYear }: Route.ComponentProps["loaderData"]) {
  const label = seasonLabel(seasonStartYear);
  const measured = piles.filter(({ balance }) => balance.usedLb !== null);
  const [first] = measured;
  if (!first) {
    const known = piles.filter(({ balance }) => balance.openingLb !== null);
    return known.length === 0
      ? `Nothing is written down yet of the piles of ${label}.`
      : `The piles of ${label} are opened; measure them at the end, and what was used follows.`;
  }
  const { name, balance } = first;
  const used = `In ${label}, ${formatTons(balance.usedLb)} tons of ${name.toLowerCase()} left the pile`;
  if (balance.loggedLb === null) return `${used}; no storm is logged yet to explain them.`;
  if (balance.unexplainedShare === null) return `${used}.`;
  const logged = `the storm log explains all but ${formatShareOneDecimal(Math.abs(balance.unexplainedShare))}`;
  return balance.unexplainedShare >= 0
    ? `${used}; ${logged}.`
    : `${used}; the storm log has ${formatShareOneDecimal(-balance.unexplainedShare)} more.`;
}

export default function Stock({ loaderData, actionData }: Route.ComponentProps) {
  const { seasonStartYear, seasonStartYears, userId, clientRef, entries, refusal, piles } = loaderData;
  const errors: Record<string, string> = actionData?.errors ?? {};
  const flagged = piles.filter(({ balance }) => Math.abs(balance.unexplainedShare ?? 0) > flaggedUnexplainedShare);
  const shown = piles.filter(({ ladder }) => ladder !== null);
  return (
    <Page>
      <Answer>{sentence(loaderData)}</Answer>
      <Method>
        Used is opening and received less closing, transfers counted. We ask for a look from{" "}
        {100 * flaggedUnexplainedShare} % unexplained on: our own choice, as measuring a pile is itself uncertain.
        {flagged.length > 0 && ` That concerns ${listWords(flagged.map(({ name }) => name.toLowerCase()))}.`}
      </Method>
      <SeasonPages seasonStartYear={seasonStartYear} />
      {refusal !== null && <Notice title={refusal} />}
      {actionData?.refusal != null && <Notice tone="problem" title={actionData.refusal} />}
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      {shown.length === 0 && (
        <EmptyState title="Piles stand here">
          Measure each pile before the first storm and after the last, and write deliveries down as they come.
        </EmptyState>
      )}
      {shown.map((pile) => (
        <StockPile key={pile.id} pile={pile} />
      ))}
      {refusal === null && (
        <section>
          <Heading>Write something down</Heading>
          <StockForm
            piles={piles}
            userId={userId}
            clientRef={clientRef}
            errors={errors}
            values={actionData?.values ?? {}}
          />
        </section>
      )}
      {entries.length > 0 && (
        <section>
          <Heading>All that was written down</Heading>
          <StockEntries entries={entries} piles={piles} canRemove={refusal === null} />
        </section>
      )}
      <SeasonSwitch
        seasonStartYears={seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/season/${year}/stock`}
      />
    </Page>
  );
}
