import { expect, test } from "vitest";
import { dueReason, dueReasonWords, dueState } from "#app/domain/calibration/due.ts";

const tested = { testedOn: "2025-10-14", today: "2026-02-01", workDoneOn: [], materialSince: null };

test("tested this season and nothing changed since is in date", () => {
  expect(dueReason(tested)).toEqual({ state: "in-date", reason: null, dueSince: null });
  expect(dueReason({ ...tested, today: "2026-06-30" }).state).toBe("in-date");
});

test("never tested is never, whatever happened to the truck", () => {
  const never = { ...tested, testedOn: null, workDoneOn: ["2026-01-05"] };
  expect(dueReason(never)).toEqual({ state: "never", reason: "never-calibrated", dueSince: null });
});

test("a test of last season is due from 1 July and overdue from 1 November", () => {
  const states = ["2026-07-01", "2026-10-31", "2026-11-01"].map((today) => dueReason({ ...tested, today }));
  expect(states.map(({ state }) => state)).toEqual(["due", "due", "overdue"]);
  expect(states[0]).toEqual({ state: "due", reason: "new-season", dueSince: "2026-07-01" });
});

test("a test two seasons old stays overdue through the summer", () => {
  expect(dueReason({ ...tested, testedOn: "2024-10-14", today: "2026-08-01" })).toEqual({
    state: "overdue",
    reason: "new-season",
    dueSince: "2025-07-01",
  });
});

test("the network's own opening day is kept to, also one in the new year", () => {
  const opening = (openingDay: string, today: string) => dueReason({ ...tested, today, openingDay }).state;
  expect([opening("10-15", "2026-10-14"), opening("10-15", "2026-10-15")]).toEqual(["due", "overdue"]);
  expect([opening("01-10", "2026-12-31"), opening("01-10", "2027-01-10")]).toEqual(["due", "overdue"]);
  expect(() => opening("02-29", "2026-10-14")).toThrow(RangeError);
  expect(() => opening("1 November", "2026-10-14")).toThrow(RangeError);
});

test("work after the test makes it due at once; before or on the day of the test, or still to come, it does not", () => {
  const after = (...workDoneOn: string[]) => dueReason({ ...tested, workDoneOn });
  expect(after("2026-01-05", "2025-12-20")).toEqual({ state: "due", reason: "work-done", dueSince: "2025-12-20" });
  expect(after("2025-10-13", "2025-10-14", "2026-02-02").state).toBe("in-date");
  expect(after("2026-02-01").state).toBe("due");
  expect(() => after("2026-02-30")).toThrow(RangeError);
});

test("work in October that the opening has overtaken is overdue, work on the opening day itself is due", () => {
  expect(dueReason({ ...tested, workDoneOn: ["2025-10-20"] }).state).toBe("overdue");
  expect(dueReason({ ...tested, workDoneOn: ["2025-11-01"] }).state).toBe("due");
});

test("a new material makes it due, and the oldest of several reasons is given", () => {
  expect(dueReason({ ...tested, materialSince: "2026-01-10" })).toMatchObject({ state: "due", reason: "new-material" });
  const both = { ...tested, materialSince: "2026-01-10", workDoneOn: ["2026-01-12"] };
  expect(dueReason(both)).toMatchObject({ reason: "new-material", dueSince: "2026-01-10" });
  expect(dueReason({ ...both, today: "2026-09-01" })).toMatchObject({ state: "due", reason: "new-material" });
  expect(dueReason({ ...tested, materialSince: "2025-09-01" }).state).toBe("in-date");
});

test("every reason has its own words", () => {
  expect(new Set(Object.values(dueReasonWords)).size).toBe(4);
});

test("without work and new material both functions agree on in date or not", () => {
  for (const testedOn of ["2024-12-01", "2025-06-30", "2025-07-01", "2026-06-30", null]) {
    for (const today of ["2026-06-30", "2026-07-01", "2026-12-01"]) {
      const { state } = dueReason({ ...tested, testedOn, today });
      expect(state === "overdue" ? "due" : state).toBe(dueState(testedOn, today));
    }
  }
});
