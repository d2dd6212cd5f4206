import type { Draft, Standing } from "./draft.ts";
import { standingOf } from "./draft.ts";
import type { SendState } from "./sender.client.ts";

type Connection = SendState["kind"] | "sending";

const words: Record<Standing, string> = {
  "phone-only": "on this phone only",
  sending: "sending …",
  arrived: "has arrived",
  conflict: "met another version",
  refused: "on this phone only, not taken",
  finished: "has arrived, finished",
};

/** Where a worksheet is, in words. */
export function standingWords(draft: Draft, connection: Connection) {
  const standing = standingOf(draft, connection === "sending");
  const isOnPhoneOnly = standing !== "arrived" && standing !== "finished";
  const isWithoutSignal = standing === "phone-only" && connection === "offline";
  return { standing, words: isWithoutSignal ? `${words[standing]}, no signal` : words[standing], isOnPhoneOnly };
}
