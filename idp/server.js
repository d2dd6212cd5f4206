import { mkdirSync } from "node:fs";
import { createServer } from "node:http";
import { faultNames } from "./faults.js";
import { loadKeys } from "./keys.js";
import { errorPage, pagePolicy, signInPage } from "./pages.js";
import { peopleOf } from "./people.js";
import { createProvider } from "./provider.js";

const {
  OIDC_ISSUER,
  PUBLIC_ORIGIN,
  OIDC_CLIENT_ID,
  OIDC_CLIENT_SECRET,
  IDP_STATE_DIR = ".commonweigh",
  IDP_FAULTS,
  IDP_DEMO_PEOPLE,
} = process.env;
const bodyLimitCharacters = 10_000;

mkdirSync(IDP_STATE_DIR, { recursive: true });
let fault = faultNames.includes(IDP_FAULTS) ? IDP_FAULTS : null;
const people = peopleOf({ folder: IDP_STATE_DIR, hasDemoPeople: IDP_DEMO_PEOPLE !== "0" });
const provider = createProvider({
  issuer: OIDC_ISSUER,
  applicationOrigin: PUBLIC_ORIGIN,
  clientId: OIDC_CLIENT_ID,
  clientSecret: OIDC_CLIENT_SECRET,
  keys: await loadKeys(IDP_STATE_DIR),
  people,
  fault: () => fault,
});
const answerAsProvider = provider.callback();

const server = createServer(async (request, response) => {
  const path = (request.url ?? "").split("?")[0];
  try {
    if (IDP_FAULTS && path === "/_fault" && request.method === "POST") return await switchFault(request, response);
    if (fault === "down") return send(response, 503, "text/plain", "Down, as asked for by a test.\n");
    if (/^\/interaction\/[\w-]+$/.test(path)) return await interact(request, response);
    await answerAsProvider(request, response);
  } catch (error) {
    // A sign-in that is over, a cookie that is gone: the page says so; the log has the rest.
    console.error(error.error_description ?? error);
    send(response, 400, "text/html", errorPage(PUBLIC_ORIGIN, "invalid_request"));
  }
});

/** The page that asks who is there, and its answer. */
async function interact(request, response) {
  const interaction = await provider.interactionDetails(request, response);
  if (request.method === "POST") {
    const form = new URLSearchParams(await readBody(request));
    const entered = { name: form.get("name") ?? "", email: form.get("email") ?? "" };
    const known = people.find(form.get("sub"));
    const outcome = known ? { person: known } : people.register(entered);
    if (outcome.person) return await finish(request, response, interaction, outcome.person.sub);
    return askWho(response, 400, outcome.problem, entered);
  }
  const hinted = people.find(interaction.params.login_hint);
  if (hinted) return await finish(request, response, interaction, hinted.sub);
  return askWho(response, 200, null, { name: "", email: "" });
}

function askWho(response, status, problem, entered) {
  send(
    response,
    status,
    "text/html",
    signInPage({ demo: people.demo(), registered: people.registered(), problem, entered }),
  );
}

async function finish(request, response, interaction, sub) {
  const session = interaction.session ? await provider.Session.findByUid(interaction.session.uid) : undefined;
  if (session?.accountId && session.accountId !== sub) {
    // The provider would show a sign-out page in between, which needs a script. The browser's session is handed over
    // instead, without what the person before had granted.
    session.loginAccount({ accountId: sub });
    session.authorizations = {};
    await session.persist();
    interaction.session = { ...interaction.session, accountId: sub };
    await interaction.persist();
  }
  await provider.interactionFinished(
    request,
    response,
    { login: { accountId: sub } },
    { mergeWithLastSubmission: false },
  );
}

async function switchFault(request, response) {
  const { fault: wanted } = JSON.parse(await readBody(request));
  if (wanted !== null && !faultNames.includes(wanted))
    return send(response, 400, "text/plain", `Unknown; known are ${faultNames.join(", ")}.\n`);
  fault = wanted;
  return send(response, 200, "application/json", JSON.stringify({ fault }));
}

async function readBody(request) {
  let body = "";
  for await (const chunk of request.setEncoding("utf8")) {
    body += chunk;
    if (body.length > bodyLimitCharacters) throw new RangeError("a form this long is none of ours");
  }
  return body;
}

function send(response, status, type, body) {
  if (response.headersSent) return;
  response.writeHead(status, {
    "Content-Type": `${type}; charset=utf-8`,
    "Content-Security-Policy": pagePolicy(PUBLIC_ORIGIN),
    "X-Content-Type-Options": "nosniff",
    "Referrer-Policy": "no-referrer",
    "Cache-Control": "no-store",
  });
  response.end(body);
}

const { hostname, port } = new URL(OIDC_ISSUER);
server.listen(Number(port), hostname);
for (const signal of ["SIGTERM", "SIGINT", "disconnect"]) {
  process.on(signal, () => {
    server.close(() => process.exit(0));
    server.closeAllConnections();
  });
}
