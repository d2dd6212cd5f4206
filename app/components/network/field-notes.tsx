import { TextField } from "#app/components/forms/field.tsx";
import type { Finding } from "#app/domain/finding.ts";
import { figureFields, figureFieldWords } from "#app/domain/season/figure-fields.ts";

type Props = { findings: readonly Finding[]; values: Record<string, string>; errors: Record<string, string> };

/** A note for each field: those the checks named stand open, the others behind a line. */
export function FieldNotes({ findings, values, errors }: Props) {
  const named = new Set<string>(findings.map(({ field }) => field));
  const isWritten = (field: string) => values[`note-${field}`] !== undefined && values[`note-${field}`] !== "";
  const open = figureFields.filter((field) => named.has(field) || isWritten(field));
  const rest = figureFields.filter((field) => !open.includes(field));
  const noteField = (field: (typeof figureFields)[number]) => (
    <TextField
      key={field}
      name={`note-${field}`}
      label={`Note on ${figureFieldWords[field].charAt(0).toLowerCase()}${figureFieldWords[field].slice(1)}`}
      isOptional
      maxLength={500}
      defaultValue={values[`note-${field}`] ?? ""}
      error={errors[`note-${field}`]}
    />
  );
  return (
    <>
      {open.length > 0 && <div className="grid gap-x-8 gap-y-4 sm:grid-cols-2">{open.map(noteField)}</div>}
      {rest.length > 0 && (
        <details className="group">
          <summary className="flex min-h-target w-fit list-none items-center font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2">
            Notes on other fields
          </summary>
          <div className="mt-2 grid gap-x-8 gap-y-4 sm:grid-cols-2">{rest.map(noteField)}</div>
        </details>
      )}
    </>
  );
}
