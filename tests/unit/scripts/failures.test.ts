import { expect, test } from "vitest";
import { Failure, sentenceFor, sentenceForLog } from "#scripts/failures.js";
import { npmSentence } from "#scripts/install.js";

test("a failure says its own sentence", () => {
  expect(sentenceFor(new Failure("Port 1 is taken."))).toBe("Port 1 is taken.");
});

test.each([
  ["ENOSPC", "The disk is full."],
  ["EDQUOT", "The disk is full."],
  ["EACCES", "This account may not use /some/where."],
  ["EPERM", "This account may not use /some/where."],
  ["EROFS", "/some/where lies on a disk that cannot be written to."],
])("the system's %s becomes a sentence with a remedy", (code, beginning) => {
  const sentence = sentenceFor(Object.assign(new Error("raw words"), { code, path: "/some/where" }));
  expect(sentence?.startsWith(beginning)).toBe(true);
  expect(sentence).not.toContain("raw words");
});

test.each([
  `Can't create table \`d\`.\`t\` (errno: 135 "No more room in record file")`,
  "The table 'season_figure' is full",
])("the database's %j is the full disk it means", (words) => {
  expect(sentenceFor(new Error(words))).toMatch(/^The disk is full/);
});

test("a fault of the program keeps its stack: there is no sentence for it", () => {
  expect(sentenceFor(new TypeError("x is not a function"))).toBeNull();
  expect(sentenceFor("thrown text")).toBeNull();
});

test("a log that tells of a full disk or a missing right gives that sentence, another gives none", () => {
  expect(sentenceForLog("[ERROR] InnoDB: Error number 28 means 'No space left on device'")).toMatch(
    /^The disk is full/,
  );
  expect(sentenceForLog("preallocating 100663296 bytes for file ./ib_logfile101 failed with error 28")).toMatch(
    /^The disk/,
  );
  expect(sentenceForLog("Can't create file './x' (errno: 13 \"Permission denied\")")).toMatch(
    /^This account may not use/,
  );
  expect(sentenceForLog("[Note] ready for connections")).toBeNull();
});

test.each([
  ["npm error code ENOSPC", "The disk is full."],
  ["npm error code EACCES\nnpm error syscall mkdir", "npm may not write node_modules here."],
  ["npm error code ENOTFOUND\nnpm error network request failed", "npm cannot reach its registry."],
  ["npm error code EUSAGE", "npm ci did not succeed"],
])("npm's %j is put in words", (output, beginning) => {
  expect(npmSentence(output).startsWith(beginning)).toBe(true);
});
