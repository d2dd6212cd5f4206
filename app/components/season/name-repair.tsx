import { Form } from "react-router";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import type { RepairProps } from "./problem-view.ts";

const prompts = { truck: "choose a truck", material: "choose a material", "storm-kind": "choose a kind" };
const selectLook =
  "block min-h-target w-full min-w-44 appearance-none rounded-field border-2 border-rust bg-snow px-3 py-1.5 pr-8 font-semibold focus:border-spruce focus:outline-3 focus:outline-offset-2 focus:outline-asphalt";

/** Names that a file uses and the town does not: each is explained once. */
export function NameRepair({ group, choices, settledNames }: RepairProps) {
  if (group.names === null) return null;
  const { sort, values } = group.names;
  const settled = settledNames.filter((name) => name.sort === sort);
  const labelOf = (meaning: string) => choices[sort].find(({ value }) => value === meaning)?.label ?? meaning;
  return (
    <Form method="post" preventScrollReset className="mt-2">
      <input type="hidden" name="code" value={group.code} />
      <input type="hidden" name="field" value={group.field} />
      <input type="hidden" name="sort" value={sort} />
      <table className="timetable-fold w-full border-collapse text-table">
        <caption className="sr-only">Names in the file, and what they mean</caption>
        <thead>
          <tr>
            {["your file says", "rows", "we read it as", ""].map((head, place) => (
              <th
                key={head}
                scope="col"
                className={`border-b-2 border-line py-1.5 pr-3 font-semibold ${place === 1 ? "text-right" : "text-left"}`}
              >
                {head === "" ? <span className="sr-only">state</span> : head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {settled.map(({ name, meaning }) => (
            <tr key={`settled ${name}`} className="border-b border-rule">
              <th scope="row" className="py-1.5 pr-3 text-left font-bold">
                {name}
              </th>
              <td data-label="rows" className="py-1.5 pr-3 text-right text-gravel">
                –
              </td>
              <td data-label="we read it as" className="py-1.5 pr-3 font-semibold">
                {labelOf(meaning)}
              </td>
              <td className="py-1.5 font-semibold text-spruce">✓ settled</td>
            </tr>
          ))}
          {values.map(({ value, rowCount }, place) => (
            <tr key={value} className="border-b border-rule">
              <th scope="row" className="py-1.5 pr-3 text-left font-bold [overflow-wrap:anywhere]">
                {value}
              </th>
              <td data-label="rows" className="py-1.5 pr-3 text-right">
                {rowCount.toLocaleString("en-US")}
              </td>
              <td data-label="we read it as" className="py-1.5 pr-3">
                <input type="hidden" name="name" value={value} />
                <span className="relative block">
                  <select name="meaning" aria-label={`What “${value}” means`} className={selectLook} defaultValue="">
                    <option value="">{prompts[sort]}</option>
                    {choices[sort].map((choice) => (
                      <option key={choice.value} value={choice.value}>
                        {choice.label}
                      </option>
                    ))}
                  </select>
                  <svg
                    viewBox="0 0 10 7"
                    aria-hidden="true"
                    className="pointer-events-none absolute top-1/2 right-3 h-1.75 w-2.5 -translate-y-1/2 fill-none stroke-gravel stroke-2"
                  >
                    <path d="M1 1l4 4 4-4" />
                  </svg>
                </span>
              </td>
              <td className="py-1.5">
                {place === 0 && sort === "truck" && <TextLink to="/fleet">or add a truck</TextLink>}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="mt-3">
        <Button variant="quiet" size="slim" name="intent" value="names">
          Use these names
        </Button>
      </div>
    </Form>
  );
}
