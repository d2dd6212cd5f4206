import type { BuildUpSpec } from "#app/components/charts/build-up-spec.ts";
import { type SeverityCategory, severityCategoryNames } from "#app/domain/severity/severity-category.ts";
import type { BuildUpDay, ScoredElement, WinterSeverity } from "#app/domain/severity/winter-severity.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { formatShortDay, formatWhole } from "#app/lib/format.ts";

export const elementWords: Record<ScoredElement, string> = {
  tmax: "highest temperature",
  tmin: "lowest temperature",
  snowfall: "snowfall",
  snowDepth: "snow on the ground",
};

type Winter = {
  station: { name: string };
  severity: WinterSeverity;
  quality: { isTotalSound: boolean; isTemperaturePartSound: boolean };
  category: { category: SeverityCategory } | null;
  buildUp: readonly BuildUpDay[];
  usual: BuildUpSpec["usual"];
};

/** How hard the winter was, in one sentence. */
export function winterSentence({ severity, quality, category }: Winter): string {
  const label = seasonLabel(severity.seasonStartYear);
  const points = formatWhole(severity.totalPoints);
  if (!quality.isTotalSound) {
    return `The winter of ${label} cannot be summed up: too many days were not reported.`;
  }
  if (!severity.isOver)
    return `The winter of ${label} has gathered ${points} points by ${formatShortDay(severity.endDay)}.`;
  if (category === null) return `The winter of ${label} came to ${points} points.`;
  const name = severityCategoryNames[category.category];
  return `The winter of ${label} was ${name} (${category.category}): ${points} points.`;
}

/** What the chart of the build-up shows. */
export function buildUpSpec(winter: Winter): BuildUpSpec {
  const { severity, buildUp, usual, station } = winter;
  const points = formatWhole(severity.totalPoints);
  const missingCount = buildUp.filter(({ missing }) => missing.length > 0).length;
  const beside = usual
    ? ` The middle half of the station’s winters ended between ${formatWhole(usual.at(-1)?.lowPoints ?? null)} and ${formatWhole(usual.at(-1)?.highPoints ?? null)}.`
    : "";
  const gaps = missingCount === 0 ? "" : ` On ${missingCount} days a reading is missing.`;
  return {
    days: buildUp.map(({ dayOfSeason, totalPoints, snowPoints, missing }) => ({
      dayOfSeason,
      totalPoints,
      snowPoints,
      isMissing: missing.length > 0,
    })),
    usual,
    endWords: `${points}`,
    sentence: `Winter severity at ${station.name} from ${formatShortDay(severity.beginDay)} to ${formatShortDay(severity.endDay)}: ${points} points, ${formatWhole(severity.snowPoints)} of them from snow.${beside}${gaps}`,
  };
}
