import { randomBytes, randomUUID } from "node:crypto";
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from "vitest";
import { freeOrigin, startApp, type TestApp } from "#tests/support/app.ts";
import { Browser } from "#tests/support/http-browser.ts";
import { aPerson, aTown, digest, type Town } from "#tests/support/factories.ts";
import { cookieOf } from "#tests/support/http.ts";
import { type Idp, startIdp } from "#tests/support/idp.ts";
import { countOf, insert, minutesFromNow, rows } from "#tests/support/rows.ts";

/* Signing in, against the project's sign-in service with its faults, in nothing but redirects and cookies. */

let app: TestApp;
let idp: Idp;
let town: Town;
let browser: Browser;

beforeAll(async () => {
  const origin = await freeOrigin();
  idp = await startIdp(origin);
  app = await startApp({ origin, issuer: idp.issuer, clientSecret: idp.clientSecret });
  town = await aTown(app);
  await aPerson(app, { role: "director", town, subject: "maren.oake", email: "maren.oake@quillbrook.example" });
  await aPerson(app, { role: "recorder", town, subject: "dell.farrow" });
  const shutOut = await aPerson(app, { role: "recorder", town, subject: "tobin.ashe" });
  await app.db.query("UPDATE user_account SET is_active = 0 WHERE id = ?", [shutOut.id]);
}, 60_000);

beforeEach(() => {
  browser = new Browser();
});

afterEach(() => idp.setFault(null));

afterAll(async () => {
  const faults = await app.close();
  await idp.stop();
  expect(faults).toEqual([]);
});

const isCallback = (url: URL) => url.origin === app.origin && url.pathname === "/auth/callback";
const startOf = (subject: string, returnTo = "/account") =>
  `${app.origin}/auth/start?${new URLSearchParams({ hint: subject, returnTo })}`;
const sessionCount = () => countOf(app, "session");

/** Everything up to the sign-in service's answer. @returns the callback's address, not visited yet */
async function upToCallback(subject: string) {
  const { url } = await browser.goTo(startOf(subject), isCallback);
  expect(url.pathname).toBe("/auth/callback");
  return url;
}

test("somebody with an account is signed in, and comes back to the page they asked for", async () => {
  const { url, answer } = await browser.goTo(startOf("maren.oake", "/account?from=mail"));
  expect([url.pathname, url.search, answer.status]).toEqual(["/account", "?from=mail", 200]);
  expect(answer.body).toContain(town.name);
});

test("the session's cookie is for this site alone and out of reach of scripts", async () => {
  const callback = await upToCallback("maren.oake");
  const { answer } = await browser.goTo(callback.href, () => true);
  const line = answer.headers["set-cookie"]?.find((cookie) => cookie.startsWith("sid=")) ?? "";
  expect(line.split("; ").slice(1).sort()).toEqual(["HttpOnly", "Path=/", "SameSite=Lax"]);
  const secret = JSON.parse(
    Buffer.from(decodeURIComponent(browser.cookies.get("sid") ?? ""), "base64").toString(),
  ) as string;
  expect(secret).toMatch(/^[\w-]{43}$/);
  expect(await countOf(app, `session WHERE token_hash = '${digest(secret)}'`)).toBe(1);
});

test("what goes to the sign-in service is bound to one attempt, and says nothing of the page", async () => {
  const { url, answer } = await browser.goTo(
    startOf("maren.oake", "/season/2024"),
    (next) => next.origin === idp.issuer,
  );
  const asked = Object.fromEntries(url.searchParams);
  expect(asked).toMatchObject({
    response_type: "code",
    client_id: "commonweigh",
    redirect_uri: `${app.origin}/auth/callback`,
    code_challenge_method: "S256",
    scope: "openid profile email",
  });
  expect(asked.state?.length).toBeGreaterThanOrEqual(22);
  expect(asked.nonce).toMatch(/^[\w-]{43}$/);
  expect(url.href).not.toContain("season");
  const attempt = answer.headers["set-cookie"]?.find((cookie) => cookie.startsWith("oidc:")) ?? "";
  expect(attempt).toMatch(/; HttpOnly/);
  expect(attempt).toMatch(/; SameSite=Lax/);
  expect(attempt).toMatch(/; Max-Age=300/);
  expect(await countOf(app, `sign_in_attempt WHERE state_hash = '${digest(asked.state ?? "")}'`)).toBe(1);
});

