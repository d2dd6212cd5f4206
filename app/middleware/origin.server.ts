import type { MiddlewareFunction } from "react-router";
import { env } from "#app/lib/env.server.ts";
import { badRequest, forbidden } from "#app/lib/errors.ts";
import { log } from "#app/lib/log.server.ts";

const safeMethods = ["GET", "HEAD"];
const bodyTypes = ["application/x-www-form-urlencoded", "multipart/form-data", "application/json"];

function hasBody({ headers }: Request) {
  return Number(headers.get("content-length") ?? 0) > 0 || headers.has("transfer-encoding");
}

/**
 * Refuse changes that another site asks for. The framework checks pages only; this covers every address, every unsafe
 * method. A program with a bearer token has no cookie to abuse and sends no Origin: it is let through to its own door.
 */
export const originMiddleware: MiddlewareFunction<Response> = ({ request }) => {
  const hasToken = /^bearer /i.test(request.headers.get("authorization") ?? "");
  if (hasToken && request.headers.has("cookie")) throw badRequest("Send a token or a session, not both.");
  if (safeMethods.includes(request.method)) return;
  if (!hasToken) {
    const origin = request.headers.get("origin");
    const site = request.headers.get("sec-fetch-site");
    const isOurs = origin === null ? site === "same-origin" : origin === env.publicOrigin;
    if (!isOurs || site === "cross-site") {
      log.warn({ event: "origin.refused" }, "a change asked for by another site");
      throw forbidden("This change was asked for by another site, so it was not made.");
    }
    const type = request.headers.get("content-type")?.split(";")[0]?.trim().toLowerCase();
    // A change may need no words: sent without a body, it has no type either.
    const isAccepted = type === undefined ? !hasBody(request) : bodyTypes.includes(type);
    if (!isAccepted) throw badRequest("Only forms and JSON are taken here.");
  }
};
