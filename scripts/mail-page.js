import { createHash } from "node:crypto";

const style = `
:root { color-scheme: light dark; --ink: #1d2a31; --quiet: #4f5d65; --page: #fbfbf7; --line: #cfd8dc; --link: #0d5b4c; }
@media (prefers-color-scheme: dark) { :root { --ink: #eef2f2; --quiet: #b3c0c6; --page: #141c20; --line: #37454d; --link: #7fd0bd; } }
body { margin: 0; background: var(--page); color: var(--ink); font: 16px/1.5 system-ui, sans-serif; }
main { max-width: 60rem; margin: 0 auto; padding: 24px 16px 48px; }
h1 { font-size: 1.5rem; margin: 0 0 4px; }
p.quiet, dt { color: var(--quiet); }
table { width: 100%; border-collapse: collapse; margin-top: 16px; }
th, td { text-align: left; padding: 8px 12px 8px 0; border-bottom: 1px solid var(--line); vertical-align: top; overflow-wrap: anywhere; }
td:last-child, th:last-child { white-space: nowrap; text-align: right; padding-right: 0; }
a { color: var(--link); }
dl { display: grid; grid-template-columns: max-content 1fr; gap: 4px 16px; }
dd { margin: 0; overflow-wrap: anywhere; }
pre { white-space: pre-wrap; overflow-wrap: anywhere; font: inherit; border-top: 1px solid var(--line); padding-top: 16px; }
`;

/** The mail pages run no script and load nothing; their one style sheet is named by its hash. */
export const mailPagePolicy = `default-src 'none'; img-src data:; style-src 'sha256-${createHash("sha256").update(style).digest("base64")}'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'`;

/** @typedef {{ id: number, receivedAt: string, messageId: string, from: string, to: string, subject: string, text: string, html: string }} Mail */

/** @param {readonly Mail[]} mails newest first @returns {string} HTML */
export function mailListPage(mails) {
  const rows = mails
    .map(
      (
        mail,
      ) => `<tr><td>${escapeHtml(mail.to)}</td><td><a href="/mails/${mail.id}">${escapeHtml(mail.subject || "(no subject)")}</a></td>
<td><time datetime="${escapeHtml(mail.receivedAt)}">${escapeHtml(clock(mail.receivedAt))}</time></td></tr>`,
    )
    .join("\n");
  const table = `<table><thead><tr><th scope="col">To</th><th scope="col">Subject</th><th scope="col">Received (UTC)</th></tr></thead><tbody>${rows}</tbody></table>`;
  const count = mails.length === 1 ? "1 mail" : `${mails.length} mails`;
  const body =
    mails.length === 0 ? "<p>No mail yet. What the network sends shows up here; reload to look again.</p>" : table;
  return page("Mail", `<h1>Mail</h1><p class="quiet">${count} caught on this machine. Nothing leaves it.</p>${body}`);
}

/** @param {Mail} mail @returns {string} HTML */
export function mailPage(mail) {
  return page(
    mail.subject || "(no subject)",
    `<p><a href="/">All mail</a></p><h1>${escapeHtml(mail.subject || "(no subject)")}</h1>
<dl><dt>From</dt><dd>${escapeHtml(mail.from)}</dd><dt>To</dt><dd>${escapeHtml(mail.to)}</dd>
<dt>Received</dt><dd>${escapeHtml(clock(mail.receivedAt))} UTC</dd></dl><pre>${linked(mail.text)}</pre>`,
  );
}

/** @returns {string} HTML */
export function mailNotFoundPage() {
  return page("Not found", '<h1>Not found</h1><p>This mail is not here any more. <a href="/">All mail</a></p>');
}

/**
 * @param {string} text
 * @returns {string} the text with everything that means something in HTML made harmless
 */
function escapeHtml(text) {
  const entities = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;" };
  return text.replace(/[&<>"']/g, (character) => entities[character]);
}

/**
 * Plain text as HTML, its web addresses made into links.
 *
 * @param {string} text
 * @returns {string}
 * @example linked("See http://a.example/x.") // 'See <a href="http://a.example/x">http://a.example/x</a>.'
 */
export function linked(text) {
  return text
    .split(/(https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)])/)
    .map((piece, at) => (at % 2 === 1 ? `<a href="${escapeHtml(piece)}">${escapeHtml(piece)}</a>` : escapeHtml(piece)))
    .join("");
}

/** @param {string} instant ISO 8601 */
function clock(instant) {
  return instant.slice(0, 19).replace("T", " ");
}

/** @param {string} title @param {string} body HTML */
function page(title, body) {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)} · Commonweigh mail</title><link rel="icon" href="data:,"><style>${style}</style></head><body><main>${body}</main></body></html>`;
}
