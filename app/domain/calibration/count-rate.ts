/** Shaft revolutions counted at one feed setting. */
export type Count = { setting: number; revolutions: number; seconds: number };

/** A feed setting with the count that it really gives. */
export type SettingCount = { setting: number; revPerMin: number; isAtHydraulicLimit: boolean };

const secondsPerMinute = 60;

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
