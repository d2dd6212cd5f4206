import { createServer } from "node:http";
import { demoSeed } from "../data/demo/generate.js";
import { stationSeason } from "../data/demo/weather.js";
import { stopOnRequest } from "./stop.js";

/**
 * Stands in for the public daily-summaries service on this machine: the demo's invented stations, answered in the
 * service's own form (a JSON list of flat objects, every value a text, °F and inches, flags beside each value). Days
 * after today are not there yet; a station that is not ours gets an empty list, as the service gives.
 */
const { WEATHER_PORT, HOST = "127.0.0.1" } = process.env;

const server = createServer((request, response) => {
  const asked = new URL(request.url ?? "/", "http://weather.invalid");
  const answer = (status, body) => {
    response.writeHead(status, { "Content-Type": "application/json", "Cache-Control": "no-store" });
    response.end(JSON.stringify(body));
  };
  if (request.method !== "GET") return answer(405, { errorMessage: "Only reading is possible here." });
  if (asked.pathname !== "/access/services/data/v1") return answer(404, { errorMessage: "There is nothing here." });
  const from = asked.searchParams.get("startDate") ?? "";
  const to = asked.searchParams.get("endDate") ?? "";
  const isDay = (text) => /^\d{4}-\d{2}-\d{2}$/.test(text);
  if (asked.searchParams.get("dataset") !== "daily-summaries" || !isDay(from) || !isDay(to)) {
    return answer(400, { errorMessage: "dataset, startDate and endDate are needed.", errors: [] });
  }
  const stations = (asked.searchParams.get("stations") ?? "").split(",");
  return answer(
    200,
    stations.flatMap((code) => summaries(code, from, to)),
  );
});

function summaries(code, from, to) {
  const today = new Date().toISOString().slice(0, 10);
  const firstYear = Number(from.slice(0, 4)) - 1;
  const lastYear = Number(to.slice(0, 4));
  const years = Array.from({ length: Math.min(10, lastYear - firstYear + 1) }, (_, place) => firstYear + place);
  return years
    .flatMap((year) => stationSeason(demoSeed, code, year))
    .filter(({ day }) => day >= from && day <= to && day < today)
    .map((weather) => summary(code, weather));
}

/** An element that nobody read is not in the object at all. */
function summary(code, { day, tmaxF, tminF, snowfallIn, snowDepthIn, precipIn, isTrace }) {
  const value = (name, reading, digits, measurement = "") =>
    reading === null ? {} : { [name]: reading.toFixed(digits), [`${name}_ATTRIBUTES`]: `${measurement},,7,0700` };
  return {
    STATION: code,
    DATE: day,
    ...value("TMAX", tmaxF, 0),
    ...value("TMIN", tminF, 0),
    ...value("SNOW", snowfallIn, 1, isTrace ? "T" : ""),
    ...value("SNWD", snowDepthIn, 1),
    ...value("PRCP", precipIn, 2),
  };
}

server.listen(Number(WEATHER_PORT), HOST);
stopOnRequest(server);
