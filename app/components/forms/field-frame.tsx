import type { ReactNode } from "react";

export type FieldWords = {
  name: string;
  label: ReactNode;
  /** How to fill it in; stands under the label's field before anything goes wrong. */
  hint?: ReactNode;
  /** What is wrong and what would be right, in words. The value typed is kept. */
  error?: string | readonly string[] | null;
  /** Says so beside the label. Fields are needed unless they say otherwise. */
  isOptional?: boolean;
  /** Only where two forms on a page share a name. */
  id?: string;
  /** For long words: as wide as a line of text. */
  isWide?: boolean;
};

export const fieldLook =
  "block min-h-target w-full rounded-field border-[1.5px] border-rule-field bg-snow px-3 py-2 text-m text-asphalt placeholder:text-gravel focus:border-spruce focus:outline-3 focus:outline-offset-2 focus:outline-asphalt aria-invalid:border-2 aria-invalid:border-rust disabled:bg-frost disabled:text-gravel";

/** The attributes that tie a control to its label, hint and error; the same ids the error summary links to. */
export function fieldTies({ name, id, hint, error }: FieldWords) {
  const controlId = id ?? name;
  const describedBy = [
    hasError(error) ? `${controlId}-error` : null,
    hint === undefined ? null : `${controlId}-hint`,
  ].filter((part) => part !== null);
  return {
    id: controlId,
    name,
    "aria-invalid": hasError(error) || undefined,
    "aria-describedby": describedBy.length > 0 ? describedBy.join(" ") : undefined,
  };
}

/** Label above, error in words beside the field, hint under it. */
export function FieldFrame({ words, children }: { words: FieldWords; children: ReactNode }) {
  const controlId = words.id ?? words.name;
  return (
    <div className={words.isWide === true ? "max-w-measure" : "max-w-field"}>
      <label htmlFor={controlId} className="mb-1 block font-semibold">
        {words.label}
        {words.isOptional === true && <span className="font-normal text-gravel"> (may be left empty)</span>}
      </label>
      {children}
      <FieldError id={`${controlId}-error`} error={words.error} />
      {words.hint !== undefined && (
        <p id={`${controlId}-hint`} className="mt-1 text-note text-gravel">
          {words.hint}
        </p>
      )}
    </div>
  );
}

export function FieldError({ id, error }: { id: string; error: FieldWords["error"] }) {
  if (!hasError(error)) return null;
  return (
    <p id={id} className="mt-1 text-table font-semibold text-rust">
      <svg viewBox="0 0 10 10" aria-hidden="true" className="mr-1 inline-block size-[0.72em] fill-current">
        <path d="M5 0 10 10H0z" />
      </svg>
      {typeof error === "string" ? error : error?.join(" ")}
    </p>
  );
}

function hasError(error: FieldWords["error"]) {
  return error !== undefined && error !== null && error.length > 0;
}
