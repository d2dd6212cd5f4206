import { createHash } from "node:crypto";

const style = `
:root { color-scheme: light dark; --ink: #1d2a31; --quiet: #4f5d65; --page: #fbfbf7; --line: #b9c4c9; --act: #0d5b4c; --on-act: #ffffff; --wrong: #9b3322; }
@media (prefers-color-scheme: dark) { :root { --ink: #eef2f2; --quiet: #b3c0c6; --page: #141c20; --line: #4b5a62; --act: #7fd0bd; --on-act: #10201c; --wrong: #ffab98; } }
body { margin: 0; background: var(--page); color: var(--ink); font: 16px/1.5 system-ui, sans-serif; }
main { max-width: 34rem; margin: 0 auto; padding: 32px 16px 48px; }
h1 { font-size: 1.5rem; margin: 0 0 4px; }
h2 { font-size: 1.1rem; margin: 32px 0 8px; }
p.quiet, small { color: var(--quiet); }
ul { list-style: none; margin: 0; padding: 0; display: grid; gap: 8px; }
button { font: inherit; color: inherit; background: none; border: 1px solid var(--line); border-radius: 6px; padding: 10px 14px; min-height: 48px; cursor: pointer; }
li button { width: 100%; text-align: left; }
li small { display: block; font-size: 0.875rem; }
button.act { background: var(--act); border-color: var(--act); color: var(--on-act); font-weight: 600; }
button:focus-visible, input:focus-visible, a:focus-visible { outline: 3px solid var(--act); outline-offset: 2px; }
label { display: block; margin-top: 12px; font-weight: 600; }
input { font: inherit; color: inherit; background: none; width: 100%; box-sizing: border-box; border: 1px solid var(--quiet); border-radius: 6px; padding: 10px 12px; margin-bottom: 12px; }
p.wrong { color: var(--wrong); font-weight: 600; }
a { color: var(--act); }
`;

/**
 * The policy of these pages. form-action names the application too: browsers apply it to the redirect after a form.
 *
 * @param {string} applicationOrigin
 * @returns {string}
 */
export function pagePolicy(applicationOrigin) {
  const hash = createHash("sha256").update(style).digest("base64");
  return `default-src 'none'; img-src data:; style-src 'sha256-${hash}'; form-action 'self' ${applicationOrigin}; base-uri 'none'; frame-ancestors 'none'`;
}

/**
 * @param {object} given
 * @param {import("./people.js").Person[]} given.demo
 * @param {import("./people.js").Person[]} given.registered
 * @param {string | null} given.problem what was wrong with the name or address entered
 * @param {{ name: string, email: string }} given.entered kept after a problem
 * @returns {string} HTML
 */
export function signInPage({ demo, registered, problem, entered }) {
  const list = (title, people) =>
    people.length === 0
      ? ""
      : `<h2>${title}</h2><form method="post"><ul>${people.map(personButton).join("")}</ul></form>`;
  const wrong = problem === null ? "" : `<p class="wrong" role="alert" id="problem">${escapeHtml(problem)}</p>`;
  const described = problem === null ? "" : ' aria-describedby="problem"';
  return page(
    "Who are you?",
    `<p class="quiet">The identity provider of this machine, for trying things out. It asks for no password.</p>
${list("Demo people", demo)}${list("Signed in here before", registered)}
<h2>Someone else</h2>${wrong}<form method="post">
<label for="name">Name</label><input id="name" name="name" autocomplete="name" required maxlength="120" value="${escapeHtml(entered.name)}"${described}>
<label for="email">E-mail address</label><input id="email" name="email" type="email" autocomplete="email" required maxlength="254" value="${escapeHtml(entered.email)}"${described}>
<button class="act">Continue</button></form>`,
  );
}

/** @param {string} form the hidden form that the provider checks @returns {string} HTML */
export function signOutPage(form) {
  return page(
    "Sign out?",
    `${form}<p>You have left Commonweigh. This also ends your sign-in at the identity provider of this machine.</p>
<p><button class="act" form="op.logoutForm" name="logout" value="yes">Sign out</button></p>`,
  );
}

/** @param {string} applicationOrigin @returns {string} HTML */
export function signedOutPage(applicationOrigin) {
  return page(
    "Signed out",
    `<p>You are signed out. <a href="${escapeHtml(applicationOrigin)}">Back to Commonweigh</a></p>`,
  );
}

/** @param {string} applicationOrigin @param {string} code @returns {string} HTML */
export function errorPage(applicationOrigin, code) {
  return page(
    "This did not work",
    `<p>The sign-in could not go on (${escapeHtml(code)}). It may have taken too long, or been finished already.</p>
<p><a href="${escapeHtml(applicationOrigin)}/login">Start again</a></p>`,
  );
}

/** @param {import("./people.js").Person} person */
function personButton({ sub, name, email, role, town }) {
  const place = role === null ? email : town === null ? role : `${role} of ${town}`;
  return `<li><button name="sub" value="${escapeHtml(sub)}">${escapeHtml(name)} <small>${escapeHtml(place)}</small></button></li>`;
}

/** @param {string} text */
function escapeHtml(text) {
  const entities = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;" };
  return text.replace(/[&<>"']/g, (character) => entities[character]);
}

/** @param {string} title @param {string} body HTML */
function page(title, body) {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title} · Local identity provider</title><link rel="icon" href="data:,"><style>${style}</style></head><body><main><h1>${title}</h1>${body}</main></body></html>`;
}
