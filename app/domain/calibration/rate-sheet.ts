import { lbPerLaneMileToKgPerLaneKm, milesToKm, mph } from "#app/domain/units.ts";
import { applicationRate } from "./application-rate.ts";
import { type Band, type BandPlace, bandPlace, distanceFromBand } from "./band.ts";
import { type DischargeReadings, type SettingDischarge, settingDischarges } from "./discharge.ts";

/** The speeds of a rate sheet: those at which spreaders work. */
const slowestSpeedMph = 5;
const fastestSpeedMph = 45;
const leastStepMph = 0.5;

/** One rate; `plusMinus` is in lb per lane mile (k = 2, about 95 %), null after a single catch. */
export type RateCell = {
  mph: number;
  lbPerMile: number;
  lbPerLaneMile: number;
  plusMinus: number | null;
  place: BandPlace | null;
};

export type RateSheetRow = Omit<SettingDischarge, "expandedRatio"> & { cells: RateCell[] };

/**
 * The speeds from 5 to 45 mph.
 *
 * @param stepMph - from 0.5 up
 * @returns 5 mph and every step on, up to 45
 * @throws RangeError when the step is under 0.5 mph or no number
 * @example speedsFromTo(10) // [5, 15, 25, 35, 45]
 */
export function speedsFromTo(stepMph: number): number[] {
  if (!(stepMph >= leastStepMph)) throw new RangeError(`the step must be ${leastStepMph} mph or more, not ${stepMph}`);
  const steps = Math.floor((fastestSpeedMph - slowestSpeedMph) / stepMph);
  return Array.from({ length: steps + 1 }, (_, step) => slowestSpeedMph + step * stepMph);
}

/**
 * The full table of rates, settings by speed, each with its ±.
 *
 * @param readings - counts and catches, or timed catches
 * @param lanesPerPass - a whole number from 1 up
 * @param speedsMph - each > 0, kept in their order
 * @param band - null when the material has none; then no cell has a place
 * @returns one row a setting, ascending; lb per mile of travel and per lane mile, unrounded
 * @throws RangeError when a reading, a speed or the lanes are out of range
 * @example rateSheet({ counts, catches, lanesPerPass: 1, speedsMph: [20], band: null })[0].cells[0].lbPerLaneMile // 600
 */
export function rateSheet({
  lanesPerPass,
  speedsMph,
  band,
  ...readings
}: DischargeReadings & { lanesPerPass: number; speedsMph: readonly number[]; band: Band | null }): RateSheetRow[] {
  return settingDischarges(readings).map(({ expandedRatio, ...setting }) => ({
    ...setting,
    cells: speedsMph.map((speedMph) => {
      const lbPerLaneMile = applicationRate(setting.lbPerMin, mph(speedMph), lanesPerPass);
      return {
        mph: speedMph,
        lbPerMile: applicationRate(setting.lbPerMin, mph(speedMph), 1),
        lbPerLaneMile,
        plusMinus: expandedRatio === null ? null : expandedRatio * lbPerLaneMile,
        place: band && bandPlace(lbPerLaneMile, band),
      };
    }),
  }));
}

export type SettingInBand = {
  setting: number;
  isAtHydraulicLimit: boolean;
  /** At the working speed. */
  lbPerLaneMile: number;
  place: BandPlace;
  /** Where the setting lands in the band, kept within 5 to 45 mph; null when it does not land there at all. */
  speeds: { slowestMph: number; fastestMph: number } | null;
};

export type BandSummary = { workingSpeedMph: number; band: Band; settings: SettingInBand[]; inBandSettings: number[] };

/**
 * Which settings land in the band at the working speed, and between which speeds each does.
 *
 * @param readings - counts and catches, or timed catches
 * @param lanesPerPass - a whole number from 1 up
 * @param workingSpeedMph - > 0
 * @param band - low end above 0
 * @returns every setting, ascending, and the numbers of those in the band; mph and lb per lane mile, unrounded
 * @throws RangeError when a reading, the speed, the lanes or the band are out of range
 * @example bandSummary({ counts, catches, lanesPerPass: 1, workingSpeedMph: 25, band }).inBandSettings // [2]
 */
export function bandSummary({
  lanesPerPass,
  workingSpeedMph,
  band,
  ...readings
}: DischargeReadings & { lanesPerPass: number; workingSpeedMph: number; band: Band }): BandSummary {
  if (!(band.lowLbPerLaneMile > 0)) throw new RangeError("the band must begin above 0 lb per lane mile");
  const settings = settingDischarges(readings).map(({ setting, isAtHydraulicLimit, lbPerMin }) => {
    const lbPerLaneMile = applicationRate(lbPerMin, mph(workingSpeedMph), lanesPerPass);
    // The rate falls in proportion to the speed: at one mile an hour it is what the discharge gives in an hour.
    const rateAtOneMph = applicationRate(lbPerMin, mph(1), lanesPerPass);
    const slowestMph = Math.max(slowestSpeedMph, rateAtOneMph / band.highLbPerLaneMile);
    const fastestMph = Math.min(fastestSpeedMph, rateAtOneMph / band.lowLbPerLaneMile);
    return {
      setting,
      isAtHydraulicLimit,
      lbPerLaneMile,
      place: bandPlace(lbPerLaneMile, band),
      speeds: slowestMph <= fastestMph ? { slowestMph, fastestMph } : null,
    };
  });
  const inBandSettings = settings.filter(({ place }) => place === "in").map(({ setting }) => setting);
  return { workingSpeedMph, band, settings, inBandSettings };
}

