import type { ComponentProps } from "react";
import { FieldError, fieldTies, type FieldWords } from "./field-frame.tsx";

type Props = FieldWords & Omit<ComponentProps<"input">, keyof FieldWords | "className" | "type">;

/** One thing to tick. The words are part of the target. */
export function CheckField({ name, label, hint, error, id, ...rest }: Props) {
  const words = { name, label, hint, error, id };
  const ties = fieldTies(words);
  return (
    <div className="max-w-measure">
      <label htmlFor={ties.id} className="flex min-h-target cursor-pointer items-start gap-3 py-2">
        <input {...rest} type="checkbox" {...ties} className="mt-px size-6 flex-none accent-spruce" />
        <span>{label}</span>
      </label>
      <FieldError id={`${ties.id}-error`} error={error} />
      {hint !== undefined && (
        <p id={`${ties.id}-hint`} className="text-note text-gravel">
          {hint}
        </p>
      )}
    </div>
  );
}
