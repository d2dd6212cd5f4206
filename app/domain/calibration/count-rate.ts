/** Shaft revolutions counted at one feed setting. */
export type Count = { setting: number; revolutions: number; seconds: number };

/** A feed setting with the count that it really gives. */
export type SettingCount = { setting: number; revPerMin: number; isAtHydraulicLimit: boolean };

const secondsPerMinute = 60;
/** Counts closer than this are the same count: whole revolutions are counted, give or take a half. */
const countErrorRevPerMin = 0.5;

/**
 * The count brought to one minute.
 *
 * @param count - revolutions > 0 over seconds > 0
 * @returns shaft revolutions a minute
 * @throws RangeError when revolutions or seconds are not above 0
 * @example revolutionsPerMinute({ setting: 4, revolutions: 10, seconds: 30 }) // 20
 */
export function revolutionsPerMinute({ revolutions, seconds }: Count): number {
  if (!(revolutions > 0 && Number.isFinite(revolutions))) throw new RangeError("revolutions must be above 0");
  if (!(seconds > 0 && Number.isFinite(seconds))) throw new RangeError("seconds must be above 0");
  return (revolutions * secondsPerMinute) / seconds;
}

/**
 * The counts by setting, with those at which the hydraulics give no more.
 *
 * A setting whose count no longer rises over the one before is at the limit. Every later setting is too: opening the
 * feed further moves no more oil, so they all carry the count of the last setting that still rose.
 *
 * @param counts - in any order, each setting once
 * @returns ascending by setting; empty when there are no counts
 * @throws RangeError when a setting comes twice, or a count is not above 0
 * @example counts of 10, 20 and 20 at settings 1 to 3 // the third is at the limit
 */
export function settingsWithLimit(counts: readonly Count[]): SettingCount[] {
  const settings: SettingCount[] = [];
  for (const count of [...counts].sort((a, b) => a.setting - b.setting)) {
    const before = settings.at(-1);
    if (before?.setting === count.setting) throw new RangeError(`setting ${count.setting} is counted twice`);
    const revPerMin = revolutionsPerMinute(count);
    const isAtHydraulicLimit = before !== undefined && (before.isAtHydraulicLimit || revPerMin <= before.revPerMin);
    settings.push({
      setting: count.setting,
      revPerMin: isAtHydraulicLimit ? before.revPerMin : revPerMin,
      isAtHydraulicLimit,
    });
  }
  return settings;
}

/**
 * Where the hydraulics give no more.
 *
 * @param settings - as `settingsWithLimit` gives them
 * @returns the last setting whose count still rose, its count, and the settings above that give no more than it; null
 *   when every count rises
 * @example counts of 10, 20 and 20 at settings 1 to 3 // { lastRisingSetting: 2, revPerMin: 20, limitedSettings: [3] }
 */
export function hydraulicLimit(
  settings: readonly SettingCount[],
): { lastRisingSetting: number; revPerMin: number; limitedSettings: number[] } | null {
  const limitedSettings = settings.filter((one) => one.isAtHydraulicLimit).map(({ setting }) => setting);
  const lastRising = settings.filter((one) => !one.isAtHydraulicLimit).at(-1);
  if (!lastRising || limitedSettings.length === 0) return null;
  return { lastRisingSetting: lastRising.setting, revPerMin: lastRising.revPerMin, limitedSettings };
}

/**
 * The places at which the count falls though the setting rises, by more than counting can be wrong.
 *
 * @param counts - in any order, each above 0
 * @returns pairs of neighbouring settings, the lower setting first; empty when the count never falls
 * @throws RangeError when a count is not above 0
 * @example counts of 20 and 15 a minute at settings 3 and 4 // one pair
 */
export function fallsInCount<One extends Count>(counts: readonly One[]): { before: One; after: One }[] {
  const rising = [...counts].sort((a, b) => a.setting - b.setting);
  return rising.slice(1).flatMap((after, place) => {
    const before = rising[place];
    if (!before || revolutionsPerMinute(after) >= revolutionsPerMinute(before) - countErrorRevPerMin) return [];
    return [{ before, after }];
  });
}

/** The words for a count that falls. @example "The count falls from 20 a minute at setting 3 to 15 at setting 4." */
export function fallWords({ before, after }: { before: Count; after: Count }): string {
  const shown = (count: Count) => String(Number(revolutionsPerMinute(count).toFixed(2)));
  const from = `from ${shown(before)} a minute at setting ${before.setting}`;
  return `The count falls ${from} to ${shown(after)} at setting ${after.setting}. Count both again.`;
}
