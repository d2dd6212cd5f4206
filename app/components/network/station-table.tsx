import { Form } from "react-router";
import { Button } from "#app/components/ui/button.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { seasonLabel } from "#app/domain/dates.ts";
import { type SeverityCategory, severityCategoryNames } from "#app/domain/severity/severity-category.ts";
import { formatShortDay, formatWhole } from "#app/lib/format.ts";
import { listWords } from "#app/lib/words.ts";

type Station = {
  id: number;
  code: string;
  name: string;
  townNames: string[];
  dayCount: number;
  lastDay: string | null;
  winter: {
    points: number;
    category: SeverityCategory | null;
    missing: { tmax: number; tmin: number; snowfall: number; snowDepth: number };
    isSound: boolean;
  } | null;
};

type Props = {
  stations: readonly Station[];
  seasonStartYear: number;
  hasService: boolean;
  /** Names the requests of this page, so that a click counted twice asks once. */
  clientRef: string;
};

function pointsWords({ winter }: Station) {
  if (winter === null) return "–";
  if (!winter.isSound) return "too few days";
  return `${formatWhole(winter.points)}${winter.category === null ? "" : `, ${winter.category} ${severityCategoryNames[winter.category]}`}`;
}

/** The stations with one season's weather: days, gaps, points, and the towns attached. */
export function StationTable({ stations, seasonStartYear, hasService, clientRef }: Props) {
  return (
    <Timetable
      caption={`Weather of ${seasonLabel(seasonStartYear)}; missing days are those between the winter’s first and last`}
      columns={[
        { key: "name", label: "station" },
        { key: "towns", label: "towns" },
        { key: "days", label: "days reported", isNumeric: true },
        { key: "last", label: "to" },
        { key: "missing", label: "missing: high, low, snow, depth", isNumeric: true },
        { key: "points", label: "winter index, points", isNumeric: true },
        ...(hasService ? [{ key: "fetch", label: "" }] : []),
      ]}
      rows={stations.map((station) => ({
        key: String(station.id),
        cells: {
          name: (
            <>
              {station.name}
              <span className="block text-note font-normal text-gravel">{station.code}</span>
            </>
          ),
          towns: (
            <span className="block max-w-80">
              {station.townNames.length === 0 ? "none" : listWords(station.townNames)}
            </span>
          ),
          days: formatWhole(station.dayCount),
          last: station.lastDay === null ? "–" : formatShortDay(station.lastDay),
          missing:
            station.winter === null
              ? "–"
              : [
                  station.winter.missing.tmax,
                  station.winter.missing.tmin,
                  station.winter.missing.snowfall,
                  station.winter.missing.snowDepth,
                ].join(", "),
          points: pointsWords(station),
          fetch: (
            <Form method="post">
              <input type="hidden" name="stationId" value={station.id} />
              <input type="hidden" name="seasonStartYear" value={seasonStartYear} />
              <input type="hidden" name="clientRef" value={`${clientRef.slice(0, 24)}-${station.id}`} />
              <Button variant="quiet" size="slim" name="intent" value="fetch">
                Fetch<span className="sr-only"> the weather of {station.name}</span>
              </Button>
            </Form>
          ),
        },
      }))}
    />
  );
}
