import { NumberField } from "#app/components/forms/field.tsx";
import { formatWhole } from "#app/lib/format.ts";
import { bandKinds, type BandErrors, type TypedBands } from "./band-form.ts";

type Standing = { lowLbPerLaneMile: number; highLbPerLaneMile: number; origin: string } | null;

const kindWords = { salt: "Straight salt", mix: "Salt and sand mixed", sand: "Sand" };

type Props = {
  typed: TypedBands;
  errors: BandErrors;
  /** What holds when both fields of a kind are left empty, by kind. */
  fallback: Record<(typeof bandKinds)[number], Standing>;
  fallbackWords: string;
};

/** From and to for each kind of material; both empty is a choice, too. */
export function BandFields({ typed, errors, fallback, fallbackWords }: Props) {
  return (
    <div className="grid gap-6">
      {bandKinds.map((kind) => {
        const standing = fallback[kind];
        const range = standing
          ? `${formatWhole(standing.lowLbPerLaneMile)} to ${formatWhole(standing.highLbPerLaneMile)} lb`
          : "no band";
        return (
          <fieldset key={kind} className="border-b border-rule pb-5">
            <legend className="mb-2 text-head font-bold">{kindWords[kind]}</legend>
            <div className="flex flex-wrap gap-x-8 gap-y-4">
              {(["low", "high"] as const).map((end) => (
                <NumberField
                  key={end}
                  name={`${kind}-${end}`}
                  label={end === "low" ? "From" : "To"}
                  unit="lb per lane mile"
                  defaultValue={typed[`${kind}-${end}`] ?? ""}
                  error={errors[`${kind}-${end}`] ?? null}
                />
              ))}
            </div>
            <p className="mt-1 text-note text-gravel">
              Left empty: {fallbackWords}, {range}.
            </p>
          </fieldset>
        );
      })}
    </div>
  );
}
