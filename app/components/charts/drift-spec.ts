import { formatShortDay } from "#app/lib/format.ts";

/** One calibration of a truck with a material, at the working setting and speed. */
export type DriftPoint = {
  testedOn: string;
  dayNumber: number;
  rate: number;
  plusMinus: number | null;
  isOurs: boolean;
};

export type DriftSpec = {
  rateUnit: string;
  /** Oldest first, one or more. */
  points: DriftPoint[];
  band: { low: number; high: number } | null;
};

const figure = (value: number) => Math.round(value).toLocaleString("en-US");

/** The rates that the picture reaches over, rounded outward to steps. */
export function driftReach({ points, band }: DriftSpec) {
  const lows = [...points.map(({ rate, plusMinus }) => rate - (plusMinus ?? 0)), ...(band ? [band.low] : [])];
  const highs = [...points.map(({ rate, plusMinus }) => rate + (plusMinus ?? 0)), ...(band ? [band.high] : [])];
  const step = 50;
  const from = Math.max(0, Math.floor(Math.min(...lows) / step) * step);
  const to = Math.ceil(Math.max(...highs) / step) * step;
  return { from, to: Math.max(to, from + step) };
}

/** The same thing the picture says. */
export function driftSentence({ points, rateUnit, band }: DriftSpec) {
  const [first, last] = [points[0], points.at(-1)];
  if (!first || !last) return "Nothing was weighed yet.";
  const range = band === null ? "" : ` The band is ${figure(band.low)} to ${figure(band.high)}.`;
  if (points.length === 1)
    return `Weighed once, ${formatShortDay(first.testedOn)}: ${figure(first.rate)} ${rateUnit}.${range}`;
  return `Weighed ${points.length} times from ${formatShortDay(first.testedOn)} to ${formatShortDay(last.testedOn)}: from ${figure(first.rate)} to ${figure(last.rate)} ${rateUnit}.${range}`;
}
