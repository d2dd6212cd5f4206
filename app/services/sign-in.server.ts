import { createHash } from "node:crypto";
import { createRemoteJWKSet, jwtVerify } from "jose";
import { Authenticator } from "remix-auth";
import { CodeChallengeMethod, OAuth2RequestError, OAuth2Strategy } from "remix-auth-oauth2";
import { Op } from "sequelize";
import { z } from "zod";
import { minuteMs, now } from "#app/lib/clock.server.ts";
import { env } from "#app/lib/env.server.ts";
import { reasonOf } from "#app/lib/error-reason.ts";
import { log } from "#app/lib/log.server.ts";
import { safeReturnTo } from "#app/lib/return-address.ts";
import { sha256 } from "#app/lib/secrets.server.ts";
import { SignInAttempt } from "#app/models/sign-in-attempt.server.ts";
import { type Identity, openAccount } from "./accounts.server.ts";

const cookieName = env.isSecure ? "__Host-oidc" : "oidc";
const attemptMs = 5 * minuteMs;
const Metadata = z.object({
  issuer: z.string(),
  authorization_endpoint: z.url(),
  token_endpoint: z.url(),
  jwks_uri: z.url(),
  end_session_endpoint: z.url().optional(),
});
const Claims = z.object({
  sub: z.string().min(1).max(190),
  nonce: z.string(),
  name: z.string().min(1).max(120),
  email: z.email().max(254),
  email_verified: z.boolean().optional(),
});

/** Worked out from the state, which is random for each attempt and bound to the browser by a cookie: nothing to store. */
function nonceOf(state: string) {
  return createHash("sha256").update(`nonce|${state}`).digest("base64url");
}

class OidcStrategy extends OAuth2Strategy<Identity> {
  protected override authorizationParams(params: URLSearchParams) {
    const extended = new URLSearchParams(params);
    extended.set("nonce", nonceOf(extended.get("state") ?? ""));
    return extended;
  }
}

async function discover() {
  const response = await fetch(`${env.oidc.issuer}/.well-known/openid-configuration`, {
    signal: AbortSignal.timeout(5000),
    redirect: "error",
  });
  if (!response.ok) throw new Error(`The sign-in service answered ${response.status}.`);
  const metadata = Metadata.parse(await response.json());
  if (metadata.issuer !== env.oidc.issuer) throw new Error("The sign-in service names another issuer.");
  const endpoints = [metadata.authorization_endpoint, metadata.token_endpoint, metadata.jwks_uri];
  if (endpoints.some((endpoint) => new URL(endpoint).origin !== env.oidc.issuer)) {
    throw new Error("The sign-in service names endpoints on another host.");
  }

  const keys = createRemoteJWKSet(new URL(metadata.jwks_uri), { timeoutDuration: 5000 });
  const strategy = new OidcStrategy(
    {
      clientId: env.oidc.clientId,
      clientSecret: env.oidc.clientSecret,
      authorizationEndpoint: metadata.authorization_endpoint,
      tokenEndpoint: metadata.token_endpoint,
      redirectURI: `${env.publicOrigin}/auth/callback`,
      scopes: ["openid", "profile", "email"],
      codeChallengeMethod: CodeChallengeMethod.S256,
      cookie: {
        name: cookieName,
        httpOnly: true,
        sameSite: "Lax",
        path: "/",
        maxAge: attemptMs / 1000,
        ...(env.isSecure ? { secure: true as const } : {}),
      },
    },
    async ({ tokens, request }) => {
      const { payload } = await jwtVerify(tokens.idToken(), keys, {
        issuer: env.oidc.issuer,
        audience: env.oidc.clientId,
        algorithms: ["RS256", "ES256"],
        clockTolerance: 60,
        maxTokenAge: "10m",
        requiredClaims: ["sub", "nonce", "iat", "exp"],
      });
      if (Array.isArray(payload.aud) && payload.aud.length > 1 && payload.azp !== env.oidc.clientId) {
        throw new Error("The ID token is meant for several parties and names another as its bearer.");
      }
      const claims = Claims.parse(payload);
      const state = new URL(request.url).searchParams.get("state") ?? "";
      if (claims.nonce !== nonceOf(state)) throw new Error("The ID token belongs to another attempt.");
      return {
        issuer: env.oidc.issuer,
        subject: claims.sub,
        name: claims.name,
        email: claims.email,
        isEmailVerified: claims.email_verified === true,
      };
    },
  );
  const authenticator = new Authenticator<Identity>();
  authenticator.use(strategy, "oidc");
  return { authenticator, metadata };
}

let discovered: ReturnType<typeof discover> | undefined;

/** Looked up at the first sign-in and kept; a failure is tried again, so the program starts without the service. */
function provider() {
  discovered ??= discover().catch((error: unknown) => {
    discovered = undefined;
    throw error;
  });
  return discovered;
}

