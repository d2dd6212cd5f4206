import { type MiddlewareFunction, redirect } from "react-router";
import { type Actor, actorContext, type PersonActor, requestIdContext, visitorContext } from "#app/context.ts";
import { sessionCookie } from "#app/lib/cookies.server.ts";
import { env } from "#app/lib/env.server.ts";
import { forbidden, notFound, unauthenticated } from "#app/lib/errors.ts";
import { log } from "#app/lib/log.server.ts";
import { equalSecrets } from "#app/lib/secrets.server.ts";
import { findActorBySession } from "#app/services/sessions.server.ts";
import { findActorByToken } from "#app/services/tokens.server.ts";
import { rulesByPattern } from "./access.ts";

async function readVisitor(request: Request, requestId: string): Promise<PersonActor | null> {
  const token: unknown = await sessionCookie.parse(request.headers.get("cookie"));
  return typeof token === "string" ? findActorBySession(token, requestId) : null;
}

async function readBearer(request: Request, requestId: string): Promise<Actor | null> {
  const match = /^Bearer ([\w-]{20,200})$/.exec(request.headers.get("authorization") ?? "");
  if (!match?.[1]) return null;
  if (equalSecrets(match[1], env.workerToken)) return { kind: "worker", role: "worker", requestId };
  return findActorByToken(match[1], requestId);
}

/**
 * Send a signed-out visitor to sign in, and back to the same page. A form that was being sent comes back to its page
 * too: the page keeps what was typed (see components/forms/kept-form.tsx) and says that nothing was sent.
 */
function toSignIn(request: Request, url: URL) {
  const isChange = !["GET", "HEAD"].includes(request.method);
  const query = new URLSearchParams({ returnTo: url.pathname + url.search });
  if (isChange) query.set("expired", "1");
  return redirect(`/login?${query}`);
}

/** Who is asking, and may they? The one place that decides, for pages, their data, changes and files alike. */
export const accessMiddleware: MiddlewareFunction<Response> = async ({ context, pattern, request, url }) => {
  const requestId = context.get(requestIdContext);
  const rule = rulesByPattern.get(`/${pattern.replace(/^\//, "")}`);
  if (!rule) throw notFound("page");

  if (rule === "public") {
    context.set(visitorContext, await readVisitor(request, requestId));
    return;
  }
  context.set(visitorContext, null);
  let actor: Actor | null;
  if (rule.door === "token") {
    actor = await readBearer(request, requestId);
    if (!actor) throw unauthenticated("A valid token is needed: Authorization: Bearer, and the token.");
  } else {
    const visitor = await readVisitor(request, requestId);
    if (!visitor) throw toSignIn(request, url);
    context.set(visitorContext, visitor);
    actor = visitor;
  }
  const allowed = ["GET", "HEAD"].includes(request.method) ? rule.read : rule.write;
  if (!allowed.includes(actor.role)) {
    log.warn({ event: "access.denied", requestId, role: actor.role, pattern, method: request.method }, "denied");
    throw forbidden("Your role does not include this page. If you need it, ask your coordinator.");
  }
  context.set(actorContext, actor);
};
