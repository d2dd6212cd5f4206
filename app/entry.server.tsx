import { PassThrough } from "node:stream";
import { createReadableStreamFromReadable } from "@react-router/node";
import { isbot } from "isbot";
import { renderToPipeableStream } from "react-dom/server";
import { type EntryContext, isRouteErrorResponse, type RouterContextProvider, ServerRouter } from "react-router";
import { nonceContext, requestIdContext } from "#app/context.ts";
import { laneStripSvg } from "#app/components/charts/lane-strip-svg.server.ts";
import { DrawStripContext } from "#app/components/charts/static-strip.tsx";
import { NonceContext } from "#app/components/layout/nonce.ts";
import { env } from "#app/lib/env.server.ts";
import { placesOf, reasonOf } from "#app/lib/error-reason.ts";
import { log } from "#app/lib/log.server.ts";

export const streamTimeout = 5_000;

type Handled = { request: Request; context: Readonly<RouterContextProvider> };

/** Where unexpected errors of loaders, actions and middleware are written down. */
export function handleError(error: unknown, { request, context }: Handled) {
  if (request.signal.aborted || isRouteErrorResponse(error)) return;
  log.error({ requestId: context.get(requestIdContext), reason: reasonOf(error), at: placesOf(error) });
}

function contentPolicy(nonce: string) {
  return [
    "default-src 'none'",
    `script-src 'self' 'nonce-${nonce}'`,
    `style-src 'self' 'nonce-${nonce}'`,
    "img-src 'self' data:",
    "font-src 'self'",
    "connect-src 'self'",
    "manifest-src 'self'",
    "worker-src 'self'",
    // Browsers apply this to the redirect after a form, too: signing in and out goes by the sign-in service.
    `form-action 'self' ${env.oidc.issuer}`,
    "base-uri 'none'",
    "object-src 'none'",
    "frame-ancestors 'none'",
  ].join("; ");
}

export default function handleRequest(
  request: Request,
  status: number,
  headers: Headers,
  routerContext: EntryContext,
  loadContext: RouterContextProvider,
) {
  const nonce = loadContext.get(nonceContext);
  headers.set("Content-Type", "text/html; charset=utf-8");
  headers.set("Content-Security-Policy", contentPolicy(nonce));
  if (request.method === "HEAD") return new Response(null, { status, headers });

  return new Promise<Response>((resolve, reject) => {
    let isShellReady = false;
    let isFailed = false;
    const ready = isbot(request.headers.get("user-agent") ?? "") ? "onAllReady" : "onShellReady";
    const { pipe, abort } = renderToPipeableStream(
      <NonceContext value={nonce}>
        <DrawStripContext value={laneStripSvg}>
          <ServerRouter context={routerContext} url={request.url} nonce={nonce} />
        </DrawStripContext>
      </NonceContext>,
      {
        nonce,
        [ready]() {
          isShellReady = true;
          const body = new PassThrough({
            final(callback) {
              clearTimeout(timer);
              callback();
            },
          });
          resolve(new Response(createReadableStreamFromReadable(body), { headers, status: isFailed ? 500 : status }));
          pipe(body);
        },
        onShellError: reject,
        onError(error: unknown) {
          isFailed = true;
          if (isShellReady) log.error({ requestId: loadContext.get(requestIdContext), reason: reasonOf(error) });
        },
      },
    );
    const timer = setTimeout(() => abort(), streamTimeout + 1000);
  });
}