/** The same request on our own origin, so that a forged Host header reaches nothing. */
function onOurOrigin(request: Request, path: string) {
  return new Request(`${env.publicOrigin}${path}`, { headers: { cookie: request.headers.get("cookie") ?? "" } });
}

type Start = { returnTo: string | null; invitationHash: string | null; hint: string | null };

/**
 * Begin a sign-in: note where to go afterwards, and send the browser to the sign-in service.
 *
 * @returns the redirect, or null when the sign-in service is away
 */
export async function startSignIn(request: Request, start: Start): Promise<Response | null> {
  try {
    const { authenticator } = await provider();
    await authenticator.authenticate("oidc", onOurOrigin(request, "/auth/start"));
    throw new Error("The strategy did not redirect.");
  } catch (outcome) {
    if (!(outcome instanceof Response)) {
      log.error({ reason: reasonOf(outcome) }, "sign-in service away");
      return null;
    }
    const address = new URL(outcome.headers.get("Location") ?? "");
    const state = address.searchParams.get("state") ?? "";
    if (start.hint !== null && /^[\w.@-]{1,120}$/.test(start.hint)) {
      // A named person may differ from the one the service remembers.
      address.searchParams.set("login_hint", start.hint);
      address.searchParams.set("prompt", "login");
    }
    await SignInAttempt.destroy({
      where: { createdAt: { [Op.lt]: new Date(now().getTime() - 2 * attemptMs) } },
      limit: 500,
    });
    await SignInAttempt.create({
      stateHash: sha256(state),
      returnTo: safeReturnTo(start.returnTo, env.publicOrigin),
      invitationHash: start.invitationHash,
      createdAt: now(),
    });
    const headers = new Headers(outcome.headers);
    headers.set("Location", address.href);
    return new Response(null, { status: 302, headers });
  }
}

export type SignInOutcome =
  | { ok: true; sessionToken: string; returnTo: string }
  | { ok: false; reason: "start-again" | "refused" | "no-account" | "shut-out" | "invitation-spent" };

/** Each attempt is good for one callback within five minutes. */
async function spendAttempt(state: string): Promise<SignInAttempt | null> {
  const stateHash = sha256(state);
  const [used] = await SignInAttempt.update(
    { usedAt: now() },
    { where: { stateHash, usedAt: null, createdAt: { [Op.gt]: new Date(now().getTime() - attemptMs) } } },
  );
  return used === 1 ? SignInAttempt.findByPk(stateHash) : null;
}

/**
 * Finish a sign-in: check what came back, find or open the account, start a session.
 *
 * @returns the session's secret and where to go, or why not
 */
export async function finishSignIn(request: Request): Promise<SignInOutcome> {
  const url = new URL(request.url);
  const state = url.searchParams.get("state");
  const issuer = url.searchParams.get("iss");
  // RFC 9207: an answer from another issuer is refused before its code is redeemed.
  if (!state || (issuer !== null && issuer !== env.oidc.issuer)) return { ok: false, reason: "start-again" };
  if (!url.searchParams.get("code") && !url.searchParams.get("error")) return { ok: false, reason: "start-again" };
  const attempt = await spendAttempt(state);
  if (!attempt) return { ok: false, reason: "start-again" };
  let identity: Identity;
  try {
    const { authenticator } = await provider();
    identity = await authenticator.authenticate("oidc", onOurOrigin(request, `/auth/callback${url.search}`));
  } catch (error) {
    log.warn({ event: "sign-in.failed", reason: reasonOf(error) }, "sign-in failed");
    return { ok: false, reason: error instanceof OAuth2RequestError ? "refused" : "start-again" };
  }
  const opened = await openAccount(identity, attempt.invitationHash, request.headers.get("user-agent") ?? "");
  if (!opened.ok) {
    log.warn({ event: "sign-in.denied", reason: opened.reason }, "sign-in denied");
    return opened;
  }
  log.info({ event: "sign-in.ok", userId: opened.userId }, "signed in");
  return { ok: true, sessionToken: opened.sessionToken, returnTo: attempt.returnTo };
}

/** Set-Cookie lines that remove every attempt's cookie from the browser. */
export function clearedAttemptCookies(request: Request): string[] {
  const names = (request.headers.get("cookie") ?? "").split(";").map((part) => part.split("=")[0]?.trim() ?? "");
  return names
    .filter((name) => name.startsWith(`${cookieName}:`) && /^[\w:-]+$/.test(name))
    .map((name) => `${name}=; Path=/; Max-Age=0; HttpOnly; SameSite=Lax${env.isSecure ? "; Secure" : ""}`);
}

/** Where the sign-in service ends its own session; null when it is away or has no such place. */
export async function signOutAddress(): Promise<string | null> {
  try {
    const { metadata } = await provider();
    if (!metadata.end_session_endpoint) return null;
    const address = new URL(metadata.end_session_endpoint);
    address.searchParams.set("client_id", env.oidc.clientId);
    address.searchParams.set("post_logout_redirect_uri", `${env.publicOrigin}/`);
    return address.href;
  } catch {
    return null;
  }
}
