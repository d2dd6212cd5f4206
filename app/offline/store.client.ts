import { type DBSchema, type IDBPDatabase, openDB } from "idb";
import type { YardKit } from "#app/domain/calibration/yard-kit.ts";
import type { Draft, Message } from "./draft.ts";

// The stores hold what this program wrote; their version goes up whenever the shape of a draft does.
type Schema = DBSchema & {
  /** Under "now": who was signed in last on this phone. */
  who: { key: string; value: { owner: string } };
  kit: { key: string; value: { owner: string; kit: YardKit; fetchedAtMs: number } };
  draft: { key: [string, string]; value: Draft; indexes: { owner: string } };
  message: { key: string; value: Message; indexes: { owner: string } };
};

let opening: Promise<IDBPDatabase<Schema>> | null = null;

function database() {
  opening ??= openDB<Schema>("commonweigh-worksheets", 1, {
    upgrade(db) {
      db.createObjectStore("who");
      db.createObjectStore("kit", { keyPath: "owner" });
      db.createObjectStore("draft", { keyPath: ["owner", "clientRef"] }).createIndex("owner", "owner");
      db.createObjectStore("message", { keyPath: "opId" }).createIndex("owner", "owner");
    },
    blocking(_current, _next, event) {
      // Another tab runs a newer program: let it in.
      if (event.target instanceof IDBDatabase) event.target.close();
      opening = null;
    },
  });
  return opening;
}

/** Whose worksheets this phone shows now; null after signing out. */
export async function readOwner(): Promise<string | null> {
  const who = await (await database()).get("who", "now");
  return who?.owner ?? null;
}

/** After signing out: drafts stay for their owner, and nobody else sees them. */
export async function forgetOwner(): Promise<void> {
  await (await database()).delete("who", "now");
}

export async function readKit(owner: string): Promise<YardKit | null> {
  const row = await (await database()).get("kit", owner);
  return row?.kit ?? null;
}

export async function keepKit(owner: string, kit: YardKit): Promise<void> {
  const db = await database();
  const transaction = db.transaction(["who", "kit"], "readwrite");
  await Promise.all([
    transaction.objectStore("who").put({ owner }, "now"),
    transaction.objectStore("kit").put({ owner, kit, fetchedAtMs: Date.now() }),
    transaction.done,
  ]);
}

export async function listDrafts(owner: string): Promise<Draft[]> {
  return (await database()).getAllFromIndex("draft", "owner", owner);
}

export async function readDraft(owner: string, clientRef: string): Promise<Draft | null> {
  return (await (await database()).get("draft", [owner, clientRef])) ?? null;
}

/**
 * Change a draft in one transaction: what another tab or the sender wrote meanwhile is what `change` is given.
 *
 * @returns the draft as it stands now; null when there is none and none was made
 */
export async function changeDraft(
  owner: string,
  clientRef: string,
  change: (draft: Draft | null) => Draft | null,
): Promise<Draft | null> {
  const db = await database();
  const transaction = db.transaction("draft", "readwrite");
  const before = (await transaction.store.get([owner, clientRef])) ?? null;
  const after = change(before);
  if (after && after !== before) await transaction.store.put(after);
  await transaction.done;
  return after;
}

export async function removeDraft(owner: string, clientRef: string): Promise<void> {
  await (await database()).delete("draft", [owner, clientRef]);
}

export async function listMessages(owner: string): Promise<Message[]> {
  return (await database()).getAllFromIndex("message", "owner", owner);
}

/** Write a message down before it is sent. */
export async function keepMessage(message: Message): Promise<void> {
  await (await database()).put("message", message);
}

/** The answer has come: the message goes, and the draft says what came of it, both or neither. */
export async function settleMessage(message: Message, change: (draft: Draft) => Draft): Promise<Draft | null> {
  const db = await database();
  const transaction = db.transaction(["draft", "message"], "readwrite");
  const drafts = transaction.objectStore("draft");
  const before = await drafts.get([message.owner, message.clientRef]);
  const after = before ? change(before) : null;
  if (after) await drafts.put(after);
  await transaction.objectStore("message").delete(message.opId);
  await transaction.done;
  return after;
}
