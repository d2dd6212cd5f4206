import { expect, test } from "vitest";
import { box, welcomeLines } from "#scripts/box.js";

const people = [
  { sub: "dell.farrow", name: "Dell Farrow", role: "recorder", town: "Quillbrook" },
  { sub: "a b", name: "Ida Roe", role: "analyst", town: null },
];

test("every line of the frame is as wide as the longest of its texts", () => {
  expect(box(["ab", "", "abcd"])).toBe("┌──────┐\n│ ab   │\n│      │\n│ abcd │\n└──────┘");
});

test("a character outside the basic plane counts as one", () => {
  expect(box(["𝒂"])).toBe("┌───┐\n│ 𝒂 │\n└───┘");
});

test("each demo person has a link that signs in, with the subject encoded", () => {
  const lines = welcomeLines({ origin: "http://h:1", mailOrigin: "http://h:3", people, invitationUrl: null });
  expect(lines).toContain("  Dell Farrow, recorder of Quillbrook  http://h:1/auth/start?hint=dell.farrow");
  expect(lines).toContain("  Ida Roe, analyst                     http://h:1/auth/start?hint=a%20b");
  expect(lines.at(-1)).toBe("Stop: Ctrl-C");
});

test("an empty network shows the first coordinator's link and no demo people", () => {
  const lines = welcomeLines({
    origin: "http://h:1",
    mailOrigin: "http://h:3",
    people: [],
    invitationUrl: "http://h:1/i/t",
  });
  expect(lines).toContain("  http://h:1/i/t");
  expect(lines.join("\n")).not.toContain("demo");
});
