import { afterAnswer, type Message, messageOf, needsSending, ownerKey } from "./draft.ts";
import { isKitAnswer, isSyncAnswer, type KitAnswer } from "./answers.ts";
import { keepKit, keepMessage, listDrafts, listMessages, settleMessage } from "./store.client.ts";

export type SendState = { kind: "sent" | "offline" | "signed-out" | "other-person" | "waiting" };

const answerTimeoutMs = 20_000;

function deviceWords() {
  const system = ["Android", "iPhone", "iPad", "Windows", "Mac OS", "Linux"].find((name) =>
    navigator.userAgent.includes(name),
  );
  return system ?? "another device";
}

/** Null when there is no way to the server; a status of 0 when it sent us to sign in. */
async function ask(address: string, init?: RequestInit): Promise<{ status: number; body: unknown } | null> {
  try {
    const signal = AbortSignal.timeout(answerTimeoutMs);
    const response = await fetch(address, { ...init, redirect: "manual", signal });
    if (response.type === "opaqueredirect" || response.status === 401) return { status: 0, body: null };
    return { status: response.status, body: await response.json().catch(() => null) };
  } catch {
    return null;
  }
}

/** Fetch what the yard needs, and the server's copy of one worksheet; the phone then belongs to whoever is signed in. */
export async function fetchKit(clientRef: string | null): Promise<KitAnswer | "offline" | "signed-out"> {
  const query = clientRef === null ? "" : `?worksheet=${encodeURIComponent(clientRef)}`;
  const answer = await ask(`/fleet/worksheets/kit${query}`);
  if (answer?.status === 0 || answer?.status === 403) return "signed-out";
  if (!answer || !isKitAnswer(answer.body)) return "offline";
  await keepKit(ownerKey(answer.body.kit), answer.body.kit);
  return answer.body;
}

async function send(message: Message): Promise<SendState["kind"]> {
  const answer = await ask("/fleet/worksheets/sync", {
    method: "POST",
    headers: { "Content-Type": "application/json" },
    body: JSON.stringify(message),
  });
  if (!answer) return "offline";
  if (answer.status === 0) return "signed-out";
  // Signed in as somebody else: drafts of one person never travel under another's name.
  if (answer.status === 403) return "other-person";
  if (isSyncAnswer(answer.body)) {
    const { body: said } = answer;
    await settleMessage(message, (draft) => afterAnswer(draft, message, said));
    return "sent";
  }
  if (answer.status === 404) {
    const words = "The truck or the material is no longer one of this town’s. What you typed is kept on this phone.";
    await settleMessage(message, (draft) => afterAnswer(draft, message, { outcome: "refused", message: words }));
    return "sent";
  }
  return "offline";
}

async function sendAll(owner: string, onProgress: () => void): Promise<SendState["kind"]> {
  // Messages from before come first, as they were: one of them may have arrived without our hearing of it.
  for (let round = 0; round < 20; round++) {
    const messages = await listMessages(owner);
    const waiting = new Set(messages.map(({ clientRef }) => clientRef));
    for (const draft of (await listDrafts(owner)).filter((one) => needsSending(one) && !waiting.has(one.clientRef))) {
      const message = messageOf(draft, crypto.randomUUID(), deviceWords());
      await keepMessage(message);
      messages.push(message);
    }
    if (messages.length === 0) return "sent";
    onProgress();
    for (const message of messages) {
      const outcome = await send(message);
      if (outcome !== "sent") return outcome;
      onProgress();
    }
  }
  return "waiting";
}

/**
 * Send everything that this owner's worksheets still owe the server; one tab of the phone at a time.
 *
 * @param onProgress - called whenever a draft may have changed
 */
export async function sendWorksheets(owner: string, onProgress: () => void): Promise<SendState["kind"]> {
  if (!("locks" in navigator)) return sendAll(owner, onProgress);
  return navigator.locks.request("commonweigh-send", { ifAvailable: true }, (lock) =>
    lock === null ? "waiting" : sendAll(owner, onProgress),
  );
}
