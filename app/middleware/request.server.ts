import { randomBytes, randomUUID } from "node:crypto";
import type { MiddlewareFunction } from "react-router";
import { nonceContext, requestIdContext } from "#app/context.ts";
import { log } from "#app/lib/log.server.ts";

/** Headers every answer of the application carries; documents set a wider content policy of their own. */
const defaults: Record<string, string> = {
  "Cache-Control": "private, no-store",
  "Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'",
  "Referrer-Policy": "same-origin",
  "X-Content-Type-Options": "nosniff",
  "X-Frame-Options": "DENY",
  Vary: "Cookie",
};

/** Name the request, set the default headers on its answer, and write one line about it. */
export const requestMiddleware: MiddlewareFunction<Response> = async ({ context, request, pattern }, next) => {
  const requestId = randomUUID();
  context.set(requestIdContext, requestId);
  context.set(nonceContext, randomBytes(16).toString("base64"));
  const startedAt = performance.now();
  const response = await next();
  for (const [name, value] of Object.entries(defaults)) {
    if (!response.headers.has(name)) response.headers.set(name, value);
  }
  response.headers.set("X-Request-Id", requestId);
  // The pattern, not the address: addresses of invitations hold secrets.
  log.info({
    requestId,
    method: request.method,
    pattern,
    status: response.status,
    ms: Math.round(performance.now() - startedAt),
  });
  return response;
};
