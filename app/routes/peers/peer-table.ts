import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { isIndicatorKey, indicators } from "#app/domain/peers/indicators.ts";
import { writeCsv } from "#app/lib/csv.server.ts";
import { csvResponse } from "#app/lib/download.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { idParam } from "#app/lib/params.ts";
import { getStanding } from "#app/services/editions.server.ts";
import type { Route } from "./+types/peer-table";

/** The table behind one strip: the same protected figures, and no others. */
export async function loader({ context, url }: Route.LoaderArgs) {
  const indicator = url.searchParams.get("indicator") ?? "";
  if (!isIndicatorKey(indicator)) throw notFound("indicator");
  const editionId = idParam(url.searchParams.get("edition") ?? "", "edition");
  const groupKey = url.searchParams.get("group") ?? "";
  const standing = await getStanding(townActor(context), editionId, groupKey);
  const row = standing?.rows.find((candidate) => candidate.indicator === indicator);
  if (!standing || !row || row.cell.state === "withheld") throw notFound("table");
  const { cell } = row;
  const facts: [string, number | null][] = [
    ["towns", cell.towns],
    ["median", cell.median],
    ["median_likely_from", cell.interval?.low ?? null],
    ["median_likely_to", cell.interval?.high ?? null],
    ["lower_quartile", cell.middleHalf?.low ?? null],
    ["upper_quartile", cell.middleHalf?.high ?? null],
    ["lower_tenth", cell.tenths?.low ?? null],
    ["upper_tenth", cell.tenths?.high ?? null],
  ];
  const { seasonStartYear, number } = standing.edition;
  const head = [`${seasonLabel(seasonStartYear)}, edition ${number}`, indicator, indicators[indicator].unit, groupKey];
  const body = writeCsv(
    ["edition", "indicator", "unit", "group", "what", "from", "to", "value"],
    [
      ...facts.map(([what, value]) => [...head, what, null, null, value]),
      ...cell.bins.map(({ from, to, towns }) => [...head, "towns_in_bin", from, to, towns]),
    ],
  );
  return csvResponse(`peers-${seasonStartYear}-${number}-${indicator}-${groupKey}.csv`, body);
}