test("the cookies of the attempt are gone once it is over", async () => {
  await browser.goTo(startOf("maren.oake"), (next) => next.origin === idp.issuer);
  expect([...browser.cookies.keys()].filter((name) => name.startsWith("oidc:"))).toHaveLength(1);
  await browser.goTo(startOf("maren.oake"));
  expect([...browser.cookies.keys()].filter((name) => name.startsWith("oidc:"))).toEqual([]);
});

test.each(["badNonce", "badSignature", "wrongAudience", "wrongIssuer", "expired"])(
  "an ID token with the fault %s signs nobody in",
  async (fault) => {
    const callback = await upToCallback("maren.oake");
    const before = await sessionCount();
    await idp.setFault(fault);
    const { url, answer } = await browser.goTo(callback.href);
    expect([url.pathname, url.searchParams.get("problem"), answer.status]).toEqual(["/login", "start-again", 200]);
    expect(browser.cookies.has("sid")).toBe(false);
    expect(await sessionCount()).toBe(before);
  },
);

test("with the sign-in service down nobody gets in, and whoever is in stays in and gets out", async () => {
  const other = new Browser();
  await other.goTo(startOf("maren.oake"));
  const callback = await upToCallback("maren.oake");
  await idp.setFault("down");
  const { url } = await browser.goTo(callback.href);
  expect(url.pathname).toBe("/login");
  expect(browser.cookies.has("sid")).toBe(false);
  expect((await other.goTo(`${app.origin}/account`)).answer.status).toBe(200);
  await other.send(`${app.origin}/logout`, {}, () => true);
  expect((await other.goTo(`${app.origin}/account`)).url.pathname).toBe("/login");
});

test("an answer of the sign-in service is good once", async () => {
  const callback = await upToCallback("maren.oake");
  const cookies = [...browser.cookies];
  expect((await browser.goTo(callback.href)).url.pathname).toBe("/account");
  const before = await sessionCount();
  const replayer = new Browser();
  for (const [name, value] of cookies) replayer.cookies.set(name, value);
  expect((await replayer.goTo(callback.href)).url.searchParams.get("problem")).toBe("start-again");
  expect(replayer.cookies.has("sid")).toBe(false);
  expect(await sessionCount()).toBe(before);
});

test("another browser's answer signs nobody in here, and not there either afterwards", async () => {
  const callback = await upToCallback("maren.oake");
  const victim = new Browser();
  expect((await victim.goTo(callback.href)).url.searchParams.get("problem")).toBe("start-again");
  expect(victim.cookies.has("sid")).toBe(false);
  expect((await browser.goTo(callback.href)).url.searchParams.get("problem")).toBe("start-again");
});

test("an attempt is over after five minutes", async () => {
  const callback = await upToCallback("maren.oake");
  await app.db.query("UPDATE sign_in_attempt SET created_at = created_at - INTERVAL 301 SECOND WHERE used_at IS NULL");
  expect((await browser.goTo(callback.href)).url.searchParams.get("problem")).toBe("start-again");
});

test.each<[string, (callback: URL) => void, string]>([
  ["no state", (callback) => callback.searchParams.delete("state"), "start-again"],
  ["an unknown state", (callback) => callback.searchParams.set("state", "A".repeat(43)), "start-again"],
  ["no code", (callback) => callback.searchParams.delete("code"), "start-again"],
  ["a made-up code", (callback) => callback.searchParams.set("code", "A".repeat(43)), "refused"],
  ["another issuer", (callback) => callback.searchParams.set("iss", "http://127.0.0.1:1"), "start-again"],
  ["a state of 5,000 letters", (callback) => callback.searchParams.set("state", "A".repeat(5000)), "start-again"],
])("an answer with %s is refused", async (_what, spoil, problem) => {
  const callback = await upToCallback("maren.oake");
  const before = await sessionCount();
  spoil(callback);
  const { url, answer } = await browser.goTo(callback.href);
  expect([url.pathname, url.searchParams.get("problem"), answer.status]).toEqual(["/login", problem, 200]);
  expect(await sessionCount()).toBe(before);
});

