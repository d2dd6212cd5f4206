import { FootButton, SheetFrame } from "#app/components/worksheet/sheet-frame.tsx";
import { Say } from "#app/components/worksheet/yard-field.tsx";
import { linkClass } from "#app/components/ui/text-link.tsx";
import type { Draft } from "./draft.ts";
import type { Snapshot } from "./session.client.ts";

function signInAddress() {
  return `/login?${new URLSearchParams({ returnTo: window.location.pathname })}`;
}

/** In place of a worksheet that cannot be shown: why, and what to do. */
export function YardMessage({ snapshot: { phase, connection } }: { snapshot: Snapshot }) {
  const isSignedOut = connection === "signed-out";
  return (
    <SheetFrame
      title="Worksheet"
      standing={null}
      steps={[]}
      foot={
        phase === "absent" && isSignedOut ? (
          <FootButton onClick={() => window.location.assign(signInAddress())}>Sign in</FootButton>
        ) : undefined
      }
    >
      <Say>{messageWords(phase, connection)}</Say>
      {phase === "absent" && !isSignedOut && (
        <p className="mt-2 leading-snug text-gravel">
          It may be on another phone, or it has not been opened here while there was signal.
        </p>
      )}
    </SheetFrame>
  );
}

function messageWords(phase: Snapshot["phase"], connection: Snapshot["connection"]) {
  if (phase === "broken") {
    return "This browser keeps nothing, so a worksheet would be lost. Leave private browsing, or free some space, and open it again.";
  }
  if (phase !== "absent") return "Opening the worksheet …";
  if (connection === "signed-out") return "Sign in to open your worksheets.";
  return connection === "offline"
    ? "There is no signal, and this is not on this phone."
    : "There is no such worksheet here.";
}

/** What keeps a worksheet from travelling, when it is something other than signal. */
export function SendNotice({ snapshot: { connection }, draft }: { snapshot: Snapshot; draft: Draft }) {
  if (draft.refusal !== null) {
    return (
      <p role="alert" className="mb-3 border-t-4 border-rust pt-2 leading-snug">
        <b className="text-rust">Not taken.</b> {draft.refusal}
      </p>
    );
  }
  if (!draft.isDirty || (connection !== "signed-out" && connection !== "other-person")) return null;
  return (
    <p role="status" className="mb-3 border-t-4 border-line pt-2 leading-snug">
      {connection === "signed-out"
        ? "You are signed out. All is kept on this phone; "
        : "Somebody else is signed in on this phone. This worksheet stays here and is not sent; "}
      <a href={signInAddress()} className={linkClass}>
        sign in to send it
      </a>
      .
    </p>
  );
}
