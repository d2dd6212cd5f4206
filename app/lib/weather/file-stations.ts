import type { FileProblem } from "#app/domain/file-problem.ts";
import { weatherElements } from "#app/domain/severity/weather-day.ts";
import type { FileLine } from "./file-records.ts";
import { readObservation, type WeatherUnits } from "./observation.ts";
import { type StationDays, stationDays, type StationWeather } from "./station-days.ts";

/** The rest is counted: nobody reads a thousand of the same complaint. */
const mostProblemsListed = 200;

const lineMessages = {
  "not-a-station": "This is no station identifier; they have 11 characters, as in USC00000001.",
  "not-a-date": "Write the day as 2026-01-15. A spreadsheet may have changed it: upload the file as it was downloaded.",
};

/** A problem with the file as a whole. */
export function fileProblem(code: string, severity: FileProblem["severity"], message: string): FileProblem {
  return { row: null, column: null, value: null, code, severity, message };
}

/** Says once which elements a station never gave a reading of: the severity needs four of them. */
function absentElements({ stationId, tallies }: StationWeather): FileProblem[] {
  const absent = weatherElements.filter((element) => tallies[element].readCount === 0);
  if (absent.length === 0) return [];
  const message = `${stationId} gives no reading of ${absent.join(", ")}. Those stay missing.`;
  return [fileProblem("element-absent", "check", message)];
}

function daysUpsideDown({ stationId, days }: StationWeather): FileProblem[] {
  const wrong = days.filter(({ tmaxF, tminF }) => tmaxF !== null && tminF !== null && tminF > tmaxF);
  const [first] = wrong;
  if (!first) return [];
  const on = wrong.length === 1 ? first.day : `${wrong.length} days, first on ${first.day}`;
  const message = `${stationId} has a lowest temperature above the highest on ${on}.`;
  return [fileProblem("min-above-max", "check", message)];
}

/** The stations of a file as its lines come in, and what is wrong with them. */
export type FileStations = {
  stationCount: () => number;
  add: (row: number, line: FileLine, units: WeatherUnits) => void;
  note: (problem: FileProblem) => void;
  finish: () => { stations: StationWeather[]; problems: FileProblem[] };
};

/** An empty gathering of a file's stations; it lists 200 problems and counts the rest. */
export function fileStations(): FileStations {
  const stations = new Map<string, StationDays>();
  const listed: FileProblem[] = [];
  const beyond = { error: 0, check: 0 };

  function note(problem: FileProblem) {
    if (listed.length < mostProblemsListed) listed.push(problem);
    else beyond[problem.severity]++;
  }

  function add(row: number, line: FileLine, units: WeatherUnits) {
    const noteCell = (column: string, text: string, code: string, message: string) =>
      note({ row, column, value: text === "" ? null : text.slice(0, 40), code, severity: "error", message });
    if (!line.ok) {
      noteCell(line.column, line.text, line.code, lineMessages[line.code]);
      return;
    }
    const station = stations.get(line.stationId) ?? stationDays(line.stationId);
    stations.set(line.stationId, station);
    for (const { element, column, text, flags } of line.values) {
      const observation = readObservation({ element, text, flags, units });
      if (observation.state === "unreadable") noteCell(column, text.trim(), observation.code, observation.message);
      if (station.add(line.day, element, observation) === "contradicted") {
        const message = `${element} of ${line.day} stands in this file twice with different values.`;
        noteCell(column, text.trim(), "contradicted", message);
      }
    }
  }

  function finish() {
    const found = [...stations.values()].map((station) => station.weather());
    found.flatMap((station) => [...absentElements(station), ...daysUpsideDown(station)]).forEach(note);
    const beyondCount = beyond.error + beyond.check;
    if (beyondCount === 0) return { stations: found, problems: listed };
    const severity = beyond.error > 0 ? "error" : "check";
    const rest = fileProblem("more-problems", severity, `There are ${beyondCount} more problems.`);
    return { stations: found, problems: [...listed, rest] };
  }

  return { stationCount: () => stations.size, add, note, finish };
}
