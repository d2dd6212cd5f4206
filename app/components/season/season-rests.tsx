import { MarginSection } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { type SeverityCategory, severityCategoryNames } from "#app/domain/severity/severity-category.ts";
import { flaggedUnexplainedShare, type StockBalance } from "#app/domain/season/stock-balance.ts";
import { formatOneDecimal, formatShareOneDecimal, formatTons, formatWhole } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";

type Props = {
  seasonStartYear: number;
  basis: {
    draft: { eventCount: number; laneMiles: number | null };
    stormLineCount: number;
    materials: readonly { id: number; name: string; kind: string; balance: StockBalance }[];
  };
  fleet: { truckCount: number; calibratedCount: number };
  winter: { points: number; category: SeverityCategory | null } | null;
  /** On the coordinator's pages there is nowhere to go. */
  hasLinks?: boolean;
};

/** What a season's figures rest on: roads, storms, piles, trucks, winter. */
export function SeasonRests({ seasonStartYear, basis, fleet, winter, hasLinks = true }: Props) {
  const season = `/season/${seasonStartYear}`;
  const solids = basis.materials.filter(({ kind }) => kind !== "brine");
  const linked = (words: string, to: string) => (hasLinks ? <TextLink to={to}>{words}</TextLink> : words);
  return (
    <>
      <MarginSection title="Roads">
        <p className="mt-1">
          {basis.draft.laneMiles === null
            ? linked("Lane miles by road class are not written down", "/season/roads")
            : linked(`${formatOneDecimal(basis.draft.laneMiles)} lane miles by road class`, "/season/roads")}
        </p>
      </MarginSection>
      <MarginSection title="Storms">
        <p className="mt-1">
          {linked(
            basis.stormLineCount === 0
              ? "No storm is in the log"
              : `${sentenceStart(countWords(basis.draft.eventCount, "storm", "storms"))} in ${formatWhole(basis.stormLineCount)} lines`,
            `${season}/storms`,
          )}
        </p>
      </MarginSection>
      <MarginSection title="Piles">
        <ul className="mt-1">
          {solids.map(({ id, name, balance }) => (
            <li key={id}>
              {linked(name, `${season}/stock`)}: <PileWords balance={balance} />
            </li>
          ))}
        </ul>
      </MarginSection>
      <MarginSection title="Trucks">
        <p className="mt-1">
          {fleet.truckCount === 0
            ? "No spreading truck is in the fleet."
            : `${fleet.calibratedCount} of ${fleet.truckCount} calibrated for the season.`}
        </p>
      </MarginSection>
      <MarginSection title="Winter">
        <p className="mt-1">
          {winter === null
            ? linked("Its severity is not known", `${season}/winter`)
            : linked(
                `${formatWhole(winter.points)} points${winter.category === null ? "" : `, ${winter.category} ${severityCategoryNames[winter.category]}`}`,
                `${season}/winter`,
              )}
        </p>
      </MarginSection>
    </>
  );
}

function PileWords({ balance }: { balance: StockBalance }) {
  if (balance.usedLb === null) return "not measured at both ends";
  const share = balance.unexplainedShare;
  if (share === null) return `${formatTons(balance.usedLb)} tons used`;
  const isOver = Math.abs(share) > flaggedUnexplainedShare;
  return (
    <span className={isOver ? "font-bold text-rust" : ""}>
      {formatTons(balance.usedLb)} tons used, {formatShareOneDecimal(share)} unexplained
    </span>
  );
}
