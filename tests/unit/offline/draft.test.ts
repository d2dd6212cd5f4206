import { expect, test } from "vitest";
import {
  afterAnswer,
  edited,
  finishing,
  messageOf,
  needsSending,
  newDraft,
  settled,
  standingOf,
  withCopy,
} from "#app/offline/draft.ts";
import { aSheet } from "./sheets.ts";

const owner = "7:3";
const draft = newDraft(owner, aSheet(), 1);
const message = messageOf(draft, "op", "Android");

test("a new worksheet is on this phone only until the server has saved it", () => {
  expect(standingOf(draft, false)).toBe("phone-only");
  expect(standingOf(draft, true)).toBe("sending");
  const saved = afterAnswer(draft, message, { outcome: "saved", version: 1 });
  expect(standingOf(saved, false)).toBe("arrived");
  expect(needsSending(saved)).toBe(false);
  expect(messageOf(saved, "op2", "Android").baseVersion).toBe(1);
});

test("what was typed while a message was on its way stays, and is owed", () => {
  const typed = edited(draft, aSheet({ note: "damp" }), 2);
  const saved = afterAnswer(typed, message, { outcome: "saved", version: 1 });
  expect(saved.sheet.note).toBe("damp");
  expect(needsSending(saved)).toBe(true);
});

test("what was typed after the sheet was finished is not lost: it stands beside the calibration", () => {
  const typed = edited(finishing(draft, 2), aSheet({ note: "damp" }), 3);
  const answer = { outcome: "finished", version: 1, calibrationId: 44 } as const;
  const done = afterAnswer(typed, message, answer);
  expect(done.sheet.note).toBe("damp");
  expect(done.conflict).toMatchObject({ theirs: aSheet(), calibrationId: 44 });
  expect(needsSending(done)).toBe(false);
});

test("a version that met another one is not sent again until it is settled, and then says what it settles", () => {
  const theirs = aSheet({ note: "theirs" });
  const conflict = {
    outcome: "conflict",
    theirs,
    version: 5,
    device: "",
    keptVersionId: 9,
    calibrationId: null,
  } as const;
  const met = afterAnswer(draft, message, conflict);
  expect(needsSending(met)).toBe(false);
  expect(met.sheet).toEqual(aSheet());
  const next = settled(met, aSheet({ note: "both" }), 4);
  expect(messageOf(next, "op2", "")).toMatchObject({ baseVersion: 5, settles: [9], sheet: { note: "both" } });
  const saved = afterAnswer(next, messageOf(next, "op2", ""), { outcome: "saved", version: 6 });
  expect(saved.settles).toEqual([]);
});

test("the server's copy replaces what has arrived, and never what is on this phone only", () => {
  const copy = { sheet: aSheet({ note: "newer" }), version: 3, calibrationId: null };
  expect(withCopy(draft, copy, owner, 5)).toBe(draft);
  const arrived = afterAnswer(draft, message, { outcome: "saved", version: 1 });
  expect(withCopy(arrived, copy, owner, 5)).toMatchObject({ baseVersion: 3, sheet: { note: "newer" } });
  expect(withCopy(null, copy, owner, 5)).toMatchObject({ owner, isDirty: false, baseVersion: 3 });
});

test("errors that the server finds end the waiting and keep the sheet", () => {
  const problems = [{ code: "no-catch", severity: "error", field: "catches", message: "Weigh one." }] as const;
  const asked = finishing(draft, 2);
  const sent = messageOf(asked, "op", "");
  const answered = afterAnswer(asked, sent, { outcome: "not-finished", version: 1, problems: [...problems] });
  expect(answered).toMatchObject({ wantsFinish: false, isDirty: false, problems, calibrationId: null });
});

test("a finished sheet takes nothing more", () => {
  const done = afterAnswer(draft, message, { outcome: "finished", version: 1, calibrationId: 44 });
  expect(edited(done, aSheet({ note: "late" }), 9)).toBe(done);
  expect(standingOf(done, false)).toBe("finished");
});
