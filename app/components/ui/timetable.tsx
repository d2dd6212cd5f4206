import type { ReactNode } from "react";

export type Column = {
  key: string;
  label: string;
  /** Stands in the head, so that the cells hold bare numbers. */
  unit?: string;
  /** Numbers line up on the right. */
  isNumeric?: boolean;
  /** Sentences: on a phone they run under the row's name, without the label. */
  isProse?: boolean;
  /** Left out on a phone, where it is one tap away. */
  isWideOnly?: boolean;
  /** A width for columns that line up over several tables. */
  widthClass?: string;
  /** Says on a phone what the row's name is: "Truck" before 12. */
  foldPrefix?: string;
};

type Row = {
  key: string;
  cells: Record<string, ReactNode>;
  /** Our own row, in weight on its wash. */
  isOurs?: boolean;
  /** Begins a new part of the table, under a thick rule. */
  isPartStart?: boolean;
};

type Props = {
  columns: readonly Column[];
  rows: readonly Row[];
  caption: string;
  /** When the words above the table already say what it is. */
  isCaptionHidden?: boolean;
  /** On a phone: labelled rows, names above their figures, or as it is, which suits narrow tables. */
  onPhone?: "fold" | "stack" | "keep";
  hasStickyHead?: boolean;
};

/** A table set as a timetable: units in the head, a thick rule under it, hairlines between rows. The first column names the row. */
export function Timetable(props: Props) {
  const { columns, rows, caption, isCaptionHidden = false, onPhone = "fold", hasStickyHead = false } = props;
  return (
    <table className={`w-full border-collapse text-table timetable-${onPhone}`}>
      <caption className={isCaptionHidden ? "sr-only" : "pb-2 text-left text-note text-gravel"}>{caption}</caption>
      <thead className={hasStickyHead ? "z-1 bg-salt sm:sticky sm:top-0" : ""}>
        <tr>
          {columns.map((column) => (
            <th
              key={column.key}
              scope="col"
              className={`border-b-2 border-line py-1.5 pr-5 align-bottom leading-tight font-semibold last:pr-0 ${column.widthClass ?? ""} ${column.isWideOnly === true ? "max-sm:hidden" : ""} ${column.isNumeric === true ? "text-right" : "text-left"}`}
            >
              {headWords(column) === "" ? <span className="sr-only">action</span> : headWords(column)}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr
            key={row.key}
            className={`border-b border-rule last:border-line ${row.isPartStart === true ? "border-t-2 border-t-line" : ""} ${row.isOurs === true ? "bg-spruce-wash font-bold shadow-[-8px_0_var(--color-spruce-wash),8px_0_var(--color-spruce-wash)]" : ""}`}
          >
            {columns.map((column, position) => (
              <TimetableCell key={column.key} column={column} isRowHead={position === 0}>
                {row.cells[column.key] ?? "–"}
              </TimetableCell>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

type CellProps = { column: Column; isRowHead: boolean; children: ReactNode };

function TimetableCell({ column, isRowHead, children }: CellProps) {
  const align = column.isNumeric === true ? "text-right" : "text-left";
  const look = `py-1.75 pr-5 align-baseline last:pr-0 ${align} ${column.isWideOnly === true ? "max-sm:hidden!" : ""}`;
  if (isRowHead) {
    return (
      <th scope="row" className={`${look} font-bold`}>
        {column.foldPrefix !== undefined && <span className="sm:hidden">{column.foldPrefix} </span>}
        {children}
      </th>
    );
  }
  // One box for the content: on a phone the cell is a line of two, the label and it.
  return (
    <td
      data-label={column.isProse === true ? undefined : headWords(column)}
      className={`${look} ${column.isProse === true ? "timetable-prose" : ""}`}
    >
      <div className="min-w-0">{children}</div>
    </td>
  );
}

function headWords(column: Column) {
  return column.unit === undefined ? column.label : `${column.label}, ${column.unit}`;
}
