const small = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

/** A count in a sentence: words up to twelve, figures after. @example countWords(3, "truck", "trucks") // "three trucks" */
export function countWords(count: number, one: string, many: string): string {
  return `${small[count] ?? count.toLocaleString("en-US")} ${count === 1 ? one : many}`;
}

/** How many towns have not sent. @example missingWords(0) // "none is missing" */
export function missingWords(count: number): string {
  return count === 0 ? "none is missing" : `${countWords(count, "has", "have")} not sent`;
}

/** Words with a capital, for the start of a sentence. */
export function sentenceStart(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** Names in a row: "4, 9 and 15". At most eight by name. */
export function listWords(names: readonly string[]): string {
  if (names.length <= 1) return names[0] ?? "";
  if (names.length > 8) return `${names.slice(0, 8).join(", ")} and ${names.length - 8} more`;
  return `${names.slice(0, -1).join(", ")} and ${names.at(-1) ?? ""}`;
}
