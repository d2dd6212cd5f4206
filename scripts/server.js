import { createServer as createHttpServer } from "node:http";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import { createRequestHandler } from "@react-router/express";
import express from "express";
import { preferCompressed } from "./compressed-assets.js";
import { isUploadOfFile, refusalOf } from "./refusal.js";
import { defaultHeaders, fillInHeaders, headersFor, unreadableRequestAnswer } from "./response-headers.js";
import { projectFolder } from "./settings.js";
import { stopOnRequest } from "./stop.js";

const client = join(projectFolder, "build", "client");

/**
 * The application behind plain HTTP, not listening yet.
 *
 * @param {{ build: import("react-router").ServerBuild, origin: string }} given origin: the public address, the only Host served
 * @returns {import("node:http").Server}
 */
export function createServer({ build, origin }) {
  const address = new URL(origin);
  const headers = defaultHeaders(address);
  const app = express().disable("x-powered-by").set("trust proxy", "loopback");

  app.use((request, response, next) => {
    fillInHeaders(response, headersFor(headers, request.path));
    response.on("finish", () => discardRest(request));
    const refusal = refusalOf(request, address.host);
    if (refusal !== null) return sendPlain(response.set(refusal.headers ?? {}), refusal.status, refusal.sentence);
    for (const name of Object.keys(request.headers)) {
      if (/^x-(react-router|remix|user)-/.test(name)) delete request.headers[name];
    }
    if (!isUploadOfFile(request)) endWhenSlow(request);
    // The address is the configured one, never what a header claims.
    request.headers["x-forwarded-proto"] = address.protocol.slice(0, -1);
    delete request.headers["x-forwarded-host"];
    next();
  });
  const files = { index: false, redirect: false };
  app.use("/assets", preferCompressed(join(client, "assets")));
  app.use("/assets", express.static(join(client, "assets"), { ...files, immutable: true, maxAge: "1y" }));
  app.use(express.static(client, { ...files, maxAge: 0 }));
  app.use(createRequestHandler({ build, mode: "production" }));
  app.use((error, _request, response, next) => {
    console.error(error);
    if (response.headersSent) return next(error);
    sendPlain(response, 500, "Something went wrong on our side. Try again in a minute.");
  });

  const limits = { requestTimeout: 600_000, headersTimeout: 10_000, keepAliveTimeout: 65_000 };
  return createHttpServer(limits, app).on("clientError", (error, socket) => {
    if (socket.writable) socket.end(unreadableRequestAnswer(error.code, headers));
  });
}

/** Left unread, what still comes of a form that is answered already would keep the connection's next request waiting. */
function discardRest(request) {
  request.removeAllListeners("data");
  request.resume();
}

/** Only files may take their time: whoever sends anything else byte by byte is cut off after half a minute. */
function endWhenSlow(request) {
  if (Number(request.headers["content-length"] ?? 0) === 0) return;
  const limit = setTimeout(() => {
    if (!request.complete) request.destroy();
  }, 30_000);
  request.once("close", () => clearTimeout(limit));
}

function sendPlain(response, status, sentence) {
  response.status(status).type("text/plain").send(`${sentence}\n`);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const build = await import(pathToFileURL(join(projectFolder, "build", "server", "index.js")).href);
  const server = createServer({ build, origin: process.env.PUBLIC_ORIGIN });
  server.listen(Number(process.env.PORT), process.env.HOST ?? "127.0.0.1");
  stopOnRequest(server, () => globalThis.__commonweigh?.close?.());
}
