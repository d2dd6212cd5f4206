/** One setting's line: its rate is `rateAtOne` at speed 1, and falls in proportion to the speed. */
export type FanLine = { setting: number; rateAtOne: number; isAtHydraulicLimit: boolean };

/** All that a rate fan shows, in the units it is shown in. */
export type RateFanSpec = {
  rateUnit: string;
  speedUnit: string;
  /** Ascending by setting. */
  lines: FanLine[];
  band: { low: number; high: number } | null;
  speeds: { from: number; to: number; step: number };
  working: { setting: number; speed: number };
};

export type FanSize = "desk" | "phone";

/** Settings that turn alike share a line: one for each rate, with the settings on it. */
export type FanGroup = { settings: number[]; rateAtOne: number; isWorking: boolean };

export function fanGroups({ lines, working }: RateFanSpec): FanGroup[] {
  const groups: FanGroup[] = [];
  for (const { setting, rateAtOne } of lines) {
    const same = groups.find((group) => group.rateAtOne === rateAtOne);
    if (same) same.settings.push(setting);
    else groups.push({ settings: [setting], rateAtOne, isWorking: false });
  }
  for (const group of groups) group.isWorking = group.settings.includes(working.setting);
  return groups;
}

/** "6–8" for settings on one line, "3" for one alone. */
export function groupWords({ settings }: FanGroup) {
  const [first, last] = [settings[0], settings.at(-1)];
  return first === last ? String(first) : `${first}–${last}`;
}

/** The rate at which the picture ends: what matters is around the band and at work, not at a walk. */
export function fanTop({ band, lines, working, speeds }: RateFanSpec) {
  const own = lines.find(({ setting }) => setting === working.setting);
  const atWork = own ? own.rateAtOne / working.speed : 0;
  const highest = Math.max(0, ...lines.map(({ rateAtOne }) => rateAtOne / speeds.from));
  const wanted = Math.max(atWork * 1.7, (band?.high ?? 0) * 2.4);
  return wanted > 0 ? Math.min(highest * 1.02, wanted) : highest;
}

export function fanPlace(rate: number, band: RateFanSpec["band"]) {
  if (band === null) return null;
  if (rate < band.low) return "under";
  return rate > band.high ? "over" : "in";
}

const figure = (value: number) => Math.round(value).toLocaleString("en-US");

/** The same thing the picture says, as sentences. */
export function rateFanSentence(spec: RateFanSpec) {
  const { band, working, rateUnit, speedUnit } = spec;
  const at = fanGroups(spec).map((group) => {
    const rate = group.rateAtOne / working.speed;
    const place = fanPlace(rate, band);
    const where = place === null ? "" : place === "in" ? ", in the band" : `, ${place} the band`;
    return `setting ${groupWords(group)} ${figure(rate)}${where}`;
  });
  const range = band === null ? "" : ` The band is ${figure(band.low)} to ${figure(band.high)} ${rateUnit}.`;
  return `Rates fall as the truck drives faster. At ${figure(working.speed)} ${speedUnit}: ${at.join("; ")} ${rateUnit}.${range}`;
}
