import { connect } from "node:net";
import { join } from "node:path";
import { lastWords, startProgram, stopPrograms, waitUntilAnswering } from "./children.js";
import { Failure } from "./failures.js";
import { appEnvironment, plainEnvironment } from "./settings.js";

/**
 * Start the four programs of a network beside its database, and wait until each of them really answers.
 *
 * @param {object} given
 * @param {string} given.root the checkout
 * @param {string} given.folder for logs, caught mail and the provider's state
 * @param {ReturnType<typeof import("./settings.js").loadSettings>} given.settings
 * @param {{ app: number, idp: number, mailPage: number, smtp: number }} given.ports
 * @param {{ host: string, port: number }} given.mariadb
 * @param {string} given.database
 * @param {boolean} given.devPages
 * @param {boolean} given.hasDemoPeople
 * @param {string} [given.faults] "1" lets tests make the provider fail
 * @param {string} [given.logLevel] of the application; "info" when not given
 * @param {AbortSignal} [given.signal] stops the waiting, and what was started
 * @returns {Promise<{ origin: string, idpOrigin: string, mailOrigin: string, env: Record<string, string>,
 *   appPid: number, firstEnd: Promise<string>, stop: () => Promise<void> }>} firstEnd: the last words of the first program to end by itself
 * @throws {Failure} when one does not come up; the others are stopped first
 */
export async function startPrograms(given) {
  const { root, folder, ports, hasDemoPeople, faults = "", signal } = given;
  const env = appEnvironment(given);
  const logFolder = join(folder, "logs");
  const start = (title, script, more = {}) =>
    startProgram({ title, script, root, logFolder, env: { ...plainEnvironment(), ...env, ...more } });
  const origin = env.PUBLIC_ORIGIN;
  const mailOrigin = `http://127.0.0.1:${ports.mailPage}`;

  const idp = start("identity provider", "idp/server.js", {
    IDP_STATE_DIR: folder,
    IDP_DEMO_PEOPLE: hasDemoPeople ? "1" : "0",
    IDP_FAULTS: faults,
  });
  const mail = start("mail catcher", "scripts/mail-catcher.js", {
    MAIL_FILE: join(folder, "mail.jsonl"),
    MAIL_PAGE_PORT: String(ports.mailPage),
  });
  const app = start("application", "scripts/server.js");
  const worker = start("worker", "scripts/worker.js");
  const inStoppingOrder = [worker, app, mail, idp];
  const stop = () => stopPrograms(inStoppingOrder);

  try {
    await abortable(
      signal,
      Promise.all([
        waitUntilAnswering(
          idp,
          async () => (await getJson(`${env.OIDC_ISSUER}/.well-known/openid-configuration`)).issuer === env.OIDC_ISSUER,
        ),
        waitUntilAnswering(
          mail,
          async () => (await isOk(mailOrigin)) && (await smtpBanner(ports.smtp)).startsWith("220 "),
        ),
        waitUntilAnswering(app, () => isOk(`${origin}/readyz`)),
        // It says so itself, after the application has accepted its first turn.
        waitUntilAnswering(worker, ({ isReady }) => isReady, 60_000),
      ]),
    );
  } catch (error) {
    await stop();
    throw error;
  }
  const firstEnd = Promise.race(
    inStoppingOrder.map((program) => program.ended.then(() => lastWords(program, "has ended"))),
  );
  return { origin, idpOrigin: env.OIDC_ISSUER, mailOrigin, env, appPid: app.child.pid ?? 0, firstEnd, stop };
}

/** @template T @param {AbortSignal | undefined} signal @param {Promise<T>} work @returns {Promise<T>} */
function abortable(signal, work) {
  if (signal === undefined) return work;
  const aborted = new Promise((_resolve, reject) => {
    const give = () => reject(new Failure("Stopped before everything was up."));
    if (signal.aborted) give();
    signal.addEventListener("abort", give, { once: true });
  });
  return Promise.race([work, aborted]);
}

async function isOk(url) {
  const response = await fetch(url, { signal: AbortSignal.timeout(5_000), redirect: "error" });
  await response.arrayBuffer();
  return response.status === 200;
}

async function getJson(url) {
  return (await fetch(url, { signal: AbortSignal.timeout(5_000) })).json();
}

/** The first line that a mail server says by itself. @param {number} port @returns {Promise<string>} */
function smtpBanner(port) {
  return new Promise((resolve, reject) => {
    const socket = connect(port, "127.0.0.1");
    socket.setTimeout(5_000, () => socket.destroy(new Error("silent")));
    socket.once("error", reject);
    socket.once("data", (data) => {
      resolve(data.toString("latin1"));
      socket.end("QUIT\r\n");
    });
  });
}
