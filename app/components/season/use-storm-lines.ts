import { useCallback, useEffect, useRef, useState } from "react";
import { z } from "zod";
import {
  type GridLine,
  isChanged,
  type LineReply,
  mergeLines,
  pasteBlock,
  type StoredLine,
  typeInto,
  withReplies,
} from "./storm-grid-lines.ts";

const Texts = z.record(z.string(), z.string());
const KeptLines = z.array(
  z.object({
    ref: z.string(),
    id: z.number().nullable(),
    version: z.number().nullable(),
    cells: Texts,
    stored: Texts.nullable(),
    errors: Texts,
    isOutdated: z.boolean(),
  }),
) satisfies z.ZodType<GridLine[]>;

function readKept(key: string): GridLine[] {
  try {
    const kept = KeptLines.safeParse(JSON.parse(localStorage.getItem(key) ?? "[]"));
    return kept.success ? kept.data : [];
  } catch {
    // Storage may be shut off, or hold something else: then nothing was kept.
    return [];
  }
}

function keep(key: string, lines: readonly GridLine[]) {
  const changed = lines.filter(isChanged);
  try {
    if (changed.length === 0) localStorage.removeItem(key);
    else localStorage.setItem(key, JSON.stringify(changed));
  } catch {
    // A full or shut storage costs the safety net, not the work on the page.
  }
}

const newRef = () => crypto.randomUUID();

export type Saving =
  | { state: "idle" }
  | { state: "saving"; lineCount: number }
  | { state: "failed"; message: string }
  | { state: "done"; savedCount: number; leftCount: number };

const Reply = z.object({
  refusal: z.string().nullable(),
  replies: z.array(
    z.discriminatedUnion("state", [
      z.object({ ref: z.string(), state: z.literal("saved"), id: z.number(), version: z.number() }),
      z.object({ ref: z.string(), state: z.literal("changed-meanwhile") }),
      z.object({ ref: z.string(), state: z.literal("wrong"), errors: Texts }),
    ]),
  ),
});
type SaveReply = { refusal: string | null; replies: LineReply[] };

/** Stored by the address that takes lines; null when the answer is none of its own: signed out, or the server away. */
async function send(address: string, lines: readonly GridLine[], signal: AbortSignal): Promise<SaveReply | null> {
  const body = JSON.stringify({ lines: lines.map(({ ref, id, version, cells }) => ({ ref, id, version, cells })) });
  const response = await fetch(address, {
    method: "POST",
    body,
    signal,
    headers: { "content-type": "application/json" },
    redirect: "manual",
  });
  if (response.status === 413) return { refusal: "These are too many lines at once. Save them in parts.", replies: [] };
  if (!response.ok) return null;
  const reply = Reply.safeParse(await response.json());
  return reply.success ? reply.data : null;
}

/**
 * The lines of the grid and what one does with them. What is typed stays in this browser until it is stored: through a
 * reload, a lost signal or an ended session.
 *
 * @param keepKey - under which the browser keeps the lines; holds person and season
 * @param address - that takes lines
 * @param onSaved - called when something was stored
 */
export function useStormLines(stored: readonly StoredLine[], keepKey: string, address: string, onSaved: () => void) {
  const [kept] = useState<GridLine[]>(() => readKept(keepKey));
  const [saving, setSaving] = useState<Saving>({ state: "idle" });
  const [seen, setSeen] = useState(stored);
  const [lines, setLines] = useState(() => mergeLines(stored, kept, newRef));
  const going = useRef<AbortController | null>(null);

  // New lines from the server: merged while drawing, so that nothing typed is lost in between.
  if (seen !== stored) {
    setSeen(stored);
    setLines((now) => mergeLines(stored, now, newRef));
  }
  useEffect(() => keep(keepKey, lines), [keepKey, lines]);
  useEffect(() => () => going.current?.abort(), []);

  const type = useCallback((line: number, column: string, value: string) => {
    setLines((now) => typeInto(now, { line, column }, value, newRef));
    setSaving((now) => (now.state === "saving" ? now : { state: "idle" }));
  }, []);
  const paste = useCallback(
    (at: { line: number; column: number }, block: readonly (readonly string[])[], columns: readonly string[]) =>
      setLines((now) => pasteBlock(now, at, block, columns, newRef)),
    [],
  );
  const drop = useCallback((ref: string) => {
    setLines((now) =>
      now.flatMap((line) => {
        if (line.ref !== ref) return [line];
        return line.stored === null ? [] : [{ ...line, cells: line.stored, errors: {}, isOutdated: false }];
      }),
    );
  }, []);

  async function save() {
    const changed = lines.filter(isChanged);
    if (changed.length === 0 || saving.state === "saving") return;
    const sentCells = new Map(changed.map(({ ref, cells }) => [ref, cells]));
    setSaving({ state: "saving", lineCount: changed.length });
    going.current = new AbortController();
    const reply = await send(address, changed, going.current.signal).catch(() => null);
    if (reply === null) {
      const message =
        "Nothing was stored: the server is away, or you have been signed out. Your lines are kept in this browser; reload the page, then save them.";
      setSaving({ state: "failed", message });
      return;
    }
    if (reply.refusal !== null) {
      setSaving({ state: "failed", message: reply.refusal });
      return;
    }
    const savedCount = reply.replies.filter(({ state }) => state === "saved").length;
    setLines((now) => withReplies(now, reply.replies, sentCells));
    setSaving({ state: "done", savedCount, leftCount: reply.replies.length - savedCount });
    if (savedCount > 0) onSaved();
  }

  return {
    lines,
    restoredCount: kept.length,
    saving,
    type,
    paste,
    drop,
    save,
    changedCount: lines.filter(isChanged).length,
  };
}
