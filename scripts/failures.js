const diskIsFull = "The disk is full. Free some space, then start again.";

/** A problem that a person can cure: the message is one sentence with its remedy, shown without a stack. */
export class Failure extends Error {}

/**
 * The sentence to print for an error, or null when it is a fault of the program and deserves its stack.
 *
 * @param {unknown} error anything thrown
 * @returns {string | null} what happened and what to do about it
 * @example sentenceFor(Object.assign(new Error(), { code: "ENOSPC" })) // "The disk is full. …"
 */
export function sentenceFor(error) {
  if (error instanceof Failure) return error.message;
  const code = codeOf(error);
  const path = pathOf(error);
  if (code === "ENOSPC" || code === "EDQUOT" || isFullDatabase(error)) return diskIsFull;
  if (code === "EROFS")
    return `${path} lies on a disk that cannot be written to. Copy the folder elsewhere, then start again.`;
  if (code === "EACCES" || code === "EPERM") {
    return `This account may not use ${path}. Give the folder to it (chown -R "$(id -un)" .) or start as its owner.`;
  }
  return null;
}

/**
 * The sentence for the end of a program's log, where the reason is one that its log states; null otherwise.
 *
 * @param {string} log the last lines of a log
 * @returns {string | null}
 */
export function sentenceForLog(log) {
  if (/No space left on device|Disk is full|ENOSPC|OS errno 28|errno: 28|with error 28/i.test(log)) {
    return diskIsFull;
  }
  if (/Permission denied|EACCES|OS errno 13|errno: 13|with error 13/i.test(log)) {
    return 'This account may not use the data folder .commonweigh. Give it back (chown -R "$(id -un)" .commonweigh) or start as its owner.';
  }
  return null;
}

/** How the database puts it: its errors 1005, 1021 and 1114. @param {unknown} error */
function isFullDatabase(error) {
  return error instanceof Error && /No more room in record file|Disk full|The table '.*' is full/.test(error.message);
}

/** @param {unknown} error */
function codeOf(error) {
  return typeof error === "object" && error !== null && "code" in error ? String(error.code) : "";
}

/** @param {unknown} error */
function pathOf(error) {
  return typeof error === "object" && error !== null && "path" in error ? String(error.path) : "the project folder";
}
