import fc from "fast-check";
import { expect, test } from "vitest";
import { safeReturnTo } from "#app/lib/return-address.ts";

const origin = "https://network.example";

test.each([
  "/today",
  "/season/2024",
  "/peers?edition=3&group=all",
  "/uploads/7/problems",
  "/login?returnTo=%2Ffleet",
  "/x?u=//elsewhere.example",
  "/x?u=https://elsewhere.example",
  "/%2f%2felsewhere.example",
  "/a//b",
])("%s is kept as it is", (text) => {
  expect(safeReturnTo(text, origin)).toBe(text);
});

test("a fragment is left out, dots are resolved", () => {
  expect(safeReturnTo("/fleet#calibrations", origin)).toBe("/fleet");
  expect(safeReturnTo("/fleet/../season/./2024", origin)).toBe("/season/2024");
});

const elsewhere = [
  null,
  undefined,
  "",
  " ",
  "today",
  "?today",
  "#today",
  ".",
  "..",
  "//elsewhere.example",
  "///elsewhere.example",
  "////elsewhere.example",
  "/\\elsewhere.example",
  "\\/elsewhere.example",
  "\\\\elsewhere.example",
  "/\\/elsewhere.example",
  "/a\\b",
  "/..//elsewhere.example",
  "/.//elsewhere.example",
  "/x/..//elsewhere.example",
  "/%2e%2e//elsewhere.example",
  "/%2E//elsewhere.example",
  "/\t/elsewhere.example",
  "/\n/elsewhere.example",
  "/\r\nSet-Cookie: a=b",
  "/a\0b",
  "/ /elsewhere.example",
  " /elsewhere.example",
  "\t//elsewhere.example",
  "http:elsewhere.example",
  "https:/elsewhere.example",
  "https://elsewhere.example/today",
  "https://network.example/today",
  "https://network.example@elsewhere.example/",
  "network.example/today",
  "javascript:alert(1)",
  "JaVaScRiPt:alert(1)",
  "data:text/html,x",
  "vbscript:x",
  "blob:https://network.example/x",
  "mailto:a@b.example",
  "/\u2028/elsewhere.example",
  "/é",
  "/／elsewhere.example",
  "／／elsewhere.example",
  `/${"a".repeat(512)}`,
  `/${"a".repeat(10_000)}`,
];

test.each(elsewhere)("case %#, %j, leads to Today", (text) => {
  expect(safeReturnTo(text, origin)).toBe("/today");
});

test("512 characters are taken, 513 are not", () => {
  expect(safeReturnTo(`/${"a".repeat(511)}`, origin)).toHaveLength(512);
  expect(safeReturnTo(`/${"a".repeat(512)}`, origin)).toBe("/today");
});

const pieces = [
  "/",
  "\\",
  ".",
  "..",
  "//",
  "%2f",
  "%5c",
  "%09",
  "\t",
  "@",
  ":",
  "?",
  "#",
  "elsewhere.example",
  "a",
  "https:",
  " ",
];

test("whatever is given, a browser that follows the answer stays on this site, on one line", () => {
  const anything = fc.oneof(
    fc.string({ unit: "binary", maxLength: 40 }),
    fc.array(fc.constantFrom(...pieces), { maxLength: 12 }).map((parts) => `/${parts.join("")}`),
    fc.webUrl({ withQueryParameters: true, withFragments: true }),
  );
  fc.assert(
    fc.property(anything, (text) => {
      const answer = safeReturnTo(text, origin);
      expect(answer).toMatch(/^\/(?![/\\])[\x21-\x7e]*$/);
      expect(new URL(answer, origin).origin).toBe(origin);
      expect(safeReturnTo(answer, origin)).toBe(answer);
    }),
    { numRuns: 20_000, seed: 20_261_201 },
  );
});
