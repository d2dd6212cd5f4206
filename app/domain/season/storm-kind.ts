export const stormKinds = ["snow", "light-snow", "freezing-rain", "sleet", "frost", "blowing-snow", "other"] as const;
export type StormKind = (typeof stormKinds)[number];

/** How a page names the kind. */
export const stormKindWords: Record<StormKind, string> = {
  snow: "snow",
  "light-snow": "light snow",
  "freezing-rain": "freezing rain",
  sleet: "sleet",
  frost: "frost or black ice",
  "blowing-snow": "blowing snow",
  other: "other",
};

const others: Record<string, StormKind> = {
  snowstorm: "snow",
  "snow storm": "snow",
  "heavy snow": "snow",
  flurries: "light-snow",
  "snow shower": "light-snow",
  "snow showers": "light-snow",
  dusting: "light-snow",
  ice: "freezing-rain",
  icing: "freezing-rain",
  "ice storm": "freezing-rain",
  "freezing drizzle": "freezing-rain",
  glaze: "freezing-rain",
  "ice pellets": "sleet",
  "wintry mix": "sleet",
  "mixed precipitation": "sleet",
  "black ice": "frost",
  "frost or black ice": "frost",
  refreeze: "frost",
  drifting: "blowing-snow",
  drifts: "blowing-snow",
};

/**
 * The kind of storm that a word means, or null when it means none we know.
 *
 * @example stormKindNamed("Freezing rain") // "freezing-rain"
 */
export function stormKindNamed(text: string): StormKind | null {
  const word = text
    .trim()
    .toLowerCase()
    .replace(/[\s_-]+/g, " ");
  return stormKinds.find((kind) => kind.replace("-", " ") === word) ?? others[word] ?? null;
}

/** Whether the text is one of the kinds as they are stored. */
export function isStormKind(text: string): text is StormKind {
  return stormKinds.some((kind) => kind === text);
}