test("the sign-in service's own words never reach the page", async () => {
  const callback = await upToCallback("maren.oake");
  callback.searchParams.delete("code");
  callback.searchParams.set("error", "access_denied");
  callback.searchParams.set("error_description", "<script>alert(1)</script>planted words");
  const { url, answer } = await browser.goTo(callback.href);
  expect(url.searchParams.get("problem")).toBe("refused");
  expect(answer.body).toContain("did not let you in");
  expect(answer.body).not.toContain("planted words");
});

test("an unknown word for the problem shows nothing of itself", async () => {
  for (const word of ["<b>x</b>", "constructor", "__proto__", "planted"]) {
    const { answer } = await browser.goTo(`${app.origin}/login?problem=${encodeURIComponent(word)}`);
    expect(answer.status).toBe(200);
    expect(answer.body).not.toContain("<b>x</b>");
    expect(answer.body).not.toContain("planted");
  }
});

test("somebody without an account, and somebody shut out, are told so and get no session", async () => {
  const before = [await sessionCount(), await countOf(app, "user_account")];
  expect((await browser.goTo(startOf("ruben.vale"))).url.searchParams.get("problem")).toBe("no-account");
  expect((await browser.goTo(startOf("tobin.ashe"))).url.searchParams.get("problem")).toBe("shut-out");
  expect([await sessionCount(), await countOf(app, "user_account")]).toEqual(before);
});

test("an account is known by issuer and subject, never by the mail address", async () => {
  await aPerson(app, { role: "coordinator", subject: "somebody-else", email: "ruben.vale@tarnvalley.example" });
  expect((await browser.goTo(startOf("ruben.vale"))).url.searchParams.get("problem")).toBe("no-account");
  await app.db.query(
    "UPDATE user_account SET issuer = 'http://127.0.0.1:2', subject = 'ruben.vale' WHERE subject = 'somebody-else'",
  );
  expect((await browser.goTo(startOf("ruben.vale"))).url.searchParams.get("problem")).toBe("no-account");
});

async function anInvitation(given: { days?: number } = {}) {
  const token = randomBytes(32).toString("base64url");
  await insert(app, "invitation", {
    token_hash: digest(token),
    client_ref: randomUUID(),
    name: "Hester Lund",
    email: "written.down@sample.example",
    role: "director",
    town_id: town.id,
    created_at: minutesFromNow(0),
    expires_at: minutesFromNow((given.days ?? 7) * 24 * 60),
  });
  return { token, page: `${app.origin}/invitations/${token}` };
}

/** Accept on the page, sign in at the service as somebody who has not been there, and stop before coming back. */
async function acceptAs(visitor: Browser, page: string, subject: string) {
  const asking = await visitor.send(page, {}, (url) => url.origin === idp.issuer);
  asking.url.searchParams.set("login_hint", subject);
  asking.url.searchParams.set("prompt", "login");
  return (await visitor.goTo(asking.url.href, isCallback)).url;
}

test("an invitation opens one account, for whoever accepts it first", async () => {
  const { token, page } = await anInvitation();
  const opened = await browser.goTo(page);
  expect(opened.answer.status).toBe(200);
  expect(opened.answer.body).toContain(`director of ${town.name}`);
  expect(await countOf(app, "invitation WHERE accepted_at IS NOT NULL")).toBe(0);

  const second = new Browser();
  const [first, later] = [await acceptAs(browser, page, "hester.lund"), await acceptAs(second, page, "ilse.tarrant")];
  expect((await browser.goTo(first.href)).url.pathname).toBe("/today");
  expect((await second.goTo(later.href)).url.searchParams.get("problem")).toBe("invitation-spent");
  expect((await browser.goTo(page)).answer.status).toBe(404);
  expect((await browser.send(page, {})).answer.status).toBe(404);

  const accounts = "SELECT issuer, role, town_id, email, is_active FROM user_account WHERE subject = 'hester.lund'";
  expect(await rows(app, accounts)).toEqual([
    { issuer: idp.issuer, role: "director", town_id: town.id, email: "hester.lund@fallowmere.example", is_active: 1 },
  ]);
  expect(await countOf(app, "user_account WHERE subject = 'ilse.tarrant'")).toBe(0);
  expect(await countOf(app, `invitation WHERE token_hash = '${digest(token)}' AND accepted_by_id IS NOT NULL`)).toBe(1);
  expect(await countOf(app, "audit_entry WHERE action = 'account.open'")).toBe(1);
});

