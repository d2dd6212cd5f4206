import { TextDecoder } from "node:util";

/**
 * What a person wants to see of a mail: header fields decoded, its plain text and its HTML.
 *
 * @param {Buffer} raw the message as it went over the wire
 * @returns {{ messageId: string, from: string, to: string, subject: string, date: string, text: string, html: string }}
 *   an absent part is ""
 * Format: RFC 5322 (header fields), RFC 2045 and 2046 (parts and their encodings), RFC 2047 (encoded words).
 */
export function readMail(raw) {
  const part = splitPart(raw.toString("latin1"));
  const field = (/** @type {string} */ name) => decodeWords(part.fields.get(name) ?? "");
  const { text, html } = bodies(part);
  return {
    messageId: field("message-id"),
    from: field("from"),
    to: field("to"),
    subject: field("subject"),
    date: field("date"),
    text: text ?? "",
    html: html ?? "",
  };
}

/**
 * A header field with its encoded words turned into text.
 *
 * @param {string} value
 * @returns {string}
 * @example decodeWords("=?UTF-8?Q?Gr=C3=BC=C3=9Fe?=") // "Grüße"
 */
export function decodeWords(value) {
  const word = /=\?([\w-]+)(?:\*[\w-]+)?\?([bq])\?([^?]*)\?=/gi;
  // White space between two encoded words is only there to fold the line.
  const joined = value.replace(/(\?=)\s+(?==\?)/g, "$1");
  return joined.replace(word, (_all, charset, encoding, content) => {
    const bytes = encoding.toLowerCase() === "b" ? base64(content) : quotedPrintable(content.replaceAll("_", " "));
    return decodeCharset(bytes, charset);
  });
}

/** @param {string} source one byte a character @returns {Part} @typedef {{ fields: Map<string, string>, body: string }} Part */
function splitPart(source) {
  const [head = "", ...rest] = source.split(/\r?\n\r?\n/);
  const separator = source.slice(head.length).match(/^\r?\n\r?\n/)?.[0] ?? "";
  const fields = new Map();
  for (const line of head.replace(/\r?\n[ \t]+/g, " ").split(/\r?\n/)) {
    const colon = line.indexOf(":");
    if (colon > 0) fields.set(line.slice(0, colon).trim().toLowerCase(), utf8(line.slice(colon + 1).trim()));
  }
  return { fields, body: rest.length > 0 ? source.slice(head.length + separator.length) : "" };
}

/** @param {Part} part @returns {{ text?: string, html?: string }} */
function bodies(part) {
  const type = part.fields.get("content-type") ?? "text/plain; charset=utf-8";
  const boundary = /^multipart\/[\w-]+\s*;.*?boundary=(?:"([^"]+)"|([^\s;]+))/i.exec(type);
  if (boundary) {
    const found = partsBetween(part.body, boundary[1] ?? boundary[2] ?? "").map((source) => bodies(splitPart(source)));
    return {
      text: found.find(({ text }) => text !== undefined)?.text,
      html: found.find(({ html }) => html !== undefined)?.html,
    };
  }
  const charset = /charset="?([\w-]+)/i.exec(type)?.[1] ?? "utf-8";
  const content = decodeCharset(transferDecode(part), charset).replaceAll("\r\n", "\n");
  if (/^text\/html/i.test(type)) return { html: content };
  return /^text\/plain/i.test(type) ? { text: content } : {};
}

/** @param {string} body @param {string} boundary @returns {string[]} */
function partsBetween(body, boundary) {
  const pieces = `\r\n${body}`.split(`\n--${boundary}`);
  // Before the first boundary stands a note for old readers; the last one is followed by two dashes.
  return pieces
    .slice(1)
    .filter((piece) => !piece.startsWith("--"))
    .map((piece) => piece.replace(/^[ \t]*\r?\n/, "").replace(/\r$/, ""));
}

/** @param {Part} part @returns {Buffer} */
function transferDecode({ fields, body }) {
  const encoding = (fields.get("content-transfer-encoding") ?? "7bit").toLowerCase();
  if (encoding === "base64") return base64(body);
  if (encoding === "quoted-printable")
    return quotedPrintable(body.replace(/[ \t]+(?=\r?\n|$)/g, "").replace(/=\r?\n/g, ""));
  return Buffer.from(body, "latin1");
}

/** @param {string} content */
function quotedPrintable(content) {
  return Buffer.from(
    content.replace(/=([0-9a-f]{2})/gi, (_all, hex) => String.fromCharCode(parseInt(hex, 16))),
    "latin1",
  );
}

/** @param {string} content */
function base64(content) {
  return Buffer.from(content, "base64");
}

/** Header fields may hold UTF-8 as it is (RFC 6532). @param {string} latin1 */
function utf8(latin1) {
  return decodeCharset(Buffer.from(latin1, "latin1"), "utf-8");
}

/** @param {Buffer} bytes @param {string} charset */
function decodeCharset(bytes, charset) {
  try {
    return new TextDecoder(charset).decode(bytes);
  } catch {
    return bytes.toString("latin1");
  }
}
