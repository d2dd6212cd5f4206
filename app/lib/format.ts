import { lbPerShortTon } from "#app/domain/units.ts";

const whole = new Intl.NumberFormat("en-US", { maximumFractionDigits: 0 });
const oneDecimal = new Intl.NumberFormat("en-US", { minimumFractionDigits: 1, maximumFractionDigits: 1 });
const dollars = new Intl.NumberFormat("en-US", { style: "currency", currency: "USD", maximumFractionDigits: 0 });
const day = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "long", year: "numeric", timeZone: "UTC" });
const shortDay = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short", year: "numeric", timeZone: "UTC" });
const instant = new Intl.DateTimeFormat("en-GB", {
  day: "numeric",
  month: "short",
  year: "numeric",
  hour: "2-digit",
  minute: "2-digit",
  timeZone: "UTC",
  timeZoneName: "short",
});

/** Pounds, pounds per lane mile and counts: whole, with thousands. A dash stands for "not reported". */
export function formatWhole(value: number | null): string {
  return value === null ? "–" : whole.format(value);
}

/** Pounds as short tons, one decimal. */
export function formatTons(lb: number | null): string {
  return lb === null ? "–" : oneDecimal.format(lb / lbPerShortTon);
}

/** Any figure to one decimal. */
export function formatOneDecimal(value: number | null): string {
  return value === null ? "–" : oneDecimal.format(value);
}

/** Whole cents as whole dollars. */
export function formatDollars(cents: number | null): string {
  return cents === null ? "–" : dollars.format(cents / 100);
}

/** A share from 0 to 1 as a whole percentage. */
export function formatShare(share: number | null): string {
  return share === null ? "–" : `${whole.format(share * 100)} %`;
}

/** Inches as the nearest sixteenth: 1.875 is "1 7/8". */
export function formatInches(inches: number): string {
  const sixteenths = Math.round(inches * 16);
  const rest = sixteenths % 16;
  const full = Math.floor(sixteenths / 16);
  if (rest === 0) return String(full);
  const divisor = [8, 4, 2, 1].find((candidate) => rest % candidate === 0 && 16 % candidate === 0) ?? 1;
  const fraction = `${rest / divisor}/${16 / divisor}`;
  return full === 0 ? fraction : `${full} ${fraction}`;
}

/** A local date, "13 October 2026". */
export function formatDay(date: string): string {
  return day.format(new Date(`${date}T00:00:00Z`));
}

/** A local date, "13 Oct 2026". */
export function formatShortDay(date: string): string {
  return shortDay.format(new Date(`${date}T00:00:00Z`));
}

/** An instant, "13 Oct 2026, 14:05 UTC". */
export function formatInstant(at: Date | string): string {
  return instant.format(typeof at === "string" ? new Date(at) : at);
}

/** A local time "2026-01-12 04:30" as "12 Jan 2026, 04:30". */
export function formatLocalTime(time: string): string {
  return `${formatShortDay(time.slice(0, 10))}, ${time.slice(11, 16)}`;
}

/** A share from 0 to 1 as a percentage to one decimal. */
export function formatShareOneDecimal(share: number | null): string {
  return share === null ? "–" : `${oneDecimal.format(share * 100)} %`;
}
