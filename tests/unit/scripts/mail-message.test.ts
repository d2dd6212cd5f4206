import nodemailer, { type SendMailOptions } from "nodemailer";
import { expect, test } from "vitest";
import { readMail } from "#scripts/mail-message.js";

async function built(mail: SendMailOptions) {
  const { message } = await nodemailer.createTransport({ streamTransport: true, buffer: true }).sendMail(mail);
  if (!Buffer.isBuffer(message)) throw new Error("the transport was asked for a buffer");
  return readMail(message);
}

test("a mail with text and HTML comes out as it was put in, accents, quotes and long lines included", async () => {
  const text = `Good morning, Zoë.\n“Two tons” – ${"salt ".repeat(60).trim()}\nhttp://h.example/a?b=c&d=e`;
  const mail = await built({
    from: "Network <network@commonweigh.example>",
    to: {
      name: "Zoë Ångström, with a name long enough to be folded over two lines of the head",
      address: "z@x.example",
    },
    subject: "Grüße – a subject ❄️ long enough to be folded over several encoded words of the head of the mail ❄️",
    text,
    html: "<p>Zoë = “Z”</p>",
    messageId: "<one@x.example>",
  });
  expect(mail.subject).toBe(
    "Grüße – a subject ❄️ long enough to be folded over several encoded words of the head of the mail ❄️",
  );
  expect(mail.to).toContain("Zoë Ångström, with a name long enough to be folded over two lines of the head");
  expect(mail.messageId).toBe("<one@x.example>");
  expect(mail.text.trimEnd()).toBe(text);
  expect(mail.html.trimEnd()).toBe("<p>Zoë = “Z”</p>");
});

test("a plain mail without a part for HTML has an empty one", async () => {
  const mail = await built({ from: "a@x.example", to: "b@x.example", subject: "s", text: "only text" });
  expect(mail).toMatchObject({ to: "b@x.example", subject: "s", html: "" });
  expect(mail.text.trimEnd()).toBe("only text");
});

test("base64 parts, other character sets and parts within parts are read", () => {
  const raw = [
    "Subject: =?ISO-8859-1?Q?caf=E9?=",
    'Content-Type: multipart/mixed; boundary="out"',
    "",
    "--out",
    "Content-Type: multipart/alternative; boundary=in",
    "",
    "--in",
    "Content-Type: text/plain; charset=iso-8859-1",
    "Content-Transfer-Encoding: quoted-printable",
    "",
    "un caf=E9=",
    " noir",
    "--in",
    "Content-Type: text/html; charset=utf-8",
    "Content-Transfer-Encoding: base64",
    "",
    Buffer.from("<p>é</p>").toString("base64"),
    "--in--",
    "--out--",
    "",
  ].join("\r\n");
  expect(readMail(Buffer.from(raw, "latin1"))).toMatchObject({
    subject: "café",
    text: "un café noir",
    html: "<p>é</p>",
  });
});
