import { expect, test } from "vitest";
import { linked, mailListPage, mailPage } from "#scripts/mail-page.js";

const mail = {
  id: 7,
  receivedAt: "2026-12-01T14:05:06.000Z",
  messageId: "<m@x.example>",
  from: "a@x.example",
  to: "<script>alert(1)</script>",
  subject: '"><img src=x onerror=alert(1)>',
  text: "<b>bold</b> http://h.example/i/abc.",
  html: "",
};

test("nothing a mail contains becomes markup on its page or in the list", () => {
  for (const html of [mailPage(mail), mailListPage([mail])]) {
    expect(html).not.toMatch(/<script|<img|<b>/);
    expect(html).toContain("&lt;script&gt;");
  }
});

test("an address in the text is a link, without the full stop after it", () => {
  expect(linked("See http://h.example/i/abc.")).toBe(
    'See <a href="http://h.example/i/abc">http://h.example/i/abc</a>.',
  );
});

test("an address with an ampersand stays one link, a quote ends it", () => {
  expect(linked('http://h.example/?a=1&b=2"x')).toBe(
    '<a href="http://h.example/?a=1&amp;b=2">http://h.example/?a=1&amp;b=2</a>&quot;x',
  );
});

test("other schemes are left as text", () => {
  expect(linked("javascript:alert(1)")).toBe("javascript:alert(1)");
});

test("an empty list says what will show up here", () => {
  expect(mailListPage([])).toContain("No mail yet.");
});
