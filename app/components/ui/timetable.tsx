import type { ReactNode } from "react";

export type Column = {
  key: string;
  label: string;
  /** Stands in the head, so that the cells hold bare numbers. */
  unit?: string;
  /** Numbers line up on the right. */
  isNumeric?: boolean;
};

type Row = {
  key: string;
  cells: Record<string, ReactNode>;
  /** Our own row, in weight on its wash. */
  isOurs?: boolean;
};

type Props = {
  columns: readonly Column[];
  rows: readonly Row[];
  caption: string;
  /** When the words above the table already say what it is. */
  isCaptionHidden?: boolean;
  /** Labelled rows on a phone. Narrow tables stay as they are. */
  isFolding?: boolean;
  hasStickyHead?: boolean;
};

/** A table set as a timetable: units in the head, a thick rule under it, hairlines between rows. The first column names the row. */
export function Timetable(props: Props) {
  const { columns, rows, caption, isCaptionHidden = false, isFolding = true, hasStickyHead = false } = props;
  return (
    <table className={`w-full border-collapse text-table ${isFolding ? "timetable-fold" : ""}`}>
      <caption className={isCaptionHidden ? "sr-only" : "pb-2 text-left text-note text-gravel"}>{caption}</caption>
      <thead className={hasStickyHead ? "sm:sticky sm:top-0 sm:z-1 sm:bg-salt" : ""}>
        <tr>
          {columns.map((column) => (
            <th
              key={column.key}
              scope="col"
              className={`border-b-2 border-line py-1.5 pr-3 align-bottom leading-tight font-semibold last:pr-0 ${column.isNumeric === true ? "text-right" : "text-left"}`}
            >
              {headWords(column)}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr
            key={row.key}
            className={`border-b border-rule last:border-line ${row.isOurs === true ? "bg-spruce-wash font-bold" : ""}`}
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
  const look = `py-1.75 pr-3 max-sm:in-[.timetable-fold]:py-0.5 max-sm:in-[.timetable-fold]:pr-0 align-baseline last:pr-0 ${align}`;
  if (isRowHead) {
    return (
      <th scope="row" className={`${look} font-bold`}>
        {children}
      </th>
    );
  }
  return (
    <td data-label={headWords(column)} className={look}>
      {children}
    </td>
  );
}

function headWords(column: Column) {
  return column.unit === undefined ? column.label : `${column.label}, ${column.unit}`;
}
