/**
 * The database's own code for what went wrong.
 *
 * @param error - anything that was thrown
 * @returns null when it was not the database
 * @example databaseCode(error) // "ER_LOCK_DEADLOCK"
 */
export function databaseCode(error: unknown): string | null {
  if (typeof error !== "object" || error === null || !("original" in error)) return null;
  const { original } = error;
  if (typeof original !== "object" || original === null || !("code" in original)) return null;
  return typeof original.code === "string" ? original.code : null;
}

/**
 * Why something failed, as it may be written down. A database's own message repeats the statement with its values,
 * which may be figures, addresses or secrets: of such an error only the code is told.
 *
 * @param error - anything that was thrown
 * @returns at most 300 characters
 * @example reasonOf(new Error("The sign-in service answered 502.")) // "The sign-in service answered 502."
 */
export function reasonOf(error: unknown): string {
  const code = databaseCode(error);
  if (code !== null) return `The database refused: ${code}`;
  return error instanceof Error ? error.message.slice(0, 300) : "unknown";
}

/** Where it was thrown: the lines of the stack without the message above them. */
export function placesOf(error: unknown): string[] {
  const lines = error instanceof Error ? (error.stack ?? "").split("\n") : [];
  return lines.map((line) => line.trim()).filter((line) => line.startsWith("at "));
}