test("the invitation's form is sent by a browser with its Origin, without a body if need be", async () => {
  const { page } = await anInvitation();
  const { pathname } = new URL(page);
  const opened = await app.ask(pathname);
  // Any stricter word than the header's would make browsers send the form below as Origin: null.
  expect(opened.body).not.toMatch(/<meta[^>]*name="referrer"/);
  expect(opened.headers["referrer-policy"]).toBe("same-origin");
  const answer = await app.ask(pathname, { method: "POST", headers: { origin: app.origin } });
  expect(answer.status).toBe(302);
  expect(answer.headers.location).toContain(`${idp.issuer}/auth?`);
});

test("an invitation past its days, cut short or made up is not there", async () => {
  const { page } = await anInvitation({ days: -1 });
  for (const address of [page, page.slice(0, -1), `${app.origin}/invitations/${"A".repeat(43)}`]) {
    expect((await browser.goTo(address)).answer.status).toBe(404);
    expect((await browser.send(address, {})).answer.status).toBe(404);
  }
});

test("signing in ends the session before it, and takes no secret that was planted", async () => {
  await browser.goTo(startOf("maren.oake"));
  const before = browser.cookies.get("sid") ?? "";
  await browser.goTo(startOf("dell.farrow"));
  const after = browser.cookies.get("sid") ?? "";
  expect(after).not.toBe(before);
  expect((await app.ask("/account", { cookie: `sid=${before}` })).status).toBe(302);
  expect((await app.ask("/account", { cookie: `sid=${after}` })).status).toBe(200);

  const victim = new Browser();
  const planted = cookieOf("P".repeat(43));
  victim.cookies.set("sid", planted.slice("sid=".length));
  await victim.goTo(startOf("maren.oake"));
  expect((await app.ask("/account", { cookie: planted })).status).toBe(302);
});

test("signing out ends the session here, at the sign-in service, and takes the cookie away", async () => {
  await browser.goTo(startOf("maren.oake"));
  const old = browser.cookies.get("sid") ?? "";
  const { url } = await browser.send(`${app.origin}/logout`, {}, () => true);
  expect(url.origin + url.pathname).toBe(`${idp.issuer}/session/end`);
  expect(url.searchParams.get("post_logout_redirect_uri")).toBe(`${app.origin}/`);
  expect(browser.cookies.has("sid")).toBe(false);
  expect((await app.ask("/account", { cookie: `sid=${old}` })).status).toBe(302);
});

test("a recorder's session lasts 30 days, a director's 12 hours", async () => {
  for (const [subject, hours] of [
    ["dell.farrow", 720],
    ["maren.oake", 12],
  ] as const) {
    await browser.goTo(startOf(subject));
    const [newest] = await rows<{ hours: number }>(
      app,
      "SELECT TIMESTAMPDIFF(SECOND, created_at, expires_at) / 3600 AS hours FROM session ORDER BY id DESC LIMIT 1",
    );
    expect(Number(newest?.hours)).toBe(hours);
  }
});

test.each(["//elsewhere.example", "/\\elsewhere.example", "https://elsewhere.example/x", "javascript:alert(1)"])(
  "signing in with the return address %s leads to Today",
  async (returnTo) => {
    expect((await browser.goTo(startOf("maren.oake", returnTo))).url.href).toBe(`${app.origin}/today`);
    // Signed in already, the sign-in page itself must not lead away either.
    const { url } = await browser.goTo(`${app.origin}/login?${new URLSearchParams({ returnTo })}`);
    expect(url.href).toBe(`${app.origin}/today`);
  },
);
