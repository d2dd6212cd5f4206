/**
 * Whether the text has the form of a GHCN-Daily station identifier: two letters of a country, then nine characters.
 *
 * Source: NOAA NCEI, GHCN-Daily readme, section III, "ID".
 * @example isStationId("USC00000001") // true
 */
export function isStationId(text: string): boolean {
  return /^[A-Z]{2}[0-9A-Z-]{9}$/.test(text);
}
