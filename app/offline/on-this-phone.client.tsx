import type { YardKit } from "#app/domain/calibration/yard-kit.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { standingWords } from "./standing-words.ts";
import type { Draft } from "./draft.ts";
import { useYard } from "./use-yard.client.ts";

type LineProps = { draft: Draft; kit: YardKit | null; connection: Parameters<typeof standingWords>[1] };

function Line({ draft, kit, connection }: LineProps) {
  const { sheet, clientRef } = draft;
  const unit = kit?.trucks.find(({ id }) => id === sheet.truckId)?.unitNumber ?? "?";
  const material = kit?.materials.find(({ id }) => id === sheet.materialId)?.name ?? "";
  const { words, isOnPhoneOnly } = standingWords(draft, connection);
  return (
    <li className="border-b border-rule first:border-t">
      <a
        href={`/fleet/worksheets/${clientRef}`}
        className="flex min-h-14 flex-wrap items-center justify-between gap-x-4 py-2 text-asphalt no-underline hover:underline"
      >
        <span>
          <b>
            Truck {unit}, {material.toLowerCase()}
          </b>{" "}
          <span className="text-gravel">{formatShortDay(sheet.testedOn)}</span>
        </span>
        <span className={`text-table ${isOnPhoneOnly ? "font-semibold" : "text-gravel"}`}>{words}</span>
      </a>
    </li>
  );
}

/** The worksheets on this phone, each with where it stands. */
export function OnThisPhone() {
  const { snapshot } = useYard(null);
  const { drafts, kit, connection } = snapshot;
  if (snapshot.phase === "broken") return <p>This browser keeps nothing, so worksheets cannot be filled in here.</p>;
  if (drafts.length === 0) return <p className="text-gravel">None is on this phone.</p>;
  return (
    <ul>
      {drafts.map((draft) => (
        <Line key={draft.clientRef} draft={draft} kit={kit} connection={connection} />
      ))}
    </ul>
  );
}
