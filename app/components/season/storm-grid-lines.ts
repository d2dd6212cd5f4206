import { isBlankLine } from "#app/domain/season/storm-cells.ts";

/** One line of the grid: what stands in its cells, and what the server last said of it. */
export type GridLine = {
  /** Names the line for as long as the page lives, and to the server that stores it. */
  ref: string;
  id: number | null;
  version: number | null;
  cells: Record<string, string>;
  /** As the server has it; null for a line that was never stored. */
  stored: Record<string, string> | null;
  errors: Record<string, string>;
  /** Somebody else changed or removed it. */
  isOutdated: boolean;
};

export type StoredLine = { id: number; version: number; cells: Record<string, string> };

/** A line nobody has written in yet. */
function blankLine(ref: string): GridLine {
  return { ref, id: null, version: null, cells: {}, stored: null, errors: {}, isOutdated: false };
}

function storedLine({ id, version, cells }: StoredLine, ref: string): GridLine {
  return { ref, id, version, cells, stored: cells, errors: {}, isOutdated: false };
}

function text(cells: Record<string, string>, column: string) {
  return (cells[column] ?? "").trim();
}

/** Whether the line holds something that the server does not have. */
export function isChanged({ cells, stored }: GridLine): boolean {
  if (stored === null) return !isBlankLine(cells);
  return [...new Set([...Object.keys(cells), ...Object.keys(stored)])].some(
    (column) => text(cells, column) !== text(stored, column),
  );
}

/**
 * The lines of the page: what the server has, with what was typed and not stored yet laid over it; new lines last, and
 * always one blank line to type in.
 *
 * @param typed - lines of this page or of the tab's memory
 * @param newRef - makes a name for a new line
 */
export function mergeLines(
  stored: readonly StoredLine[],
  typed: readonly GridLine[],
  newRef: () => string,
): GridLine[] {
  const changed = typed.filter((line) => isChanged(line) || Object.keys(line.errors).length > 0);
  const lines = stored.map((each) => {
    const own = changed.find((line) => line.id === each.id);
    // Its version stays the one it was typed over: the server then sees that somebody else was there.
    if (own) return own;
    // A line keeps its name, so that the cursor stays in it when it has been stored.
    return storedLine(each, typed.find((line) => line.id === each.id)?.ref ?? `stored-${each.id}`);
  });
  return withBlank([...lines, ...changed.filter(({ id }) => id === null)], newRef);
}

/** The lines with a blank one at the end. */
function withBlank(lines: readonly GridLine[], newRef: () => string): GridLine[] {
  const last = lines.at(-1);
  const hasBlank = last !== undefined && last.id === null && isBlankLine(last.cells);
  return hasBlank ? [...lines] : [...lines, blankLine(newRef())];
}

/** The lines with a block laid over them from one cell on, to the right and down; lines are added where it is longer. */
export function pasteBlock(
  lines: readonly GridLine[],
  at: { line: number; column: number },
  block: readonly (readonly string[])[],
  columns: readonly string[],
  newRef: () => string,
): GridLine[] {
  const all = [...lines];
  block.forEach((row, down) => {
    const place = at.line + down;
    const line = all[place] ?? blankLine(newRef());
    const cells = { ...line.cells };
    const errors = { ...line.errors };
    row.forEach((value, right) => {
      const column = columns[at.column + right];
      if (column === undefined) return;
      cells[column] = value;
      delete errors[column];
    });
    all[place] = { ...line, cells, errors };
  });
  return withBlank(all, newRef);
}

/** The lines with one cell changed. */
export function typeInto(
  lines: readonly GridLine[],
  at: { line: number; column: string },
  value: string,
  newRef: () => string,
): GridLine[] {
  const changed = lines.map((line, place) => {
    if (place !== at.line) return line;
    const { [at.column]: _settled, ...errors } = line.errors;
    return { ...line, cells: { ...line.cells, [at.column]: value }, errors };
  });
  return withBlank(changed, newRef);
}

export type LineReply =
  | { ref: string; state: "saved"; id: number; version: number }
  | { ref: string; state: "changed-meanwhile" }
  | { ref: string; state: "wrong"; errors: Record<string, string> };

/** The lines with what the server said of each laid over them. What was typed stays, stored or not. */
export function withReplies(
  lines: readonly GridLine[],
  replies: readonly LineReply[],
  sentCells: ReadonlyMap<string, Record<string, string>>,
): GridLine[] {
  return lines.map((line): GridLine => {
    const reply = replies.find(({ ref }) => ref === line.ref);
    if (!reply) return line;
    switch (reply.state) {
      case "saved":
        // What was typed while the answer was on its way is not stored yet.
        return {
          ...line,
          id: reply.id,
          version: reply.version,
          stored: sentCells.get(line.ref) ?? line.cells,
          errors: {},
          isOutdated: false,
        };
      case "changed-meanwhile":
        return { ...line, isOutdated: true };
      case "wrong":
        return { ...line, errors: reply.errors };
    }
  });
}
