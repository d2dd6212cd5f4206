import { setTimeout as sleep } from "node:timers/promises";
import { seasonEnd, seasonLabel, seasonStart, type LocalDate } from "#app/domain/dates.ts";
import { weatherElements } from "#app/domain/severity/weather-day.ts";
import { boundedText } from "./bounded-text.ts";
import type { StationWeather } from "./station-days.ts";
import { isStationId } from "./station-id.ts";
import { readSummariesReply, type SummariesQuestion } from "./summaries-reply.ts";

/** A season of five elements with their flags is some 60 kB. */
const mostBodyBytes = 4_000_000;
const mostDetailCharacters = 200;
const firstPauseMs = 500;
const longestPauseMs = 30_000;
/** The service is busy or ill; asking again may help. After any other refusal it does not. */
const passingStatuses = new Set([408, 429, 500, 502, 503, 504]);

export type SummariesFailure = {
  ok: false;
  /**
   * refused: the request itself; unavailable: the service is ill; unreachable: no answer came; timeout: too late;
   * not-json, unexpected, too-long: an answer that is no list of days.
   */
  reason: "refused" | "unavailable" | "unreachable" | "timeout" | "not-json" | "unexpected" | "too-long";
  status: number | null;
  /** The service's own words, shortened and on one line; null when it gave none. */
  detail: string | null;
  /** A sentence for the person who asked. */
  message: string;
  attemptCount: number;
};

export type SeasonWeather =
  | { ok: true; seasonStartYear: number; weather: StationWeather; strayRowCount: number; attemptCount: number }
  | (SummariesFailure & { seasonStartYear: number });

export type SeasonQuestion = {
  stationId: string;
  seasonStartYear: number;
  /** The last day to ask for; the season's end when left out. */
  throughDay?: LocalDate;
  signal?: AbortSignal;
};

export type SummariesClient = {
  /** One season of one station, in one request and its repeats. */
  season: (question: SeasonQuestion) => Promise<SeasonWeather>;
  /** Season after season, in the order given; a failure is the last that comes. */
  seasons: (question: {
    stationId: string;
    seasonStartYears: readonly number[];
    throughDay?: LocalDate;
    signal?: AbortSignal;
  }) => AsyncGenerator<SeasonWeather>;
};

export type SummariesSettings = {
  /** The platform's fetch, or one that answers in its place. */
  fetch: typeof globalThis.fetch;
  /** Address of the service, without a query; the public one is https://www.ncei.noaa.gov/access/services/data/v1. */
  baseUrl: string;
  /** For one attempt, body included. */
  timeoutMs?: number;
  /** Attempts in all, 1 or more. */
  attempts?: number;
  pause?: (ms: number, signal?: AbortSignal) => Promise<unknown>;
};

type Attempt =
  | { ok: true; weather: StationWeather; strayRowCount: number }
  | (Pick<SummariesFailure, "ok" | "reason" | "status" | "detail"> & {
      ok: false;
      mayRepeat: boolean;
      waitMs: number | null;
    });

function addressOf(base: URL, { stationId, from, to }: SummariesQuestion) {
  const address = new URL(base);
  address.search = new URLSearchParams({
    dataset: "daily-summaries",
    stations: stationId,
    startDate: from,
    endDate: to,
    dataTypes: weatherElements.join(","),
    units: "standard",
    includeAttributes: "true",
    format: "json",
  }).toString();
  return address;
}

/** On one line, without control characters, so that it can stand in a log and on a page. */
function detailOf(body: string | null) {
  const words = (body ?? "").replace(/[\p{C}\s]+/gu, " ").trim();
  return words === "" ? null : words.slice(0, mostDetailCharacters);
}

/** Seconds as the header gives them; a date in it is left to our own pauses. */
function retryAfterMs(response: Response) {
  const seconds = /^\d{1,6}$/.exec(response.headers.get("Retry-After")?.trim() ?? "");
  return seconds ? Math.min(Number(seconds[0]) * 1000, longestPauseMs) : null;
}

function sentenceFor(reason: SummariesFailure["reason"], { stationId }: SeasonQuestion) {
  const end = "Nothing was changed; try again later, or upload the station's file.";
  const sentences: Record<SummariesFailure["reason"], string> = {
    refused: `The weather service refused the request for ${stationId}. Check the station's identifier.`,
    unavailable: `The weather service cannot answer at the moment. ${end}`,
    unreachable: `The weather service could not be reached. ${end}`,
    timeout: `The weather service took too long to answer. ${end}`,
    "not-json": `The weather service answered in another form than asked for. ${end}`,
    unexpected: `The weather service answered with something other than a list of days. ${end}`,
    "too-long": `The weather service sent far more than a season of days. ${end}`,
  };
  return sentences[reason];
}

