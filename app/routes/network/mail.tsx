import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Over } from "#app/components/ui/state-mark.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatInstant } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { listOutbox, type OutboxLine } from "#app/services/outbox.server.ts";
import type { Route } from "./+types/mail";

export const handle = { notForSharing: true };

export async function loader() {
  return { mails: await listOutbox() };
}

export const meta: Route.MetaFunction = () => [{ title: "Mail · Commonweigh" }];

const stateWords: Record<OutboxLine["state"], string> = {
  queued: "waits",
  sending: "is being sent",
  sent: "sent",
  uncertain: "may have gone out; not sent again",
  dead: "given up",
};

export default function Mail({ loaderData: { mails } }: Route.ComponentProps) {
  const stuck = mails.filter(({ state }) => state === "dead" || state === "uncertain").length;
  const waiting = mails.filter(({ state }) => state === "queued" || state === "sending").length;
  return (
    <Page>
      <Answer>
        {stuck > 0
          ? `${sentenceStart(countWords(stuck, "mail needs", "mails need"))} a look; ${countWords(waiting, "waits", "wait")}.`
          : waiting > 0
            ? `${sentenceStart(countWords(waiting, "mail waits", "mails wait"))} to be sent.`
            : "No mail waits, and none is stuck."}
      </Answer>
      <Method>The last sixty days. A mail that could not be sent is tried again for a day; none is sent twice.</Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {mails.length === 0 ? (
        <EmptyState title="Mails to towns and people stand here">
          Invitations, seasons accepted or sent back, new editions.
        </EmptyState>
      ) : (
        <Timetable
          caption="Mails, newest first, at most 200"
          columns={[
            { key: "to", label: "to" },
            { key: "subject", label: "subject", isProse: true },
            { key: "state", label: "state" },
            { key: "when", label: "when" },
          ]}
          rows={mails.map((mail) => ({
            key: String(mail.id),
            cells: {
              to: mail.toName,
              subject: mail.subject,
              state:
                mail.state === "dead" || mail.state === "uncertain" ? (
                  <Over>{stateWords[mail.state]}</Over>
                ) : (
                  stateWords[mail.state]
                ),
              when: formatInstant(mail.sentAt ?? mail.createdAt),
            },
          }))}
        />
      )}
    </Page>
  );
}
