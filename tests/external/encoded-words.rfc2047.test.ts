import { expect, test } from "vitest";
import { decodeWords } from "#scripts/mail-message.js";

// RFC 2047 (K. Moore, 1996), section 8, "Examples": encoded form and what is displayed for it.
test.each([
  ["(=?ISO-8859-1?Q?a?=)", "(a)"],
  ["(=?ISO-8859-1?Q?a?= b)", "(a b)"],
  ["(=?ISO-8859-1?Q?a?= =?ISO-8859-1?Q?b?=)", "(ab)"],
  ["(=?ISO-8859-1?Q?a?=  =?ISO-8859-1?Q?b?=)", "(ab)"],
  ["(=?ISO-8859-1?Q?a?=\r\n    =?ISO-8859-1?Q?b?=)", "(ab)"],
  ["(=?ISO-8859-1?Q?a_b?=)", "(a b)"],
  ["(=?ISO-8859-1?Q?a?= =?ISO-8859-2?Q?_b?=)", "(a b)"],
])("%j is displayed as %j", (encoded, displayed) => {
  expect(decodeWords(encoded)).toBe(displayed);
});
