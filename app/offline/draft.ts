import type { Worksheet } from "#app/domain/calibration/worksheet.ts";
import type { SyncAnswer, WorksheetCopy } from "#app/domain/calibration/worksheet-sync.ts";
import type { Finding } from "#app/domain/finding.ts";

import type { RunningCount } from "#app/components/worksheet/running-count.ts";

/** Two versions that met. `theirs` is the one that stands on the server; ours is the draft's sheet. */
export type Conflict = {
  theirs: Worksheet;
  version: number;
  device: string;
  /** Where the server keeps ours meanwhile; null when ours has not been sent. */
  keptVersionId: number | null;
  calibrationId: number | null;
};

/** A worksheet on this phone. */
export type Draft = {
  /** Whose it is: nobody else on this phone sees or sends it. */
  owner: string;
  clientRef: string;
  sheet: Worksheet;
  /** What the server held when this phone last heard of it, and its version; null and 0 before the first time. */
  baseSheet: Worksheet | null;
  baseVersion: number;
  /** Holds something that the server has not confirmed. */
  isDirty: boolean;
  wantsFinish: boolean;
  /** Kept versions that were settled with this one. */
  settles: number[];
  conflict: Conflict | null;
  /** Why the server did not make a calibration of it. */
  problems: Finding[];
  /** Why the server will not take it at all. */
  refusal: string | null;
  calibrationId: number | null;
  running: RunningCount | null;
  editedAtMs: number;
};

/** A message to the server, written down before it is sent and sent unchanged until it is answered. */
export type Message = {
  opId: string;
  owner: string;
  clientRef: string;
  baseVersion: number;
  sheet: Worksheet;
  device: string;
  isFinish: boolean;
  settles: number[];
};

/** Where a worksheet is: on this phone only, on its way, arrived, in conflict, refused, or finished. */
export type Standing = "phone-only" | "sending" | "arrived" | "conflict" | "refused" | "finished";

export function ownerKey({ userId, townId }: { userId: number; townId: number }): string {
  return `${userId}:${townId}`;
}

export function newDraft(owner: string, sheet: Worksheet, nowMs: number): Draft {
  return {
    owner,
    clientRef: sheet.clientRef,
    sheet,
    baseSheet: null,
    baseVersion: 0,
    isDirty: true,
    wantsFinish: false,
    settles: [],
    conflict: null,
    problems: [],
    refusal: null,
    calibrationId: null,
    running: null,
    editedAtMs: nowMs,
  };
}

/** The sheet with what was typed. A finished one stays as it is. */
export function edited(draft: Draft, sheet: Worksheet, nowMs: number): Draft {
  if (draft.calibrationId !== null) return draft;
  return { ...draft, sheet, isDirty: true, wantsFinish: false, problems: [], refusal: null, editedAtMs: nowMs };
}

/** Ask the server to make a calibration of it, at once or as soon as there is signal. */
export function finishing(draft: Draft, nowMs: number): Draft {
  return { ...draft, isDirty: true, wantsFinish: true, problems: [], refusal: null, editedAtMs: nowMs };
}

/**
 * The draft after hearing of the server's copy. What this phone has and the server lacks is never overwritten: it is
 * sent, and meets the copy there.
 */
export function withCopy(draft: Draft | null, copy: WorksheetCopy | null, owner: string, nowMs: number): Draft | null {
  if (!copy) return draft;
  if (draft && (draft.isDirty || draft.conflict !== null || copy.version < draft.baseVersion)) return draft;
  return {
    ...(draft ?? newDraft(owner, copy.sheet, nowMs)),
    sheet: copy.sheet,
    baseSheet: copy.sheet,
    baseVersion: copy.version,
    isDirty: false,
    calibrationId: copy.calibrationId,
  };
}

export function needsSending({ isDirty, conflict, refusal, calibrationId, settles }: Draft): boolean {
  return isDirty && conflict === null && refusal === null && (calibrationId === null || settles.length > 0);
}

export function messageOf(draft: Draft, opId: string, device: string): Message {
  const { owner, clientRef, baseVersion, sheet, wantsFinish, settles } = draft;
  return { opId, owner, clientRef, baseVersion, sheet, device, isFinish: wantsFinish, settles };
}

function isSameSheet(a: Worksheet, b: Worksheet) {
  return JSON.stringify(a) === JSON.stringify(b);
}

/** The draft after its message was answered. What was typed meanwhile stays, and is sent next. */
export function afterAnswer(draft: Draft, message: Message, answer: SyncAnswer): Draft {
  if (answer.outcome === "refused") return { ...draft, refusal: answer.message, wantsFinish: false };
  if (answer.outcome === "conflict") {
    const { theirs, version, device, keptVersionId, calibrationId } = answer;
    return { ...draft, wantsFinish: false, conflict: { theirs, version, device, keptVersionId, calibrationId } };
  }
  const heard = {
    ...draft,
    baseVersion: answer.version,
    baseSheet: message.sheet,
    settles: draft.settles.filter((id) => !message.settles.includes(id)),
  };
  if (answer.outcome === "finished") {
    const done = { ...heard, isDirty: false, wantsFinish: false };
    if (isSameSheet(draft.sheet, message.sheet)) return { ...done, calibrationId: answer.calibrationId };
    // The calibration is made of what was sent. What was typed while it was on its way is not lost: a person decides.
    const { version, calibrationId } = answer;
    return {
      ...done,
      conflict: { theirs: message.sheet, version, device: message.device, keptVersionId: null, calibrationId },
    };
  }
  const isAllSent = isSameSheet(draft.sheet, message.sheet) && draft.wantsFinish === message.isFinish;
  if (answer.outcome === "not-finished") {
    return {
      ...heard,
      isDirty: !isSameSheet(draft.sheet, message.sheet),
      wantsFinish: false,
      problems: answer.problems,
    };
  }
  return { ...heard, isDirty: !isAllSent };
}

/** The draft once a person has settled the two versions: `sheet` is what holds from now on. */
export function settled(draft: Draft, sheet: Worksheet, nowMs: number): Draft {
  const { conflict } = draft;
  if (!conflict) return draft;
  return {
    ...draft,
    sheet,
    baseSheet: conflict.theirs,
    baseVersion: conflict.version,
    calibrationId: conflict.calibrationId,
    conflict: null,
    isDirty: conflict.keptVersionId !== null || !isSameSheet(sheet, conflict.theirs),
    settles: conflict.keptVersionId === null ? draft.settles : [...draft.settles, conflict.keptVersionId],
    editedAtMs: nowMs,
  };
}

export function standingOf(draft: Draft, isSending: boolean): Standing {
  if (draft.conflict !== null) return "conflict";
  if (draft.refusal !== null) return "refused";
  if (draft.isDirty) return isSending ? "sending" : "phone-only";
  return draft.calibrationId === null ? "arrived" : "finished";
}
