/** The present instant. The one place that asks the clock, so that tests can set it. */
export function now(): Date {
  return new Date();
}

/** Milliseconds as words of other units. */
export const minuteMs = 60_000;
export const hourMs = 60 * minuteMs;
export const dayMs = 24 * hourMs;
