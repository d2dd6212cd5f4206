/**
 * Where to go after signing in: a path on this site, or the page for a newcomer.
 *
 * @param text - what the address or form carried; anything
 * @param origin - this site's origin
 * @returns a path with its query, at most 512 characters, that stays on `origin`; "/today" otherwise
 * @example safeReturnTo("//elsewhere.example", "https://net.example") // "/today"
 */
export function safeReturnTo(text: string | null | undefined, origin: string): string {
  const fallback = "/today";
  if (!text || text.length > 512 || !/^\/(?![/\\])[\x21-\x7e]*$/.test(text) || text.includes("\\")) return fallback;
  if (!URL.canParse(text, origin)) return fallback;
  const url = new URL(text, origin);
  if (url.origin !== origin || url.pathname.startsWith("//")) return fallback;
  return url.pathname + url.search;
}
