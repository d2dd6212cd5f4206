import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatInstant } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords } from "#app/lib/words.ts";
import { listTrail } from "#app/services/audit.server.ts";
import type { Route } from "./+types/audit";

export const handle = { notForSharing: true };

const pageSize = 100;

export async function loader({ url }: Route.LoaderArgs) {
  const before = url.searchParams.get("before");
  return { entries: await listTrail(pageSize, before === null ? null : idParam(before, "page of the trail")) };
}

export const meta: Route.MetaFunction = () => [{ title: "Trail · Commonweigh" }];

export default function Audit({ loaderData: { entries } }: Route.ComponentProps) {
  const [newest] = entries;
  const last = entries.at(-1);
  return (
    <Page>
      <Answer>
        {newest
          ? `The last thing done was “${newest.action}”, ${formatInstant(newest.at)}.`
          : "Nothing has been done yet."}
      </Answer>
      <Method>Who did what, newest first. Entries are added and never changed.</Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {entries.length > 0 && (
        <Timetable
          caption={`${countWords(entries.length, "entry", "entries")}, newest first`}
          columns={[
            { key: "when", label: "when" },
            { key: "who", label: "who" },
            { key: "town", label: "town" },
            { key: "did", label: "did" },
            { key: "what", label: "to" },
          ]}
          rows={entries.map((entry) => ({
            key: String(entry.id),
            cells: {
              when: formatInstant(entry.at),
              who: entry.actorName === null ? entry.actorRole : `${entry.actorName}, ${entry.actorRole}`,
              town: entry.townName ?? "–",
              did: entry.action,
              what: entry.entityId === null ? entry.entity : `${entry.entity} ${entry.entityId}`,
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