function failed(
  reason: SummariesFailure["reason"],
  { status = null, detail = null, mayRepeat = false, waitMs = null }: Partial<Attempt & { ok: false }> = {},
): Attempt {
  return { ok: false, reason, status, detail, mayRepeat, waitMs };
}

function judge({ response, body }: { response: Response; body: string | null }, question: SummariesQuestion): Attempt {
  const { status } = response;
  if (!response.ok) {
    const mayRepeat = passingStatuses.has(status);
    const reason = mayRepeat ? "unavailable" : "refused";
    return failed(reason, { status, detail: detailOf(body), mayRepeat, waitMs: retryAfterMs(response) });
  }
  if (body === null) return failed("too-long", { status });
  const reply = readSummariesReply(body, question);
  return reply.ok ? reply : failed(reply.reason, { status, detail: detailOf(body) });
}

/**
 * A client of the public daily-summaries service: one station and one season a request, in °F and inches with flags.
 *
 * A busy or silent service is asked again, with pauses of 0.5 s, 1 s and so on, or as long as it asks for, 30 s at the
 * most. Redirects are not followed. What the service does not give stays missing.
 *
 * @param settings - `timeoutMs` 5,000 and `attempts` 3 when left out
 * @returns the client; a failure of the service is a value with its reason, never an error
 * @throws RangeError when `attempts` is under 1, TypeError when `baseUrl` is no address; from its functions, when the station's identifier has another form or
 *   `throughDay` lies outside the season; the signal's reason when the caller gives up
 *
 * Source: NOAA NCEI, Access Data Service, user documentation.
 * @example await summariesClient({ fetch, baseUrl }).season({ stationId: "USC00000001", seasonStartYear: 2025 })
 */
export function summariesClient({
  fetch,
  baseUrl,
  timeoutMs = 5000,
  attempts = 3,
  pause = (ms, signal) => sleep(ms, undefined, { signal }),
}: SummariesSettings): SummariesClient {
  if (!(attempts >= 1)) throw new RangeError(`attempts must be 1 or more, not ${attempts}`);
  const base = new URL(baseUrl);

  async function answerTo(question: SummariesQuestion, signal: AbortSignal) {
    const response = await fetch(addressOf(base, question), {
      headers: { Accept: "application/json" },
      redirect: "error",
      signal,
    });
    return { response, body: await boundedText(response, mostBodyBytes, signal) };
  }

  async function attempt(question: SummariesQuestion, signal: AbortSignal | undefined): Promise<Attempt> {
    signal?.throwIfAborted();
    const timeout = AbortSignal.timeout(timeoutMs);
    const answer = await answerTo(question, signal ? AbortSignal.any([signal, timeout]) : timeout).catch(
      (error: unknown) => {
        signal?.throwIfAborted();
        if (timeout.aborted) return failed("timeout", { mayRepeat: true });
        // The platform's fetch knows no other error for a broken connection.
        if (error instanceof TypeError) return failed("unreachable", { mayRepeat: true });
        throw error;
      },
    );
    return "ok" in answer ? answer : judge(answer, question);
  }

  async function season(question: SeasonQuestion): Promise<SeasonWeather> {
    const { stationId, seasonStartYear, throughDay, signal } = question;
    const [from, to] = [seasonStart(seasonStartYear), throughDay ?? seasonEnd(seasonStartYear)];
    if (!isStationId(stationId)) throw new RangeError(`"${stationId}" is no station identifier`);
    if (to < from || to > seasonEnd(seasonStartYear)) {
      throw new RangeError(`throughDay must lie in the season ${seasonLabel(seasonStartYear)}, not on ${to}`);
    }
    for (let attemptCount = 1; ; attemptCount++) {
      const result = await attempt({ stationId, from, to }, signal);
      if (result.ok) return { ...result, seasonStartYear, attemptCount };
      const { reason, status, detail } = result;
      if (!result.mayRepeat || attemptCount >= attempts) {
        const message = sentenceFor(reason, question);
        return { ok: false, seasonStartYear, reason, status, detail, message, attemptCount };
      }
      await pause(result.waitMs ?? Math.min(firstPauseMs * 2 ** (attemptCount - 1), longestPauseMs), signal);
    }
  }

  return {
    season,
    async *seasons({ stationId, seasonStartYears, throughDay, signal }) {
      for (const seasonStartYear of seasonStartYears) {
        const isCut = throughDay !== undefined && throughDay < seasonEnd(seasonStartYear);
        const found = await season({ stationId, seasonStartYear, throughDay: isCut ? throughDay : undefined, signal });
        yield found;
        if (!found.ok) return;
      }
    },
  };
}
