import { appendFile } from "node:fs/promises";
import { existsSync, readFileSync } from "node:fs";
import { createServer } from "node:http";
import { SMTPServer } from "smtp-server";
import { mailListPage, mailNotFoundPage, mailPage, mailPagePolicy } from "./mail-page.js";
import { readMail } from "./mail-message.js";
import { stopOnRequest } from "./stop.js";

const keptCount = 500;
const sizeLimitBytes = 10_000_000;
const { MAIL_FILE = "mail.jsonl", MAIL_PAGE_PORT, SMTP_PORT, HOST = "127.0.0.1" } = process.env;

/** Newest last. @type {import("./mail-page.js").Mail[]} */
const mails = existsSync(MAIL_FILE) ? keptMails(readFileSync(MAIL_FILE, "utf8")) : [];

const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ["AUTH", "STARTTLS"],
  disableReverseLookup: true,
  size: sizeLimitBytes,
  banner: "Commonweigh mail catcher",
  onData(stream, _session, done) {
    const chunks = [];
    stream.on("data", (chunk) => chunks.push(chunk));
    stream.on("end", () => keep(Buffer.concat(chunks)).then(() => done(), done));
  },
});
smtp.on("error", (error) => console.error(error.message));
smtp.listen(Number(SMTP_PORT), HOST);

const pages = createServer((request, response) => {
  const answer = (status, type, body) => {
    response.writeHead(status, {
      "Content-Type": `${type}; charset=utf-8`,
      "Content-Security-Policy": mailPagePolicy,
      "X-Content-Type-Options": "nosniff",
      "Referrer-Policy": "no-referrer",
      "Cache-Control": "no-store",
    });
    response.end(request.method === "HEAD" ? undefined : body);
  };
  const path = request.url?.split("?")[0] ?? "";
  const newestFirst = mails.toReversed();
  const one = newestFirst.find(({ id }) => path === `/mails/${id}`);
  if (request.method !== "GET" && request.method !== "HEAD")
    return answer(405, "text/plain", "Only reading is possible here.\n");
  if (path === "/") return answer(200, "text/html", mailListPage(newestFirst));
  if (path === "/mails.json") return answer(200, "application/json", JSON.stringify(newestFirst));
  if (one) return answer(200, "text/html", mailPage(one));
  return answer(404, "text/html", mailNotFoundPage());
});
pages.listen(Number(MAIL_PAGE_PORT), HOST);
stopOnRequest(pages, () => new Promise((resolve) => smtp.close(resolve)));

/** Stored before the sender is told so: a mail that was accepted is there. @param {Buffer} raw */
async function keep(raw) {
  const mail = { id: (mails.at(-1)?.id ?? 0) + 1, receivedAt: new Date().toISOString(), ...readMail(raw) };
  mails.push(mail);
  if (mails.length > keptCount) mails.shift();
  await appendFile(MAIL_FILE, `${JSON.stringify(mail)}\n`, { mode: 0o600 });
}

/** @param {string} lines */
function keptMails(lines) {
  return lines
    .split("\n")
    .filter(Boolean)
    .slice(-keptCount)
    .flatMap((line) => {
      try {
        return [JSON.parse(line)];
      } catch {
        // The last line of a program that was killed may be cut short.
        return [];
      }
    });
}
