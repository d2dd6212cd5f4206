import { deedWords } from "#app/components/network/trail-words.ts";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatInstant } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { listTrail } from "#app/services/audit.server.ts";
import type { Route } from "./+types/audit";

export const handle = { notForSharing: true };

const pageSize = 100;

export async function loader({ url }: Route.LoaderArgs) {
  const before = url.searchParams.get("before");
  return { entries: await listTrail(pageSize, before === null ? null : idParam(before, "page of the trail")) };
}

export const meta: Route.MetaFunction = () => [{ title: "Trail · Commonweigh" }];

type Entry = Route.ComponentProps["loaderData"]["entries"][number];

/** Jobs that nobody stands beside are done by the network itself. */
function actorWords({ actorName }: Entry) {
  return actorName ?? "the network itself";
}

function ofTown({ townName }: Entry) {
  return townName === null ? "" : ` (${townName})`;
}

export default function Audit({ loaderData: { entries } }: Route.ComponentProps) {
  const [newest] = entries;
  const last = entries.at(-1);
  return (
    <Page>
      <Answer>
        {newest
          ? `${sentenceStart(actorWords(newest))} ${deedWords(newest.action)}${ofTown(newest)}, ${formatInstant(newest.at)}.`
          : "Nothing has been done yet."}
      </Answer>
      <Method>The last thing done, and all before it. Entries are added and never changed.</Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {entries.length > 0 && (
        <Timetable
          caption={`${countWords(entries.length, "entry", "entries")}, newest first`}
          columns={[
            { key: "when", label: "when" },
            { key: "who", label: "who", isProse: true },
            { key: "did", label: "did", isProse: true },
            { key: "town", label: "town", isWideOnly: true },
            { key: "what", label: "record", isWideOnly: true },
          ]}
          rows={entries.map((entry) => ({
            key: String(entry.id),
            cells: {
              when: formatInstant(entry.at),
              who: entry.actorName === null ? actorWords(entry) : `${entry.actorName}, ${entry.actorRole}`,
              town: entry.townName ?? "–",
              did: (
                <>
                  {deedWords(entry.action)}
                  <span className="sm:hidden">{ofTown(entry)}</span>
                </>
              ),
              what: entry.entityId === null ? "–" : `no. ${entry.entityId}`,
            },
          }))}
        />
      )}
      {entries.length === pageSize && last && (
        <p className="mt-4">
          <TextLink to={`/network/audit?before=${last.id}`} weight="bold">
            Older entries
          </TextLink>
        </p>
      )}
    </Page>
  );
}
