import type { ClipboardEvent, KeyboardEvent } from "react";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { type GridLine, isChanged } from "./storm-grid-lines.ts";
import type { GridColumn } from "./storm-texts.ts";

type Place = { line: number; column: number };

type Props = {
  line: GridLine;
  place: number;
  number: number;
  columns: readonly GridColumn[];
  lineTo: (stormId: number) => string;
  onType: (line: number, column: string, value: string) => void;
  onKey: (event: KeyboardEvent<HTMLInputElement>, place: Place) => void;
  onPaste: (event: ClipboardEvent<HTMLInputElement>, place: Place) => void;
  onDrop: (ref: string) => void;
};

const cellLook =
  "block min-h-target w-full border-0 bg-transparent px-1.5 tabular-nums focus:bg-snow focus:outline-3 focus:-outline-offset-3 focus:outline-asphalt aria-invalid:bg-rust-wash aria-invalid:outline-2 aria-invalid:-outline-offset-2 aria-invalid:outline-rust";

/** One line of the sheet, and under it in words what is to be put right. */
export function StormGridRow({ line, place, number, columns, lineTo, onType, onKey, onPaste, onDrop }: Props) {
  const problems = columns.flatMap(({ key, label }) =>
    line.errors[key] ? [{ key, label, words: line.errors[key] }] : [],
  );
  const problemId = `line-${line.ref}-problems`;
  const hasWords = problems.length > 0 || line.isOutdated;
  const changed = isChanged(line);
  return (
    <>
      <tr className={`${hasWords ? "" : "border-b border-rule"} ${changed ? "bg-spruce-wash" : ""}`}>
        <th scope="row" className="pr-2 text-right font-normal text-gravel tabular-nums">
          {number}
        </th>
        {columns.map((column, at) => (
          <td key={column.key} className="border-l border-rule p-0">
            <input
              type="text"
              size={1}
              autoComplete="off"
              inputMode={column.isNumeric === true ? "decimal" : undefined}
              list={column.key === "kind" ? "storm-kinds" : undefined}
              data-cell={`${place}:${at}`}
              aria-label={`${column.label}${column.unit === undefined ? "" : `, ${column.unit}`}, line ${number}`}
              aria-invalid={line.errors[column.key] !== undefined || undefined}
              aria-describedby={line.errors[column.key] === undefined ? undefined : problemId}
              value={line.cells[column.key] ?? ""}
              onChange={(event) => onType(place, column.key, event.currentTarget.value)}
              onKeyDown={(event) => onKey(event, { line: place, column: at })}
              onPaste={(event) => onPaste(event, { line: place, column: at })}
              style={{ minWidth: `${column.widthRem}rem` }}
              className={`${cellLook} ${column.isNumeric === true ? "text-right" : ""}`}
            />
          </td>
        ))}
        <td className="border-l border-rule px-2 text-note whitespace-nowrap">
          {changed ? (
            <button
              type="button"
              onClick={() => onDrop(line.ref)}
              className="min-h-target cursor-pointer font-semibold text-spruce underline underline-offset-3"
            >
              Undo<span className="sr-only"> line {number}</span>
            </button>
          ) : (
            line.id !== null && (
              <TextLink to={lineTo(line.id)} className="inline-flex min-h-target items-center">
                Open<span className="sr-only"> line {number}</span>
              </TextLink>
            )
          )}
        </td>
      </tr>
      {hasWords && (
        <tr className="border-b border-rule">
          <td />
          <td
            id={problemId}
            colSpan={columns.length + 1}
            className="px-1.5 pt-0.5 pb-2 text-note font-semibold text-rust"
          >
            {line.isOutdated &&
              "Somebody changed or removed this storm meanwhile. Undo to see what stands there now, then type again. "}
            {problems.map(({ label, words }) => `${label}: ${words}`).join(" ")}
          </td>
        </tr>
      )}
    </>
  );
}
