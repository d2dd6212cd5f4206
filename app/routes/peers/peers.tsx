import { LaneStrip } from "#app/components/charts/lane-strip.tsx";
import { markedAlike, stripParts } from "#app/components/charts/lane-strip-spec.ts";
import { StripKey } from "#app/components/charts/strip-key.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { memberStripSpec } from "#app/components/peers/strip-specs.ts";
import { ToneWords } from "#app/components/peers/tone-words.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { GroupSwitch } from "#app/components/ui/group-switch.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { reasonWords } from "#app/domain/peers/cell.ts";
import { type IndicatorKey, indicators } from "#app/domain/peers/indicators.ts";
import { placeSentence } from "#app/domain/peers/sentence.ts";
import { formatDay, formatWhole } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { getStanding, type StandingRow } from "#app/services/editions.server.ts";
import type { Route } from "./+types/peers";

/** The rate one can change by a turn of the gate comes first. */
const order: readonly IndicatorKey[] = ["rate-at-working-setting", "salt-per-event"];

function stripOf({ indicator, cell, ownValue, percentile }: StandingRow, townName: string) {
  const own = ownValue === null ? null : { value: ownValue, percentile, townName };
  const spec = memberStripSpec({ indicator, cell, own });
  const sentence = placeSentence({ indicator, ownValue, cell, percentile, band: indicators[indicator].band });
  const tenths = cell.state === "shown" ? cell.tenths : null;
  return { indicator, spec, sentence, tenths };
}

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const edition = url.searchParams.get("edition");
  const standing = await getStanding(
    actor,
    edition === null ? null : idParam(edition, "edition"),
    url.searchParams.get("group") ?? "all",
  );
  if (!standing) return { standing: null };
  const { rows, ...rest } = standing;
  const drawn = order
    .flatMap((key) => rows.filter(({ indicator }) => indicator === key))
    .map((row) => stripOf(row, actor.townName));
  const specs = markedAlike(drawn.map(({ spec }) => spec));
  const strips = drawn.map((strip, position) => {
    const spec = specs[position] ?? strip.spec;
    return { ...strip, spec };
  });
  return { standing: { ...rest, strips } };
}

export const meta: Route.MetaFunction = () => [{ title: "Peers · Commonweigh" }];

export default function Peers({ loaderData: { standing } }: Route.ComponentProps) {
  if (!standing) {
    return (
      <Page>
        <Answer>No edition is published yet, so there is nothing to compare with.</Answer>
        <EmptyState
          title="Your place among towns like yours belongs here"
          action={<ButtonLink to="/season">Open the season</ButtonLink>}
        >
          The coordinator publishes an edition once enough towns have sent their season in. Sending yours brings it
          closer.
        </EmptyState>
      </Page>
    );
  }
  const { edition, editions, groups, groupKey, strips } = standing;
  const [first] = strips;
  const here = (query: Record<string, string>) =>
    `/peers?${new URLSearchParams({ edition: String(edition.id), group: groupKey, ...query })}`;
  const others = editions.filter(({ id }) => id !== edition.id);
  return (
    <Page>
      <Answer>{first && <ToneWords sentence={first.sentence} />}</Answer>
      <Method>
        {strips.slice(1).map(({ indicator, sentence }) => (
          <span key={indicator}>
            <ToneWords sentence={sentence} />{" "}
          </span>
        ))}
        Only your town sees its own flag.
      </Method>
      <GroupSwitch
        label="Compare with"
        menu={{ action: "/peers", name: "group", fields: { edition: String(edition.id) } }}
        choices={groups.map(({ key, label, towns, reason }) => ({
          key,
          label,
          part: partWords(key),
          to: here({ group: key }),
          isCurrent: key === groupKey,
          ...(towns === null ? {} : { townCountWords: String(towns) }),
          ...(reason === null ? {} : { hiddenReason: reasonWords(reason) }),
        }))}
      />
      {first && <StripKey parts={keyParts(strips)} hasBand={strips.some(({ spec }) => spec.band !== null)} />}
      {strips.map(({ indicator, spec, tenths }) => (
        <LaneStrip
          key={`${indicator} ${groupKey} ${edition.id}`}
          title={indicators[indicator].name}
          spec={spec}
          tableNote={
            tenths &&
            `One town in ten lies under ${formatWhole(tenths.low)}, one in ten over ${formatWhole(tenths.high)}.`
          }
          downloadTo={`/peers/table?${new URLSearchParams({ edition: String(edition.id), group: groupKey, indicator })}`}
        />
      ))}
      <p className="mt-4 max-w-method text-note text-gravel">
        From edition {edition.number} of {seasonLabel(edition.seasonStartYear)}, published{" "}
        {formatDay(edition.publishedAt.slice(0, 10))}: {edition.townCount} contributors. Peer figures are rounded and
        counted in bins of three towns or more; no town’s own figure is in them.{" "}
        <TextLink to="/protection">How towns are protected</TextLink>
      </p>
      {others.length > 0 && (
        <p className="mt-2 text-note text-gravel print:hidden">
          Other editions:{" "}
          {others.map((other, position) => (
            <span key={other.id}>
              {position > 0 && ", "}
              <TextLink to={`/peers?edition=${other.id}`}>
                {seasonLabel(other.seasonStartYear)}, edition {other.number}
              </TextLink>
            </span>
          ))}
        </p>
      )}
    </Page>
  );
}

function partWords(groupKey: string) {
  if (groupKey.startsWith("size-")) return "by size";
  return groupKey.startsWith("district-") ? "by district" : "compare with";
}

type Strips = NonNullable<Route.ComponentProps["loaderData"]["standing"]>["strips"];

/** One key for the page: whatever any of its strips draws. */
function keyParts(strips: Strips) {
  const all = strips.map(({ spec }) => stripParts(spec));
  return {
    hasPlate: all.some((parts) => parts.hasPlate),
    hasInterval: all.some((parts) => parts.hasInterval),
    hasMiddleHalf: all.some((parts) => parts.hasMiddleHalf),
    heaps: all.find((parts) => parts.heaps !== "none")?.heaps ?? ("none" as const),
    hasFlag: all.some((parts) => parts.hasFlag),
    townsPerMark: Math.max(...all.map((parts) => parts.townsPerMark)),
  };
}
