import { buildUpPlot } from "#app/components/charts/build-up-plot.ts";
import { chartSvgs } from "#app/components/charts/chart-svg.server.ts";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { buildUpSpec, winterSentence } from "#app/components/season/build-up-words.ts";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { WinterReport } from "#app/components/season/winter-report.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { seasonParam } from "#app/lib/params.ts";
import { getSeasonYears } from "#app/services/season-figures.server.ts";
import { getTownWinter } from "#app/services/weather.server.ts";
import type { Route } from "./+types/weather";

export async function loader({ context, params }: Route.LoaderArgs) {
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const [view, seasonStartYears] = await Promise.all([
    getTownWinter(townActor(context), seasonStartYear),
    getSeasonYears(),
  ]);
  if (view.state !== "known") return { seasonStartYear, seasonStartYears, view, report: null, sentence: null };
  const spec = buildUpSpec(view.winter);
  const { buildUp: _buildUp, usual: _usual, ...winter } = view.winter;
  return {
    seasonStartYear,
    seasonStartYears,
    view: null,
    report: { ...winter, spec, svg: chartSvgs(buildUpPlot, spec) },
    sentence: winterSentence(view.winter),
  };
}

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Winter of ${seasonLabel(Number(params.seasonStartYear))} · Commonweigh` },
];

export default function Winter({ loaderData }: Route.ComponentProps) {
  const { seasonStartYear, seasonStartYears, view, report, sentence } = loaderData;
  const label = seasonLabel(seasonStartYear);
  return (
    <Page>
      <Answer>{sentence ?? `How hard the winter of ${label} was is not known here.`}</Answer>
      {report !== null && (
        <Method>
          By daily weather at {report.station.name}, station {report.station.code} of the public daily archive.
        </Method>
      )}
      <SeasonPages seasonStartYear={seasonStartYear} />
      {view !== null && (
        <EmptyState title="The winter stands here, day by day">
          {view.state === "no-station" ? (
            "Your town is not attached to a weather station yet. The coordinator does that."
          ) : (
            <>
              Nothing was reported from {view.station.name} for {label}.{" "}
              <TextLink to="/uploads?kind=weather">Upload the station’s file</TextLink>, or ask the coordinator to fetch
              it.
            </>
          )}
        </EmptyState>
      )}
      {report !== null && <WinterReport {...report} />}
      <SeasonSwitch
        seasonStartYears={seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/season/${year}/winter`}
      />
    </Page>
  );
}
