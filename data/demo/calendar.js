const MS_PER_DAY = 86_400_000;

/** The day `days` after a local date; both are written YYYY-MM-DD. */
export function addDays(localDate, days) {
  return new Date(Date.parse(`${localDate}T00:00:00Z`) + days * MS_PER_DAY).toISOString().slice(0, 10);
}

/** An instant within office hours (America/New_York) of a day, as MariaDB reads it: UTC with milliseconds. */
export function officeInstant(random, localDate) {
  const [hour, minute, second] = [random.integer(13, 20), random.integer(0, 59), random.integer(0, 59)];
  return `${localDate} ${[hour, minute, second].map((part) => String(part).padStart(2, "0")).join(":")}.000`;
}
