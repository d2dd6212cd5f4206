import { SMTPServer } from "smtp-server";
import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { freePort } from "#scripts/ports.js";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { insert, minutesFromNow, rows } from "#tests/support/rows.ts";

/* Mail against a real mail server on loopback: sent once, kept while the server is away, never sent twice. */

type Mode = "take" | "busy" | "refuse" | "break after the letter" | "break before the letter";

let app: TestApp;
let smtp: SMTPServer | null = null;
let smtpPort: number;
let mode: Mode = "take";
const received: { messageId: string; to: string; raw: string }[] = [];

function refusal(code: number) {
  return Object.assign(new Error("not now"), { responseCode: code });
}

function breakOff(server: SMTPServer) {
  // The library's types leave out the sockets that it keeps.
  const { connections } = server as unknown as { connections: Set<{ _socket: { destroy: () => void } }> };
  for (const { _socket } of connections) _socket.destroy();
}

async function openMailServer() {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    disableReverseLookup: true,
    onRcptTo(_address, _session, done) {
      if (mode === "break before the letter") return breakOff(server);
      done(mode === "busy" ? refusal(451) : mode === "refuse" ? refusal(550) : null);
    },
    onData(stream, session, done) {
      const pieces: Buffer[] = [];
      stream.on("data", (piece: Buffer) => pieces.push(piece));
      stream.on("end", () => {
        const raw = Buffer.concat(pieces).toString("utf8");
        const messageId = /^Message-ID: (.+)$/im.exec(raw)?.[1]?.trim() ?? "";
        received.push({ messageId, to: session.envelope.rcptTo.map(({ address }) => address).join(), raw });
        if (mode === "break after the letter") breakOff(server);
        else done();
      });
    },
  });
  server.on("error", () => undefined);
  await new Promise<void>((resolve) => server.listen(smtpPort, "127.0.0.1", resolve));
  smtp = server;
}

async function closeMailServer() {
  const server = smtp;
  smtp = null;
  if (server) await new Promise<void>((resolve) => server.close(resolve));
}

beforeAll(async () => {
  smtpPort = await freePort();
  app = await startApp({ smtpPort });
});

beforeEach(async () => {
  mode = "take";
  received.length = 0;
  await app.db.query("DELETE FROM outbox_mail");
  if (!smtp) await openMailServer();
});

afterAll(async () => {
  await closeMailServer();
  expect(await app.close()).toEqual([]);
});

let serial = 0;
async function aMail(given: Record<string, string | number> = {}) {
  const number = ++serial;
  const id = await insert(app, "outbox_mail", {
    message_id: `<mail-${number}@127.0.0.1>`,
    dedupe_key: `occasion-${number}`,
    to_name: "Sample Person",
    to_address: `person.${number}@sample.example`,
    subject: `Season ${number}`,
    text: "A letter.",
    html: "<p>A letter.</p>",
    run_after: minutesFromNow(-1),
    created_at: minutesFromNow(-1),
    ...given,
  });
  return { id, messageId: `<mail-${number}@127.0.0.1>` };
}

type Line = { state: string; attempts: number; wait: number; last_error: string | null; sent_at: string | null };
async function lineOf(id: number): Promise<Line> {
  const [line] = await rows<Line>(
    app,
    `SELECT state, attempts, TIMESTAMPDIFF(SECOND, UTC_TIMESTAMP(3), run_after) AS wait, last_error, sent_at
       FROM outbox_mail WHERE id = ?`,
    [id],
  );
  if (!line) throw new Error(`no mail ${id}`);
  return line;
}

const dueNow = (id: number) => app.db.query("UPDATE outbox_mail SET run_after = UTC_TIMESTAMP(3) WHERE id = ?", [id]);

async function mailsSent() {
  const { status, body } = await app.tick();
  expect(status).toBe(200);
  return (JSON.parse(body) as { mails: number }).mails;
}

test("mails that are due are sent once each, to their one address, under their own Message-ID", async () => {
  const mails = [await aMail(), await aMail(), await aMail()];
  const later = await aMail({ run_after: minutesFromNow(10) });
  expect(await mailsSent()).toBe(3);
  expect(await mailsSent()).toBe(0);
  expect(received.map(({ messageId }) => messageId)).toEqual(mails.map(({ messageId }) => messageId));
  for (const { to } of received) expect(to).toMatch(/^person\.\d+@sample\.example$/);
  expect(await lineOf(mails[0]?.id ?? 0)).toMatchObject({ state: "sent", attempts: 1, last_error: null });
  expect(await lineOf(later.id)).toMatchObject({ state: "queued", attempts: 0 });
});

