import type { YardKit } from "#app/domain/calibration/yard-kit.ts";
import type { Worksheet } from "#app/domain/calibration/worksheet.ts";
import { type Draft, edited, finishing, newDraft, ownerKey, settled, withCopy } from "./draft.ts";
import type { RunningCount } from "#app/components/worksheet/running-count.ts";
import { fetchKit, sendWorksheets, type SendState } from "./sender.client.ts";
import { changeDraft, listDrafts, readDraft, readKit, readOwner, removeDraft } from "./store.client.ts";

export type Snapshot = {
  /** "absent": the phone has no such worksheet and cannot fetch it; "broken": the browser keeps nothing. */
  phase: "opening" | "absent" | "ready" | "broken";
  kit: YardKit | null;
  /** The one open worksheet. */
  draft: Draft | null;
  /** All of this owner's on the phone; newest first. */
  drafts: Draft[];
  connection: SendState["kind"] | "sending";
};

const sendAfterMs = 1500;
const sendEveryMs = 30_000;
const keptFinishedMs = 30 * 24 * 3600 * 1000;
const channelName = "commonweigh-worksheets";

/** Finished, arrived, and a month old: the server has it, the phone need not. */
function isDoneWith({ calibrationId, isDirty, conflict, editedAtMs }: Draft) {
  return calibrationId !== null && !isDirty && conflict === null && Date.now() - editedAtMs > keptFinishedMs;
}

/**
 * The worksheets of this phone, with one of them open: reads them, keeps every keystroke, sends what is owed whenever
 * there is a way.
 *
 * @param clientRef - the worksheet to open, or null for none
 */
