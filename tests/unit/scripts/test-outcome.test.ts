import { expect, test } from "vitest";
import { checkOutcome, lastLine, vitestOutcome } from "#scripts/test-outcome.js";

const file = (status: string, ...tests: string[]) => ({
  status,
  assertionResults: tests.map((state) => ({ status: state })),
});

test("passed and failed tests are counted, skipped ones are neither", () => {
  const report = { testResults: [file("failed", "passed", "failed", "skipped"), file("passed", "passed")] };
  expect(vitestOutcome("unit", report, 1)).toEqual({ title: "unit", passed: 2, failed: 1 });
});

test("a file that could not be loaded counts as one failure", () => {
  const report = { testResults: [file("failed"), file("passed", "passed")] };
  expect(vitestOutcome("unit", report, 1)).toEqual({ title: "unit", passed: 1, failed: 1 });
});

test("a bad exit counts as a failure even when every reported test passed", () => {
  expect(vitestOutcome("unit", { testResults: [file("passed", "passed")] }, 1).failed).toBe(1);
});

test("no report and no test at all are failures", () => {
  expect(vitestOutcome("e2e", null, 0)).toEqual({ title: "e2e", passed: 0, failed: 1 });
  expect(vitestOutcome("e2e", { testResults: [] }, 0).failed).toBe(1);
});

test("the last line sums everything up", () => {
  const outcomes = [checkOutcome("lint", true), checkOutcome("deps", false), { title: "unit", passed: 40, failed: 2 }];
  expect(lastLine(outcomes)).toBe("41 passed, 3 failed");
});
