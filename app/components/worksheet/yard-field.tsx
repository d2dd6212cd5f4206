import type { ReactNode } from "react";
import type { Editor } from "./editor.ts";

const box =
  "block h-12.5 w-full min-w-0 rounded-field border-2 bg-snow text-asphalt focus:border-spruce focus:outline-3 focus:outline-offset-1 focus:outline-asphalt disabled:bg-frost disabled:text-gravel";

/** As many as the server takes. */
const mostCharacters: Partial<Record<string, number>> = { note: 500, "gate.scaleMark": 20 };

type FigureProps = {
  editor: Editor;
  /** Path of the field, as the checks name it. */
  field: string;
  /** For the ear: "Catch 2, gross weight in lb". */
  name: string;
  value: string;
  onText: (text: string) => void;
  mode?: "decimal" | "numeric" | "text";
};

/** A figure in a row, under the row's own head: large, on the right, kept as typed. */
export function Figure({ editor, field, name, value, onText, mode = "decimal" }: FigureProps) {
  const problem = editor.problemOf(field);
  return (
    <input
      id={field}
      name={field}
      type="text"
      inputMode={mode}
      autoComplete="off"
      maxLength={40}
      aria-label={name}
      aria-invalid={problem?.severity === "error" || undefined}
      aria-describedby={problem ? `${field}-problem` : undefined}
      value={value}
      disabled={editor.isFinished}
      onChange={(event) => onText(event.target.value)}
      className={`${box} px-1.75 text-right text-head font-semibold tabular-nums ${problem?.severity === "error" ? "border-rust" : "border-rule-field"}`}
    />
  );
}

type FieldProps = FigureProps & { label: ReactNode; unit?: string; hint?: ReactNode; isWide?: boolean };

/** A figure that stands by itself: label above, unit after, problem and hint below. */
export function YardField({ label, unit, hint, isWide = false, ...figure }: FieldProps) {
  const { editor, field, value, onText, mode = "decimal" } = figure;
  const problem = editor.problemOf(field);
  const described = [problem ? `${field}-problem` : null, hint === undefined ? null : `${field}-hint`].filter(
    (id) => id !== null,
  );
  return (
    <div>
      <label htmlFor={field} className="mb-1 block font-semibold">
        {label}
      </label>
      <span className="flex items-center gap-2.5">
        <span className={isWide ? "block w-full" : "block w-36"}>
          <input
            id={field}
            name={field}
            type="text"
            inputMode={mode}
            autoComplete="off"
            maxLength={mostCharacters[field] ?? 40}
            aria-invalid={problem?.severity === "error" || undefined}
            aria-describedby={described.length > 0 ? described.join(" ") : undefined}
            value={value}
            disabled={editor.isFinished}
            onChange={(event) => onText(event.target.value)}
            className={`${box} px-3 text-l font-semibold tabular-nums ${problem?.severity === "error" ? "border-rust" : "border-rule-field"}`}
          />
        </span>
        {unit !== undefined && <span className="text-gravel">{unit}</span>}
      </span>
      <Problem editor={editor} field={field} />
      {hint !== undefined && (
        <p id={`${field}-hint`} className="mt-1 text-table text-gravel">
          {hint}
        </p>
      )}
    </div>
  );
}

/** What is wrong or doubtful in one field, in words; a triangle for what stops, a ring for what asks for a look. */
export function Problem({ editor, field }: { editor: Editor; field: string }) {
  const problem = editor.problemOf(field);
  if (!problem) return null;
  const isError = problem.severity === "error";
  return (
    <p
      id={`${field}-problem`}
      className={`mt-1 text-table leading-snug font-semibold ${isError ? "text-rust" : "text-asphalt"}`}
    >
      <svg
        viewBox="0 0 10 10"
        aria-hidden="true"
        className={`mr-1.5 inline-block size-[0.72em] ${isError ? "fill-current" : "fill-none stroke-current stroke-2"}`}
      >
        {isError ? <path d="M5 0 10 10H0z" /> : <circle cx="5" cy="5" r="4" />}
      </svg>
      {problem.message}
    </p>
  );
}

/** The problems of a row of figures, under the row. */
export function RowProblems({ editor, fields }: { editor: Editor; fields: readonly string[] }) {
  return fields.map((field) => <Problem key={field} editor={editor} field={field} />);
}

/** The sentence a step opens with. */
export function Say({ children }: { children: ReactNode }) {
  return (
    <h1
      id="step-heading"
      tabIndex={-1}
      className="text-l leading-tight font-semibold tracking-[-0.005em] text-balance focus-visible:outline-none"
    >
      {children}
    </h1>
  );
}

type PlainButtonProps = {
  children: ReactNode;
  onClick: () => void;
  label?: string;
  isPressed?: boolean;
  isOff?: boolean;
  isSmall?: boolean;
};

/** A quiet key of the yard: outlined, 52 px. */
export function YardKey({ children, onClick, label, isPressed, isOff = false, isSmall = false }: PlainButtonProps) {
  return (
    <button
      type="button"
      aria-label={label}
      aria-pressed={isPressed}
      disabled={isOff}
      onClick={onClick}
      className={`${isSmall ? "min-h-12 px-3 text-m" : "min-h-target-yard px-4 text-head"} touch-manipulation rounded-field border-2 border-asphalt bg-snow leading-tight font-semibold text-asphalt active:bg-asphalt active:text-salt disabled:border-rule disabled:text-gravel aria-pressed:bg-asphalt aria-pressed:text-salt`}
    >
      {children}
    </button>
  );
}
