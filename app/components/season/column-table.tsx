import { useState } from "react";
import type { UploadField } from "#app/domain/upload/field.ts";
import { dimensionOf, type MeasureUnit, measureUnits, unitWords } from "#app/domain/upload/measure.ts";

export type ColumnView = {
  index: number;
  head: string;
  field: string | null;
  unit: MeasureUnit | null;
  isCertain: boolean;
};
type Choice = { field: string | null; unit: MeasureUnit | null };
type Props = {
  columns: readonly ColumnView[];
  fields: readonly UploadField[];
  samples: readonly { row: number; cells: string[] }[];
  /** What was chosen before the page came back with a complaint. */
  chosen?: readonly Choice[] | undefined;
};

const head = "border-b-2 border-line py-1.5 pr-4 align-bottom text-left leading-tight font-semibold last:pr-0";
const select =
  "block min-h-target w-full appearance-none rounded-field border-[1.5px] bg-snow py-1.5 pr-8 pl-3 font-semibold focus:border-spruce focus:outline-3 focus:outline-offset-2 focus:outline-asphalt";

function Arrow() {
  return (
    <svg
      viewBox="0 0 10 7"
      aria-hidden="true"
      className="pointer-events-none absolute top-1/2 right-3 h-1.75 w-2.5 -translate-y-1/2 fill-none stroke-gravel stroke-2"
    >
      <path d="M1 1l4 4 4-4" />
    </svg>
  );
}

function unitsOf(field: UploadField | undefined) {
  return measureUnits.filter((unit) => field?.dimensions?.includes(dimensionOf(unit)));
}

function ColumnRow({ column, place, fields, samples, chosen }: Props & { column: ColumnView; place: number }) {
  const start = chosen?.[place] ?? column;
  const [key, setKey] = useState(start.field ?? "");
  const field = fields.find((candidate) => candidate.key === key);
  const units = unitsOf(field);
  const shown = samples.flatMap(({ cells }) => cells[column.index] || []).slice(0, 3);
  const name = column.head === "" ? `column ${column.index + 1}` : column.head;
  const rule = column.isCertain ? "border-rule-field" : "border-2 border-rust";
  return (
    <tr className="border-b border-rule">
      <th scope="row" className="py-2 pr-4 text-left align-middle font-bold [overflow-wrap:anywhere]">
        {name}
        {!column.isCertain && column.head !== "" && (
          <span className="block text-note font-semibold text-rust">please look</span>
        )}
      </th>
      <td data-label="first cells" className="py-2 pr-4 align-middle text-note text-gravel [overflow-wrap:anywhere]">
        {shown.length === 0 ? "empty" : shown.join(" · ")}
      </td>
      <td data-label="holds" className="py-2 pr-4 align-middle">
        <span className="relative block sm:min-w-48">
          <select
            id={`field-${column.index}`}
            name="field"
            aria-label={`What ${name} holds`}
            value={key}
            onChange={(event) => setKey(event.currentTarget.value)}
            className={`${select} ${rule}`}
          >
            <option value="">not used</option>
            {fields.map((candidate) => (
              <option key={candidate.key} value={candidate.key}>
                {candidate.label}
              </option>
            ))}
          </select>
          <Arrow />
        </span>
      </td>
      <td data-label="in" className="py-2 align-middle">
        {units.length === 0 ? (
          <input type="hidden" name="unit" value="" />
        ) : (
          <span className="relative block sm:min-w-44">
            <select
              key={key}
              name="unit"
              aria-label={`Unit of ${name}`}
              defaultValue={start.field === key ? (start.unit ?? field?.unit ?? "") : (field?.unit ?? "")}
              className={`${select} border-rule-field`}
            >
              {units.map((unit) => (
                <option key={unit} value={unit}>
                  {unitWords[unit]}
                </option>
              ))}
            </select>
            <Arrow />
          </span>
        )}
      </td>
    </tr>
  );
}

/** Each column of the file with its first cells, what it is taken for, and in which unit it is. */
export function ColumnTable(props: Props) {
  return (
    <table className="timetable-fold w-full border-collapse text-table">
      <caption className="sr-only">Columns of the file, and what they hold</caption>
      <thead>
        <tr>
          <th scope="col" className={head}>
            column in your file
          </th>
          <th scope="col" className={head}>
            first cells
          </th>
          <th scope="col" className={head}>
            holds
          </th>
          <th scope="col" className={head}>
            in
          </th>
        </tr>
      </thead>
      <tbody>
        {props.columns.map((column, place) => (
          <ColumnRow key={column.index} {...props} column={column} place={place} />
        ))}
      </tbody>
    </table>
  );
}
