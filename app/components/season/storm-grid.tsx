import { type ClipboardEvent, type KeyboardEvent, useRef } from "react";
import { Notice } from "#app/components/ui/notice.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Dock } from "#app/components/ui/dock.tsx";
import { pastedBlock } from "#app/domain/season/pasted-block.ts";
import { stormKinds, stormKindWords } from "#app/domain/season/storm.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { StormGridRow } from "./storm-grid-row.tsx";
import type { StoredLine } from "./storm-grid-lines.ts";
import type { GridColumn } from "./storm-texts.ts";
import { useStormLines } from "./use-storm-lines.ts";

type Props = {
  columns: readonly GridColumn[];
  stored: readonly StoredLine[];
  keepKey: string;
  /** That takes lines. */
  saveTo: string;
  /** Of one line's own form. */
  lineTo: (stormId: number) => string;
  onSaved: () => void;
  /** Number of the first line on this page, less one. */
  offset: number;
};

type Place = { line: number; column: number };

/** Where a key leads from a cell; null leaves the key to the cell. */
function placeAfter(event: KeyboardEvent<HTMLInputElement>, { line, column }: Place): Place | null {
  const { value, selectionStart, selectionEnd } = event.currentTarget;
  const isAllSelected = selectionStart === 0 && selectionEnd === value.length;
  const isAtStart = isAllSelected || selectionEnd === 0;
  const isAtEnd = isAllSelected || selectionStart === value.length;
  switch (event.key) {
    case "Enter":
      return { line: line + (event.shiftKey ? -1 : 1), column };
    case "ArrowDown":
      return { line: line + 1, column };
    case "ArrowUp":
      return { line: line - 1, column };
    case "ArrowLeft":
      return isAtStart ? { line, column: column - 1 } : null;
    case "ArrowRight":
      return isAtEnd ? { line, column: column + 1 } : null;
    default:
      return null;
  }
}

/**
 * The storm log as a sheet: Tab and the arrows go from cell to cell, Enter goes down, a block copied from a spreadsheet
 * fills cells to the right and down, and there is always a blank line at the end.
 */
export function StormGrid({ columns, stored, keepKey, saveTo, lineTo, onSaved, offset }: Props) {
  const sheet = useStormLines(stored, keepKey, saveTo, onSaved);
  const table = useRef<HTMLTableElement>(null);
  const keys = columns.map(({ key }) => key);
  const { saving, changedCount } = sheet;

  function focusCell({ line, column }: Place) {
    const cell = table.current?.querySelector<HTMLInputElement>(`input[data-cell="${line}:${column}"]`);
    cell?.focus();
    cell?.select();
  }

  function onKey(event: KeyboardEvent<HTMLInputElement>, place: Place) {
    if (event.key.toLowerCase() === "s" && (event.ctrlKey || event.metaKey)) {
      event.preventDefault();
      void sheet.save();
      return;
    }
    if (event.altKey || event.ctrlKey || event.metaKey || event.nativeEvent.isComposing) return;
    const next = placeAfter(event, place);
    if (next === null) return;
    event.preventDefault();
    focusCell(next);
  }

  function onPaste(event: ClipboardEvent<HTMLInputElement>, place: Place) {
    const block = pastedBlock(event.clipboardData.getData("text/plain"));
    // One cell alone goes in where the cursor stands, as anywhere else.
    if (block.length === 1 && block[0]?.length === 1) return;
    event.preventDefault();
    sheet.paste(place, block, keys);
  }

  return (
    <section aria-label="Storm log, as a sheet">
      {sheet.restoredCount > 0 && (
        <Notice
          title={`${sentenceStart(countWords(sheet.restoredCount, "line is", "lines are"))} back that had not been stored.`}
        >
          They were kept in this browser. Look them over, then save them.
        </Notice>
      )}
      {saving.state === "failed" && <Notice tone="problem" title={saving.message} />}
      <datalist id="storm-kinds">
        {stormKinds.map((kind) => (
          <option key={kind} value={stormKindWords[kind]} />
        ))}
      </datalist>
      <div className="relative overflow-x-auto pb-2">
        <table ref={table} className="border-collapse text-table">
          <caption className="pb-2 text-left text-note text-gravel">
            Enter and the arrows move, Ctrl+S saves. A block copied from a spreadsheet may be pasted into any cell.
          </caption>
          <thead>
            <tr className="border-b-2 border-line align-bottom">
              <th scope="col" className="py-1.5 pr-2 text-right font-semibold">
                <span className="sr-only">line</span>
              </th>
              {columns.map((column) => (
                <th
                  key={column.key}
                  scope="col"
                  className={`px-1.5 py-1.5 leading-tight font-semibold ${column.isNumeric === true ? "text-right" : "text-left"}`}
                >
                  {column.label}
                  {column.unit !== undefined && <span className="block">{column.unit}</span>}
                </th>
              ))}
              <th scope="col">
                <span className="sr-only">state of the line</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {sheet.lines.map((line, place) => (
              <StormGridRow
                key={line.ref}
                line={line}
                place={place}
                number={offset + place + 1}
                columns={columns}
                lineTo={lineTo}
                onType={sheet.type}
                onKey={onKey}
                onPaste={onPaste}
                onDrop={sheet.drop}
              />
            ))}
          </tbody>
        </table>
      </div>
      <div className="contents [&>section]:-mx-4 sm:[&>section]:-mx-8">
        <Dock
          summaryId="storm-sheet-summary"
          label="Lines to save"
          summary={
            saving.state === "done" && changedCount === 0 ? (
              <b>{sentenceStart(countWords(saving.savedCount, "line is", "lines are"))} stored.</b>
            ) : saving.state === "done" && saving.leftCount > 0 ? (
              <b>
                {sentenceStart(countWords(saving.savedCount, "line", "lines"))} stored,{" "}
                {countWords(saving.leftCount, "needs", "need")} a look.
              </b>
            ) : changedCount === 0 ? (
              "Everything typed is stored."
            ) : (
              <b>{sentenceStart(countWords(changedCount, "line is", "lines are"))} not stored yet.</b>
            )
          }
        >
          <Button
            type="button"
            onClick={() => void sheet.save()}
            busy={saving.state === "saving" && `Storing ${countWords(saving.lineCount, "line", "lines")}`}
            notYet={saving.state !== "saving" && changedCount === 0 && { reasonId: "storm-sheet-summary" }}
          >
            Save {changedCount === 0 ? "lines" : countWords(changedCount, "line", "lines")}
          </Button>
        </Dock>
      </div>
    </section>
  );
}
