import type { BuildUpSpec } from "#app/components/charts/build-up-spec.ts";
import type { DrawChart } from "#app/components/charts/chart-finish.ts";
import { LiveChart } from "#app/components/charts/live-chart.tsx";
import { Heading } from "#app/components/layout/answer.tsx";
import { Facts } from "#app/components/ui/facts.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { SideBySide } from "#app/components/ui/side-by-side.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { seasonLabel } from "#app/domain/dates.ts";
import {
  type CutPoints,
  type SeverityCategory,
  severityCategories,
  severityCategoryNames,
} from "#app/domain/severity/severity-category.ts";
import { scoredElements, type WinterSeverity } from "#app/domain/severity/winter-severity.ts";
import type { WinterCounts } from "#app/domain/severity/winter-counts.ts";
import { formatShortDay, formatWhole } from "#app/lib/format.ts";
import { countWords, listWords } from "#app/lib/words.ts";
import { elementWords } from "./build-up-words.ts";

const load = (): Promise<DrawChart<BuildUpSpec>> =>
  import("#app/components/charts/build-up-plot.ts").then((module) => module.buildUpPlot);

type Props = {
  station: { code: string; name: string };
  severity: WinterSeverity;
  quality: { isTotalSound: boolean; isSpanDoubtful: boolean };
  category: { category: SeverityCategory; cutPoints: CutPoints } | null;
  historyCount: number;
  counts: WinterCounts;
  otherWinters: readonly { seasonStartYear: number; totalPoints: number }[];
  spec: BuildUpSpec;
  svg: { desk: string; phone: string };
};

/** One winter at one station: how it gathered, how it is classed, what is missing. */
export function WinterReport(props: Props) {
  const { station, severity, quality, category, historyCount, otherWinters, spec, svg } = props;
  const missing = scoredElements
    .filter((element) => severity.missingDayCounts[element] > 0)
    .map((element) => `${elementWords[element]} on ${countWords(severity.missingDayCounts[element], "day", "days")}`);
  const facts = [
    { name: "from", value: formatShortDay(severity.beginDay) },
    { name: "to", value: formatShortDay(severity.endDay) },
    { name: "points from cold", value: formatWhole(severity.temperaturePoints) },
    { name: "points from snow", value: formatWhole(severity.snowPoints) },
  ];
  return (
    <>
      {!quality.isTotalSound && (
        <Notice tone="problem" title="Too many days were not reported.">
          The total is not shown to others and stands in no comparison. Nothing was filled in.
        </Notice>
      )}
      <SideBySide
        hasRule
        side={
          <>
            <h2 className="text-head leading-tight font-bold">How it gathered</h2>
            <p className="mb-1 text-note text-gravel">points, at {station.name}</p>
            <Facts facts={facts} />
          </>
        }
      >
        <figure>
          <LiveChart spec={spec} svg={svg} load={load} />
          <figcaption className="text-note text-gravel">
            Heavy line: this winter. Blue under it: what snow gave.
            {spec.usual !== null && " Grey: the middle half of the station’s winters, dashed their median."}
            {spec.days.some(({ isMissing }) => isMissing) && " Ticks on the ground: days with a missing reading."}
          </figcaption>
        </figure>
      </SideBySide>
      <p className="mt-4 max-w-method">
        {missing.length === 0
          ? "Every day was reported."
          : `Not reported: ${listWords(missing)}. Those days scored nothing for it, and were not filled in.`}
        {quality.isSpanDoubtful && " The winter may have begun earlier or ended later, on days that nobody read."}
      </p>
      {category !== null && (
        <CategoryTable {...category} totalPoints={severity.totalPoints} historyCount={historyCount} />
      )}
      {category === null && severity.isOver && (
        <p className="mt-4 max-w-method text-gravel">
          It is not classed: that takes 20 finished winters of the station with enough readings, and there are{" "}
          {countWords(historyCount, "other", "others")}.
        </p>
      )}
      <CountTable counts={props.counts} />
      {otherWinters.length > 0 && (
        <details className="group mt-6">
          <summary className="flex min-h-target w-fit list-none items-center font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2">
            The station’s other winters
          </summary>
          <Timetable
            caption="Winter index of each season, newest first"
            isCaptionHidden
            onPhone="keep"
            columns={[
              { key: "season", label: "season" },
              { key: "points", label: "points", isNumeric: true },
            ]}
            rows={otherWinters.map(({ seasonStartYear, totalPoints }) => ({
              key: String(seasonStartYear),
              cells: { season: seasonLabel(seasonStartYear), points: formatWhole(totalPoints) },
            }))}
          />
        </details>
      )}
      <Heading>What the index is, and is not</Heading>
      <p className="max-w-method text-gravel">
        Accumulated Winter Season Severity Index: each day scores points for its highest and lowest temperature, its
        snowfall and the snow on the ground (Mayes Boustead and others, Journal of Applied Meteorology and Climatology
        54, 2015). It counts cold without snow; it does not count freezing rain, wind or the hour of the day. It is a
        climate index, not a model of salt: a figure set against it stays a rough guide.
      </p>
    </>
  );
}

function CategoryTable({
  category,
  cutPoints,
  totalPoints,
  historyCount,
}: {
  category: SeverityCategory;
  cutPoints: CutPoints;
  totalPoints: number;
  historyCount: number;
}) {
  const bounds = [null, ...cutPoints, null];
  return (
    <section>
      <Heading>How it is classed</Heading>
      <Timetable
        caption={`By the fifths of ${historyCount + 1} winters at the station`}
        onPhone="keep"
        columns={[
          { key: "class", label: "class" },
          { key: "points", label: "points", isNumeric: true },
          { key: "this", label: "" },
        ]}
        rows={severityCategories.map((each, place) => {
          const [low, high] = [bounds[place] ?? null, bounds[place + 1] ?? null];
          const words =
            low === null
              ? `up to ${formatWhole(high)}`
              : high === null
                ? `above ${formatWhole(low)}`
                : `above ${formatWhole(low)}, up to ${formatWhole(high)}`;
          return {
            key: each,
            isOurs: each === category,
            cells: {
              class: `${each} ${severityCategoryNames[each]}`,
              points: words,
              this: each === category ? `this winter: ${formatWhole(totalPoints)}` : " ",
            },
          };
        })}
      />
    </section>
  );
}

function CountTable({ counts }: { counts: WinterCounts }) {
  const lines = [
    ["0.1 in of snow or more", counts.snowDays],
    ["1 in of snow or more", counts.snowDaysOf1In],
    ["3 in of snow or more", counts.snowDaysOf3In],
    ["thaw by day, frost by night", counts.freezeThawDays],
    ["rain or snow, and frost", counts.wetFreezeDays],
  ] as const;
  return (
    <section>
      <Heading>Counted plainly</Heading>
      <Timetable
        caption="Days of the winter; our own counts"
        onPhone="keep"
        columns={[
          { key: "kind", label: "days with" },
          { key: "days", label: "days", isNumeric: true },
          { key: "unknown", label: "not known", unit: "days", isNumeric: true },
        ]}
        rows={lines.map(([label, tally]) => ({
          key: label,
          cells: { kind: label, days: formatWhole(tally.dayCount), unknown: formatWhole(tally.unknownDayCount) },
        }))}
      />
    </section>
  );
}