export function openYard(clientRef: string | null) {
  let snapshot: Snapshot = { phase: "opening", kit: null, draft: null, drafts: [], connection: "sent" };
  let owner: string | null = null;
  /** Typed and not yet written; the newest only. */
  let unwritten: Draft | null = null;
  let isWriting = false;
  /** Counts what was typed, so that what was read before it is known to be old. */
  let editCount = 0;
  let sendTimer: ReturnType<typeof setTimeout> | undefined;
  let isOpen = false;
  let interval: ReturnType<typeof setInterval> | undefined;
  let channel: BroadcastChannel | null = null;
  const listeners = new Set<() => void>();

  function show(change: Partial<Snapshot>) {
    if (!isOpen) return;
    snapshot = { ...snapshot, ...change };
    for (const listener of listeners) listener();
  }

  async function reread() {
    if (owner === null) return;
    const before = editCount;
    const drafts = (await listDrafts(owner)).sort((a, b) => b.editedAtMs - a.editedAtMs);
    const stored = drafts.find((one) => one.clientRef === clientRef) ?? null;
    // What was typed meanwhile is newer than what was read: the writing shows it, with whatever the sender has noted.
    if (unwritten || editCount !== before) return show({ drafts });
    show({ drafts, draft: stored ?? snapshot.draft });
  }

  async function write() {
    if (isWriting) return;
    isWriting = true;
    try {
      while (unwritten) {
        const typed: Draft = unwritten;
        const { sheet, running, wantsFinish, editedAtMs } = typed;
        const stored = await changeDraft(typed.owner, typed.clientRef, (before) => {
          if (!before) return typed;
          const next = wantsFinish ? finishing({ ...before, sheet }, editedAtMs) : edited(before, sheet, editedAtMs);
          const isNews = wantsFinish || JSON.stringify(before.sheet) !== JSON.stringify(sheet);
          return { ...(isNews ? next : before), running };
        });
        if (unwritten === typed) {
          unwritten = null;
          // The same sheet stays the same object, so that nothing is worked out twice for it.
          if (stored) show({ draft: stored.calibrationId === null ? { ...stored, sheet } : stored });
        }
      }
      channel?.postMessage(clientRef);
    } catch {
      show({ phase: "broken" });
    } finally {
      isWriting = false;
    }
    sendSoon(snapshot.draft?.wantsFinish === true ? 0 : sendAfterMs);
  }

  function keep(draft: Draft) {
    unwritten = draft;
    editCount += 1;
    show({ draft });
    void write();
  }

  async function send() {
    if (owner === null || !isOpen) return;
    if (!navigator.onLine) return show({ connection: "offline" });
    const connection = await sendWorksheets(owner, () => {
      show({ connection: "sending" });
      void reread();
    });
    await reread();
    show({ connection });
    channel?.postMessage(clientRef);
  }

  function sendSoon(afterMs: number) {
    clearTimeout(sendTimer);
    sendTimer = setTimeout(() => void send(), afterMs);
  }

  async function hearServer() {
    const answer = await fetchKit(clientRef);
    if (answer === "offline" || answer === "signed-out") {
      show({ connection: answer });
      if (snapshot.phase === "opening") show({ phase: "absent" });
      return;
    }
    const { kit, copy } = answer;
    if (owner !== ownerKey(kit)) {
      owner = ownerKey(kit);
      show({ draft: null, drafts: [] });
    }
    const current = owner;
    const draft =
      clientRef === null
        ? null
        : await changeDraft(current, clientRef, (before) => withCopy(before, copy, current, Date.now()));
    show({ kit, phase: clientRef !== null && !draft ? "absent" : "ready" });
    for (const old of (await listDrafts(current)).filter(isDoneWith)) await removeDraft(current, old.clientRef);
    await reread();
    await send();
  }

  async function open() {
    try {
      owner = await readOwner();
      if (owner !== null) {
        const [kit, draft] = await Promise.all([
          readKit(owner),
          clientRef === null ? null : readDraft(owner, clientRef),
        ]);
        if (kit && (draft || clientRef === null)) show({ kit, draft, phase: "ready" });
        await reread();
      }
    } catch {
      return show({ phase: "broken" });
    }
    await hearServer();
  }

  function wake() {
    if (document.visibilityState !== "visible") return;
    // Somebody may have signed in elsewhere on this phone, or signal may have come back.
    if (snapshot.phase === "absent") return void hearServer();
    void reread();
    sendSoon(0);
  }
  const goneOffline = () => show({ connection: "offline" });

  function start() {
    isOpen = true;
    channel = new BroadcastChannel(channelName);
    channel.addEventListener("message", () => void reread());
    window.addEventListener("online", wake);
    window.addEventListener("offline", goneOffline);
    document.addEventListener("visibilitychange", wake);
    interval = setInterval(wake, sendEveryMs);
    void open();
  }

  function stop() {
    isOpen = false;
    clearTimeout(sendTimer);
    clearInterval(interval);
    window.removeEventListener("online", wake);
    window.removeEventListener("offline", goneOffline);
    document.removeEventListener("visibilitychange", wake);
    channel?.close();
  }

  return {
    /** The first listener sets it going, the last one to leave ends it. */
    subscribe: (listener: () => void) => {
      listeners.add(listener);
      if (listeners.size === 1) start();
      return () => {
        listeners.delete(listener);
        if (listeners.size === 0) stop();
      };
    },
    snapshot: () => snapshot,
    /** Keep what was typed. */
    change: (sheet: Worksheet) => {
      if (snapshot.draft) keep(edited(snapshot.draft, sheet, Date.now()));
    },
    run: (running: RunningCount | null) => {
      if (snapshot.draft) keep({ ...snapshot.draft, running });
    },
    finish: () => {
      if (snapshot.draft) keep(finishing(snapshot.draft, Date.now()));
    },
    /** Begin another worksheet on this phone. @returns once it is kept */
    begin: async (sheet: Worksheet) => {
      if (owner !== null) {
        const draft = newDraft(owner, sheet, Date.now());
        await changeDraft(owner, sheet.clientRef, (before) => before ?? draft);
      }
    },
    /** What holds from now on, after two versions met. */
    settle: async (sheet: Worksheet) => {
      if (owner === null || clientRef === null) return;
      await changeDraft(owner, clientRef, (before) => before && settled(before, sheet, Date.now()));
      await reread();
      sendSoon(0);
    },
  };
}

export type Yard = ReturnType<typeof openYard>;