/** A stretch of a sentence; `tone` says that it names a place under, in or over the band. */
export type RateSentencePart = { words: string; tone?: BandPlace };
export type RateSentence = { parts: RateSentencePart[] };

function listed(words: readonly string[]) {
  return words.length < 2 ? words.join("") : `${words.slice(0, -1).join(", ")} and ${words.at(-1) ?? ""}`;
}

function wordsIn(units: "us" | "si") {
  const speed = (speedMph: number) => (units === "us" ? speedMph : milesToKm(speedMph));
  const speedUnit = units === "us" ? "mph" : "km/h";
  const plain = (value: number) => String(Number(value.toFixed(1)));
  return {
    at: (speedMph: number) => `${plain(speed(speedMph))} ${speedUnit}`,
    /** Whole speeds inside the stretch, so that both named ends are in the band; tenths when no two wholes fit. */
    fromTo: ({ slowestMph, fastestMph }: { slowestMph: number; fastestMph: number }) => {
      const inside = (parts: number) => [
        Math.ceil(speed(slowestMph) * parts - 1e-9) / parts,
        Math.floor(speed(fastestMph) * parts + 1e-9) / parts,
      ];
      const [from = 0, to = 0] = [inside(1), inside(10)].find(([low = 0, high = 0]) => low < high) ?? [];
      return from < to ? `from ${from} to ${to} ${speedUnit}` : `at ${plain(speed(slowestMph))} ${speedUnit}`;
    },
    rate: (rateLbPerLaneMile: number) => {
      const value = units === "us" ? rateLbPerLaneMile : lbPerLaneMileToKgPerLaneKm(rateLbPerLaneMile);
      // Less than half a pound outside is shown as 1, because "0 above the band" would contradict itself.
      return `${Math.max(1, Math.round(value)).toLocaleString("en-US")} ${units === "us" ? "lb per lane mile" : "kg per lane km"}`;
    },
  };
}

function inBandParts({ workingSpeedMph, settings }: BandSummary, units: "us" | "si"): RateSentencePart[] {
  const words = wordsIn(units);
  const inside = settings.filter(({ place }) => place === "in");
  const names = listed(inside.map(({ setting }) => String(setting)));
  const ranges = inside.flatMap(({ setting, speeds }) =>
    speeds ? [`${inside.length > 1 ? `setting ${setting} ` : ""}${words.fromTo(speeds)}`] : [],
  );
  const subject = inside.length > 1 ? `settings ${names} land ` : `setting ${names} lands `;
  return [
    { words: `At ${words.at(workingSpeedMph)} ${subject}` },
    { words: "in the band", tone: "in" },
    { words: ranges.length > 0 ? `: ${listed(ranges)}.` : "." },
  ];
}

function outsideParts({ workingSpeedMph, band, settings }: BandSummary, units: "us" | "si"): RateSentencePart[] {
  const words = wordsIn(units);
  const distance = ({ lbPerLaneMile }: SettingInBand) => distanceFromBand(lbPerLaneMile, band);
  const [nearest] = [...settings].sort((a, b) => Math.abs(distance(a)) - Math.abs(distance(b)));
  const reachable = settings.flatMap(({ setting, speeds }) =>
    speeds ? [`setting ${setting} ${words.fromTo(speeds)}`] : [],
  );
  const elsewhere =
    reachable.length > 0
      ? `It is reached by ${listed(reachable)}.`
      : `No setting reaches it at any speed ${words.fromTo({ slowestMph: slowestSpeedMph, fastestMph: fastestSpeedMph })}.`;
  const start = `At ${words.at(workingSpeedMph)} no setting lands in the band`;
  if (!nearest) return [{ words: `${start}.` }];
  const off = distance(nearest);
  return [
    { words: `${start}: the nearest, setting ${nearest.setting}, lays ` },
    { words: `${words.rate(Math.abs(off))} ${off > 0 ? "above" : "below"} it`, tone: off > 0 ? "over" : "under" },
    { words: `. ${elsewhere}` },
  ];
}

/**
 * What a rate sheet means, in one or two sentences.
 *
 * @param summary - of `bandSummary`, or null when the material has no band
 * @param units - the person's choice; "si" gives km/h and kg per lane km
 * @returns stretches in order; the one that names the place against the band carries its tone
 * @example bandSentence(summary).parts.map(({ words }) => words).join("")
 *   // "At 25 mph setting 2 lands in the band: from 24 to 28 mph."
 */
export function bandSentence(summary: BandSummary | null, units: "us" | "si" = "us"): RateSentence {
  if (!summary) return { parts: [{ words: "There is no band for this material, so no rate is marked." }] };
  const parts = summary.inBandSettings.length > 0 ? inBandParts(summary, units) : outsideParts(summary, units);
  return { parts };
}
