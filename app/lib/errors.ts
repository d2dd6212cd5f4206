import { data } from "react-router";

/** What every error page and every error of the API carries. `message` is a whole sentence with what to do next. */
export type PublicError = { code: string; message: string };

function publicError(status: number, statusText: string, code: string, message: string) {
  return data<PublicError>({ code, message }, { status, statusText });
}

/** 404, also for another town's record: the answer is the same as for one that never was. */
export function notFound(what: string, hint = "It may have moved, or the address is mistyped.") {
  return publicError(404, "Not Found", "not-found", `There is no such ${what} here. ${hint}`);
}

/** 404 for an invitation that is unknown, used or past its seven days: the answer is the same for all three. */
export function invitationGone() {
  return notFound(
    "open invitation",
    "It has been used, or its seven days are over. Ask your coordinator for a new one.",
  );
}

/** 403 */
export function forbidden(message: string) {
  return publicError(403, "Forbidden", "forbidden", message);
}

/** 409: somebody was first. */
export function conflict(message: string) {
  return publicError(409, "Conflict", "conflict", message);
}

/** 401, for doors that answer with JSON. */
export function unauthenticated(message: string) {
  return publicError(401, "Unauthorized", "unauthenticated", message);
}

/** 400 */
export function badRequest(message: string) {
  return publicError(400, "Bad Request", "bad-request", message);
}

/** Whether `value` is the body that the functions above make. */
export function isPublicError(value: unknown): value is PublicError {
  return (
    typeof value === "object" &&
    value !== null &&
    "code" in value &&
    typeof value.code === "string" &&
    "message" in value &&
    typeof value.message === "string"
  );
}
