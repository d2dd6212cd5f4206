import { seasonEnd, seasonStartYearOf } from "#app/domain/dates.ts";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { formatInches, formatShortDay, formatWhole } from "#app/lib/format.ts";
import type { Editor } from "./editor.ts";
import type { WorkedOut } from "./worked-out.ts";
import { Say } from "./yard-field.tsx";

type Props = {
  editor: Editor;
  worked: WorkedOut | null;
  calibrationId: number | null;
  isWaiting: boolean;
  serverProblems: readonly { message: string }[];
};

/** The end of the sheet: what the card will say, and whether the server has made a calibration of it. */
export function StepCard({ editor, worked, calibrationId, isWaiting, serverProblems }: Props) {
  const { truck, material, sheet } = editor;
  return (
    <>
      <Say>
        {calibrationId !== null
          ? "The calibration has arrived. It waits for the director’s approval."
          : isWaiting
            ? "Finished on this phone. It is sent as soon as there is signal."
            : worked
              ? "This is what the cab card will say. Finish the sheet to make a calibration of it."
              : "Without a feed setting there is no cab card. Finish the sheet to make a calibration of it."}
      </Say>
      {serverProblems.length > 0 && (
        <div role="alert" className="mt-3 border-t-4 border-rust pt-2">
          <p className="font-bold text-rust">It was saved, but not made a calibration:</p>
          <ul className="mt-1 grid gap-1 leading-snug">
            {serverProblems.map(({ message }) => (
              <li key={message}>{message}</li>
            ))}
          </ul>
        </div>
      )}
      {calibrationId !== null && (
        <p className="mt-3 grid gap-1">
          {worked && (
            <TextLink
              to={`/fleet/calibrations/${calibrationId}/card`}
              isDocument
              weight="bold"
              className="inline-flex min-h-12 items-center"
            >
              Cab card
            </TextLink>
          )}
          <TextLink
            to={`/fleet/calibrations/${calibrationId}`}
            isDocument
            weight="bold"
            className="inline-flex min-h-12 items-center"
          >
            Rates, decision and approval
          </TextLink>
        </p>
      )}
      {worked && (
        <section aria-labelledby="card-head" className="mt-4 border-2 border-asphalt p-3">
          <div className="flex items-stretch gap-3 border-b-4 border-line pb-2">
            <p className="border-r border-line pr-3 leading-none">
              <span className="block text-table">Truck</span>
              <b className="text-[2.6rem] leading-none">{truck.unitNumber}</b>
            </p>
            <h2 id="card-head" className="leading-tight">
              <b className="block text-xl">{material.name}</b>
              <span className="text-table font-normal">
                gate <b>{formatInches(worked.gateOpeningIn)} in</b>, bed to lower edge
              </span>
            </h2>
          </div>
          <table className="mt-1 w-full table-fixed border-collapse">
            <caption className="py-1 text-left text-table leading-tight">
              Pounds per lane mile. Boxed: in the band.
            </caption>
            <thead>
              <tr className="border-b-2 border-line text-note">
                <th scope="col" className="w-12 py-1 text-left font-semibold">
                  setting
                </th>
                {worked.nearSpeedsMph.map((speed) => (
                  <th key={speed} scope="col" className="py-1 text-center font-semibold">
                    {speed} mph
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {worked.near.map((row) => (
                <tr key={row.setting} className="border-b border-rule">
                  <th scope="row" className="py-1.5 text-left text-l font-bold">
                    {row.setting}
                  </th>
                  {row.cells.map((cell) => (
                    <td key={cell.mph} className="py-0.5 text-center text-l tabular-nums">
                      <span
                        className={
                          cell.place === "in" ? "inline-block bg-asphalt px-1.5 font-bold text-salt" : "font-semibold"
                        }
                      >
                        {formatWhole(cell.lbPerLaneMile)}
                        {cell.place === "in" && <span className="sr-only">, in the band</span>}
                      </span>
                    </td>
                  ))}
                </tr>
              ))}
            </tbody>
          </table>
          <p className="mt-2 text-table leading-snug">
            Weighed {formatShortDay(sheet.testedOn)}. Not valid after{" "}
            {formatShortDay(seasonEnd(seasonStartYearOf(sheet.testedOn)))}, nor after work on gate, hydraulics or feed.
            A yardstick, not an order.
          </p>
        </section>
      )}
      {calibrationId === null && worked && (
        <p className="mt-3 text-table leading-snug text-gravel">The printed card comes once the sheet has arrived.</p>
      )}
    </>
  );
}
