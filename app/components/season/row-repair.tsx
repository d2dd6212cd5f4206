import { Form } from "react-router";
import { Button } from "#app/components/ui/button.tsx";
import type { RepairProps } from "./problem-view.ts";

const head = "border-b-2 border-line py-1.5 pr-3 align-bottom leading-tight font-semibold text-left last:pr-0";
const cell = "py-1.5 pr-3 align-baseline last:pr-0";
const input =
  "block min-h-target w-full min-w-32 rounded-field border-2 bg-snow px-3 py-1.5 focus:border-spruce focus:outline-3 focus:outline-offset-2 focus:outline-asphalt";

/** Rows one by one: what the file says, and a field for what it should say. */
export function RowRepair({ group, canFix: isFixable }: RepairProps) {
  const canFix = isFixable && group.rows.some(({ field }) => field !== "");
  const isColumnShown = group.code === "single";
  const hasValues = group.rows.some(({ field }) => field !== "");
  const isMessageShown = group.message === null;
  const inputRule = group.severity === "error" ? "border-rust" : "border-rule-field";
  return (
    <Form method="post" preventScrollReset className="mt-2">
      <table className="timetable-fold w-full border-collapse text-table">
        <caption className="sr-only">Rows with this problem</caption>
        <thead>
          <tr>
            <th scope="col" className={head}>
              row
            </th>
            {group.contextHeads.map((name) => (
              <th key={name} scope="col" className={head}>
                {name}
              </th>
            ))}
            {isColumnShown && (
              <th scope="col" className={head}>
                column
              </th>
            )}
            {hasValues && (
              <th scope="col" className={head}>
                your file says
              </th>
            )}
            {isMessageShown && (
              <th scope="col" className={head}>
                what to do
              </th>
            )}
            {canFix && (
              <th scope="col" className={head}>
                {group.columnName ?? "should say"}
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {group.rows.map(({ sheetRow, value, message, context, field, columnName }) => (
            <tr key={`${sheetRow} ${message}`} className="border-b border-rule">
              <th scope="row" className={`${cell} text-left font-normal text-gravel`}>
                <span className="sm:hidden">row </span>
                {sheetRow.toLocaleString("en-US")}
              </th>
              {context.map((text, place) => (
                <td key={place} data-label={group.contextHeads[place]} className={`${cell} [overflow-wrap:anywhere]`}>
                  {text === "" ? "–" : text}
                </td>
              ))}
              {isColumnShown && (
                <td data-label="column" className={cell}>
                  {columnName ?? "–"}
                </td>
              )}
              {hasValues && (
                <td
                  data-label="your file says"
                  className={`${cell} font-semibold [overflow-wrap:anywhere] ${group.severity === "error" ? "text-rust" : ""}`}
                >
                  {value ?? (field === "" ? "–" : "nothing")}
                </td>
              )}
              {isMessageShown && (
                <td data-label="what to do" className={`${cell} max-w-80 text-pretty`}>
                  {message}
                </td>
              )}
              {canFix && field === "" && <td className={cell} />}
              {canFix && field !== "" && (
                <td data-label={columnName} className={cell}>
                  <input type="hidden" name="cellField" value={field} />
                  <input type="hidden" name="row" value={sheetRow} />
                  <input type="hidden" name="was" value={value ?? ""} />
                  <input
                    type="text"
                    name="text"
                    defaultValue={value ?? ""}
                    aria-label={`${columnName ?? "cell"} in row ${sheetRow}`}
                    autoComplete="off"
                    maxLength={300}
                    className={`${input} ${inputRule}`}
                  />
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </table>
      {canFix && (
        <div className="mt-3">
          <Button variant="quiet" size="slim" name="intent" value="cells">
            {group.rows.length === 1 ? "Use this instead" : "Use these instead"}
          </Button>
        </div>
      )}
    </Form>
  );
}
