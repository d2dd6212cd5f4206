import { useState } from "react";
import type { RateSheetRow } from "#app/domain/calibration/rate-sheet.ts";
import { formatWhole } from "#app/lib/format.ts";
import type { Editor } from "./editor.ts";
import { RateCell } from "./rate-cell.tsx";
import { RateSentence } from "./rate-sentence.tsx";
import type { WorkedOut } from "./worked-out.ts";
import { Say } from "./yard-field.tsx";

/** Says what is still missing, with the way to it. */
export function NotYet({ missing }: { missing: readonly { step: string; words: string }[] }) {
  return (
    <>
      <Say>The rates follow from the readings. Something is still missing.</Say>
      <ul className="mt-3 grid">
        {missing.map(({ step, words }) => (
          <li key={`${step} ${words}`} className="border-b border-rule first:border-t">
            <a
              href={`#${step}`}
              className="flex min-h-12 items-center py-2 leading-snug text-spruce underline underline-offset-3"
            >
              {words}
            </a>
          </li>
        ))}
      </ul>
    </>
  );
}

/** The rates around the working speed, and all of them behind. */
export function StepRates({ editor, worked }: { editor: Editor; worked: WorkedOut }) {
  const { truck, band } = editor;
  const { working } = worked;
  const [isFullOpen, setFullOpen] = useState(false);
  return (
    <>
      <Say>
        <RateSentence parts={worked.sentence} />
      </Say>
      {working && (
        <p className="mt-2 leading-snug">
          At its working setting, {truck.workingSetting}, it lays{" "}
          <b className="whitespace-nowrap">
            {formatWhole(working.lbPerLaneMile)}
            {working.plusMinus === null ? "" : ` ± ${formatWhole(working.plusMinus)}`} lb
          </b>{" "}
          per lane mile at {truck.workingSpeedMph} mph
          {working.plusMinus === null ? "; one catch leaves its ± unknown" : ""}.
        </p>
      )}
      <RateTable
        caption="Pounds per lane mile by setting and speed"
        rows={worked.near}
        workingSpeedMph={truck.workingSpeedMph}
      />
      <p className="mt-2 text-note leading-normal text-gravel">
        <Key d="M0 0h10L5 10z" look="text-glacier" /> under &ensp;
        <Key d="M0 0h10v10H0z" look="text-beacon-ink" /> in the band
        {band ? `, ${band.lowLbPerLaneMile}–${band.highLbPerLaneMile}` : ""} &ensp;
        <Key d="M5 0 10 10H0z" look="text-rust" /> over &ensp; ± is about 95 %
      </p>
      <details
        className="group mt-3 border-t-2 border-line"
        onToggle={(event) => setFullOpen(event.currentTarget.open)}
      >
        <summary className="flex min-h-12 list-none items-center justify-between gap-3 font-semibold text-spruce">
          Every speed from 5 to 45 mph
          <svg
            viewBox="0 0 10 7"
            aria-hidden="true"
            className="h-2.5 w-3.5 fill-none stroke-current stroke-[1.6] group-open:rotate-180"
          >
            <path d="M1 1l4 4 4-4" />
          </svg>
        </summary>
        {isFullOpen && (
          <div role="region" aria-label="Every speed from 5 to 45 mph" tabIndex={0} className="overflow-x-auto pb-2">
            <RateTable
              caption="Pounds per lane mile by setting and speed, 5 to 45 mph"
              rows={worked.full()}
              workingSpeedMph={truck.workingSpeedMph}
              isWide
            />
          </div>
        )}
        <p className="text-table leading-snug text-gravel">
          {truck.lanesPerPass === 1
            ? "One lane in a pass: per mile of travel it is the same."
            : `${truck.lanesPerPass} lanes in a pass: per mile of travel it is ${truck.lanesPerPass} times as much.`}
        </p>
      </details>
      <p className="mt-3 text-table leading-snug text-gravel">
        A yardstick: policy, road, weather and the person responsible decide how much is applied.
      </p>
    </>
  );
}

function Key({ d, look }: { d: string; look: string }) {
  return (
    <svg viewBox="0 0 10 10" aria-hidden="true" className={`inline-block size-[0.72em] fill-current ${look}`}>
      <path d={d} />
    </svg>
  );
}

type TableProps = { caption: string; rows: readonly RateSheetRow[]; workingSpeedMph: number; isWide?: boolean };

function RateTable({ caption, rows, workingSpeedMph, isWide = false }: TableProps) {
  const speeds = rows[0]?.cells.map((cell) => cell.mph) ?? [];
  return (
    <table className={`mt-3 border-collapse text-head ${isWide ? "w-max min-w-full" : "w-full table-fixed"}`}>
      <caption className="sr-only">{caption}</caption>
      <thead>
        <tr className="border-b-2 border-line text-note">
          <th scope="col" className={`py-1 text-left font-semibold ${isWide ? "pr-3" : "w-13"}`}>
            setting
          </th>
          {speeds.map((speed) => (
            <th
              key={speed}
              scope="col"
              className={`py-1 text-center font-semibold ${isWide ? "min-w-18" : ""} ${speed === workingSpeedMph ? "bg-frost" : ""}`}
            >
              {speed} mph
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.setting} className="border-b border-rule">
            <th scope="row" className="text-left text-l font-bold">
              {row.setting}
              {row.isAtHydraulicLimit && (
                <span className="block text-s leading-none font-normal text-gravel">at limit</span>
              )}
            </th>
            {row.cells.map((cell) => (
              <td key={cell.mph} className={cell.mph === workingSpeedMph ? "bg-frost" : ""}>
                <RateCell {...cell} />
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
