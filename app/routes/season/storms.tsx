import { useRevalidator } from "react-router";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { useHydrated } from "#app/components/layout/use-hydrated.ts";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { StormGrid } from "#app/components/season/storm-grid.tsx";
import { StormList } from "#app/components/season/storm-list.tsx";
import { gridColumns, stormCells } from "#app/components/season/storm-texts.ts";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { formatOneDecimal, formatTons, formatWhole } from "#app/lib/format.ts";
import { seasonParam } from "#app/lib/params.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { readSeasonBasis } from "#app/services/season-basis.server.ts";
import { getSeasonYears } from "#app/services/season-figures.server.ts";
import { getStormKnowledge, listStorms, stormsPerPage } from "#app/services/storms.server.ts";
import type { Route } from "./+types/storms";

export async function loader({ context, params, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const asked = Number(url.searchParams.get("page") ?? "1");
  const [log, known, basis, seasonStartYears] = await Promise.all([
    listStorms(actor, seasonStartYear, Number.isSafeInteger(asked) ? asked : 1),
    getStormKnowledge(actor, seasonStartYear),
    readSeasonBasis(actor.townId, seasonStartYear),
    getSeasonYears(),
  ]);
  const { eventCount, laneMilesTreated } = basis.draft;
  return {
    seasonStartYear,
    seasonStartYears,
    userId: actor.userId,
    known,
    log,
    stored: log.storms.map((storm) => ({ id: storm.id, version: storm.version, cells: stormCells(storm, known) })),
    offset: (log.page - 1) * stormsPerPage,
    totals: {
      eventCount,
      laneMilesTreated,
      used: basis.materials.map(({ id, name, kind, loggedAllLb, loggedGal }) => ({
        id,
        words:
          kind === "brine"
            ? `${formatWhole(loggedGal)} gallons of ${name.toLowerCase()}`
            : `${formatTons(loggedAllLb)} tons of ${name.toLowerCase()}`,
        isUsed: loggedAllLb > 0 || loggedGal > 0,
      })),
    },
  };
}

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Storms of ${seasonLabel(Number(params.seasonStartYear))} · Commonweigh` },
];

function sentence({ seasonStartYear, totals }: Route.ComponentProps["loaderData"]) {
  const label = seasonLabel(seasonStartYear);
  if (totals.eventCount === 0) return `No storm of ${label} is in the log yet.`;
  const [first] = totals.used.filter(({ isUsed }) => isUsed);
  return `${sentenceStart(countWords(totals.eventCount, "storm", "storms"))} in ${label}${first ? ` took ${first.words}` : ""}.`;
}

export default function Storms({ loaderData }: Route.ComponentProps) {
  const { seasonStartYear, seasonStartYears, userId, known, log, stored, offset, totals } = loaderData;
  const revalidator = useRevalidator();
  const isAlive = useHydrated();
  const storms = `/season/${seasonStartYear}/storms`;
  const columns = gridColumns(known);
  const isOpen = log.refusal === null;
  const pageTo = (page: number) => `${storms}?page=${page}`;
  const others = totals.used.filter(({ isUsed }) => isUsed).slice(1);
  return (
    <Page className={isOpen ? "sm:pb-0" : ""}>
      <Answer>{sentence(loaderData)}</Answer>
      <Method>
        {others.length > 0 && `Besides: ${others.map(({ words }) => words).join(", ")}. `}
        {totals.laneMilesTreated !== null && `${formatOneDecimal(totals.laneMilesTreated)} lane miles were treated. `}
        Lines whose times overlap count as one storm.
      </Method>
      <SeasonPages seasonStartYear={seasonStartYear} />
      {log.refusal !== null && <Notice title={log.refusal} />}
      {isOpen && (
        <p className="mb-4 flex flex-wrap gap-x-6 gap-y-1">
          <TextLink to={`${storms}/new`} weight="bold" className="inline-flex min-h-target items-center">
            Write down one storm
          </TextLink>
          <TextLink to="/uploads?kind=storms" weight="bold" className="inline-flex min-h-target items-center">
            Upload a storm log
          </TextLink>
        </p>
      )}
      {log.lineCount === 0 && !isOpen && (
        <EmptyState title="Storms stand here">Nothing was logged in this season.</EmptyState>
      )}
      {log.lineCount === 0 && isOpen && (
        <div className={isAlive ? "md:hidden" : ""}>
          <EmptyState
            title="Storms stand here"
            action={<ButtonLink to={`${storms}/new`}>Write down the first</ButtonLink>}
          >
            One line for a storm, or one for each truck in it. On a wide screen they can be typed or pasted as a sheet.
          </EmptyState>
        </div>
      )}
      {isOpen && isAlive && (
        <div className="hidden md:block">
          <StormGrid
            key={`${seasonStartYear} ${log.page}`}
            columns={columns}
            stored={stored}
            keepKey={`storm-lines:${userId}:${seasonStartYear}:${log.page}`}
            saveTo={`${storms}/save`}
            lineTo={(stormId) => `${storms}/${stormId}`}
            onSaved={() => void revalidator.revalidate()}
            offset={offset}
          />
        </div>
      )}
      {log.lineCount > 0 && (
        <div className={isOpen && isAlive ? "md:hidden" : ""}>
          <StormList storms={log.storms} known={known} lineTo={isOpen ? (id) => `${storms}/${id}` : null} />
        </div>
      )}
      {log.pageCount > 1 && (
        <nav aria-label="Pages of the log" className="my-4 flex flex-wrap items-center gap-x-5">
          {log.page > 1 && <TextLink to={pageTo(log.page - 1)}>Earlier storms</TextLink>}
          <span className="text-gravel">
            Page {log.page} of {log.pageCount}, {formatWhole(log.lineCount)} lines
          </span>
          {log.page < log.pageCount && <TextLink to={pageTo(log.page + 1)}>Later storms</TextLink>}
        </nav>
      )}
      <SeasonSwitch
        seasonStartYears={seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/season/${year}/storms`}
      />
    </Page>
  );
}