test("four workers at once send forty mails, each once", async () => {
  for (let turn = 0; turn < 40; turn++) await aMail();
  const sent = await Promise.all([1, 2, 3, 4].map(() => mailsSent()));
  expect(sent.reduce((sum, count) => sum + count, 0)).toBe(40);
  expect(received).toHaveLength(40);
  expect(new Set(received.map(({ messageId }) => messageId)).size).toBe(40);
});

test("while the mail server is away a mail waits longer each time, and is given up after six waits", async () => {
  await closeMailServer();
  const { id } = await aMail();
  for (const [place, minutes] of [1, 5, 30, 120, 360, 720].entries()) {
    expect(await mailsSent()).toBe(0);
    const line = await lineOf(id);
    expect(line).toMatchObject({ state: "queued", attempts: place + 1 });
    expect(line.last_error).toContain("ECONNREFUSED");
    expect(Math.abs(line.wait - 60 * minutes)).toBeLessThan(15);
    expect(await mailsSent()).toBe(0);
    expect((await lineOf(id)).attempts).toBe(place + 1);
    await dueNow(id);
  }
  expect(await mailsSent()).toBe(0);
  expect(await lineOf(id)).toMatchObject({ state: "dead", attempts: 7 });
});

test("a mail that waited is sent once the server is back", async () => {
  await closeMailServer();
  const { id, messageId } = await aMail();
  await mailsSent();
  await openMailServer();
  await dueNow(id);
  expect(await mailsSent()).toBe(1);
  expect(received.map((mail) => mail.messageId)).toEqual([messageId]);
  expect(await lineOf(id)).toMatchObject({ state: "sent", attempts: 2, last_error: null });
});

test.each<Mode>(["busy", "refuse", "break before the letter"])(
  "when the server answers “%s” the mail was not sent, and waits",
  async (answer) => {
    mode = answer;
    const { id } = await aMail();
    expect(await mailsSent()).toBe(0);
    expect(await lineOf(id)).toMatchObject({ state: "queued", attempts: 1 });
    expect(received).toEqual([]);
  },
);

test("a connection that breaks after the letter leaves it uncertain, and it is not sent again", async () => {
  mode = "break after the letter";
  const { id } = await aMail();
  expect(await mailsSent()).toBe(0);
  expect(await lineOf(id)).toMatchObject({ state: "uncertain", attempts: 1 });
  mode = "take";
  await dueNow(id);
  expect(await mailsSent()).toBe(0);
  expect(received).toHaveLength(1);
});

test("a mail that a worker died over is uncertain after five minutes, and not sent again", async () => {
  const stale = await aMail({ state: "sending", attempts: 1, run_after: minutesFromNow(-6) });
  const fresh = await aMail({ state: "sending", attempts: 1, run_after: minutesFromNow(-4) });
  expect(await mailsSent()).toBe(0);
  expect(await lineOf(stale.id)).toMatchObject({ state: "uncertain" });
  expect(await lineOf(fresh.id)).toMatchObject({ state: "sending" });
  expect(received).toEqual([]);
});

test("one mail that cannot go does not keep the others", async () => {
  const wrong = await aMail({ to_address: "no address at all", run_after: minutesFromNow(-5) });
  const right = await aMail();
  expect(await mailsSent()).toBe(1);
  expect(await lineOf(wrong.id)).toMatchObject({ state: "queued" });
  expect(await lineOf(right.id)).toMatchObject({ state: "sent" });
});

test.each([
  ["a line end", 'Eve\r\nBcc: "x" <other@elsewhere.example>'],
  ["another address", "Eve <other@elsewhere.example>"],
  ["a list", "a@elsewhere.example, b@elsewhere.example"],
  ["quotes", '"Eve" <other@elsewhere.example>, "'],
])("a name that holds %s adds no reader and no head", async (_what, to_name) => {
  await aMail({ to_name, subject: "Season\r\nBcc: other@elsewhere.example" });
  expect(await mailsSent()).toBe(1);
  const [mail] = received;
  expect(mail?.to).toMatch(/^person\.\d+@sample\.example$/);
  const [head = ""] = (mail?.raw ?? "").split("\r\n\r\n");
  expect(head).not.toMatch(/^Bcc:/im);
});
