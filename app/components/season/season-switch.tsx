import { TextLink } from "#app/components/ui/text-link.tsx";
import { seasonLabel } from "#app/domain/dates.ts";

type Props = {
  seasonStartYears: readonly number[];
  current: number;
  /** Where a season's page is. */
  toOf: (seasonStartYear: number) => string;
};

/** The same page of another season. */
export function SeasonSwitch({ seasonStartYears, current, toOf }: Props) {
  const others = seasonStartYears.filter((year) => year !== current);
  if (others.length === 0) return null;
  return (
    <p className="mt-6 text-gravel print:hidden">
      Other seasons:{" "}
      {others.map((year, position) => (
        <span key={year}>
          {position > 0 && ", "}
          <TextLink to={toOf(year)} className="whitespace-nowrap">
            {seasonLabel(year)}
          </TextLink>
        </span>
      ))}
    </p>
  );
}
