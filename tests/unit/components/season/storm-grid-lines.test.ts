import { expect, test } from "vitest";
import {
  type GridLine,
  isChanged,
  mergeLines,
  pasteBlock,
  type StoredLine,
  typeInto,
  withReplies,
} from "#app/components/season/storm-grid-lines.ts";

function refs() {
  let count = 0;
  return () => `new-${++count}`;
}
const stored: StoredLine[] = [
  { id: 1, version: 3, cells: { startedAt: "2026-01-02 04:00", kind: "snow" } },
  { id: 2, version: 1, cells: { startedAt: "2026-01-05 04:00", kind: "frost" } },
];
const columns = ["startedAt", "endedAt", "kind"];

function texts(lines: readonly GridLine[]) {
  return lines.map(({ cells }) => columns.map((column) => cells[column] ?? "").join("|"));
}

test("the page begins with the stored lines and one blank line, nothing changed", () => {
  const lines = mergeLines(stored, [], refs());
  expect(texts(lines)).toEqual(["2026-01-02 04:00||snow", "2026-01-05 04:00||frost", "||"]);
  expect(lines.filter(isChanged)).toEqual([]);
});

test("typing into the blank line adds the next one, and typing the old text back is no change", () => {
  const newRef = refs();
  const typed = typeInto(mergeLines(stored, [], newRef), { line: 2, column: "kind" }, "sleet", newRef);
  expect(texts(typed).slice(2)).toEqual(["||sleet", "||"]);
  expect(typed.filter(isChanged).map(({ id }) => id)).toEqual([null]);
  const changed = typeInto(typed, { line: 0, column: "kind" }, "sleet", newRef);
  expect(changed.filter(isChanged)).toHaveLength(2);
  expect(typeInto(changed, { line: 0, column: "kind" }, "snow ", newRef).filter(isChanged)).toHaveLength(1);
});

test("a block of three rows laid on the last stored line goes over its end into new lines, and stops at the last column", () => {
  const newRef = refs();
  const block = [
    ["2026-01-06 01:00", "snow", "too far"],
    ["2026-01-07 01:00", "snow"],
    ["2026-01-08 01:00", "snow"],
  ];
  const lines = pasteBlock(mergeLines(stored, [], newRef), { line: 1, column: 1 }, block, columns, newRef);
  expect(texts(lines)).toEqual([
    "2026-01-02 04:00||snow",
    "2026-01-05 04:00|2026-01-06 01:00|snow",
    "|2026-01-07 01:00|snow",
    "|2026-01-08 01:00|snow",
    "||",
  ]);
  expect(new Set(lines.map(({ ref }) => ref)).size).toBe(5);
});

test("a saved line takes its id and version; what was typed since it was sent is still to be saved", () => {
  const newRef = refs();
  const typed = typeInto(mergeLines([], [], newRef), { line: 0, column: "kind" }, "snow", newRef);
  const ref = typed[0]?.ref ?? "";
  const sent = new Map([[ref, typed[0]?.cells ?? {}]]);
  const later = typeInto(typed, { line: 0, column: "endedAt" }, "2026-01-02 06:00", newRef);
  const [line] = withReplies(later, [{ ref, state: "saved", id: 9, version: 1 }], sent);
  expect(line).toMatchObject({ id: 9, version: 1, cells: { kind: "snow", endedAt: "2026-01-02 06:00" } });
  expect(line && isChanged(line)).toBe(true);
  const [settled] = withReplies(typed, [{ ref, state: "saved", id: 9, version: 1 }], sent);
  expect(settled && isChanged(settled)).toBe(false);
});

test("a wrong line keeps its text and its errors, and an error goes when its cell is typed in", () => {
  const newRef = refs();
  const typed = typeInto(mergeLines([], [], newRef), { line: 0, column: "kind" }, "hail", newRef);
  const replies = [{ ref: typed[0]?.ref ?? "", state: "wrong" as const, errors: { kind: "no", startedAt: "no" } }];
  const wrong = withReplies(typed, replies, new Map());
  expect(wrong[0]).toMatchObject({ cells: { kind: "hail" }, errors: { kind: "no", startedAt: "no" }, id: null });
  expect(typeInto(wrong, { line: 0, column: "kind" }, "snow", newRef)[0]?.errors).toEqual({ startedAt: "no" });
});

test("new lines from the server leave what is typed alone, with the version it was typed over", () => {
  const newRef = refs();
  const typed = typeInto(mergeLines(stored, [], newRef), { line: 0, column: "kind" }, "sleet", newRef);
  const fresh = [{ id: 1, version: 4, cells: { startedAt: "2026-01-02 05:00", kind: "snow" } }];
  const merged = mergeLines(fresh, typed, newRef);
  expect(merged[0]).toMatchObject({ id: 1, version: 3, cells: { kind: "sleet" } });
  expect(texts(merged)).toEqual(["2026-01-02 04:00||sleet", "||"]);
});

test("a line keeps its name when it comes back stored, so that the cursor stays in it", () => {
  const newRef = refs();
  const typed = typeInto(mergeLines([], [], newRef), { line: 0, column: "kind" }, "snow", newRef);
  const ref = typed[0]?.ref ?? "";
  const saved = withReplies(typed, [{ ref, state: "saved", id: 1, version: 1 }], new Map([[ref, { kind: "snow" }]]));
  const merged = mergeLines([{ id: 1, version: 1, cells: { kind: "snow" } }], saved, newRef);
  expect(merged[0]?.ref).toBe(ref);
  expect(merged).toHaveLength(2);
});
