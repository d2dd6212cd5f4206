import type { CabCard as Card, CabCardCell } from "#app/domain/calibration/card.ts";
import { formatInches, formatOneDecimal, formatShortDay, formatWhole } from "#app/lib/format.ts";

type Props = {
  printed: {
    card: Card;
    townName: string;
    band: { lowLbPerLaneMile: number; highLbPerLaneMile: number } | null;
    workingSpeedMph: number;
    workingRpm: number | null;
    plusMinusPercent: number | null;
    standing: "in-force" | "ready" | "history";
    address: string;
    qr: { size: number; path: string };
  };
};

/** The largest size at which a text of that length still fits its place. All in hundredths of the card's width. */
function sized(length: number, sizes: readonly (readonly [number, string])[], smallest: string) {
  return sizes.find(([most]) => length <= most)?.[1] ?? smallest;
}

const unitSizes = [
  [2, "text-[22cqw]"],
  [3, "text-[15cqw]"],
  [5, "text-[9.5cqw]"],
  [8, "text-[6cqw]"],
] as const;
const materialSizes = [
  [4, "text-[11cqw]"],
  [8, "text-[8cqw]"],
  [14, "text-[5.4cqw]"],
] as const;
const answerSizes = [
  [32, "text-[5.6cqw]"],
  [44, "text-[4.4cqw]"],
] as const;
const rowSizes = [
  [6, "text-[8cqw]"],
  [8, "text-[6.5cqw]"],
  [10, "text-[5.2cqw]"],
  [14, "text-[3.7cqw]"],
] as const;

const standingWords = {
  ready: "Not approved: not for use",
  history: "Replaced by a later calibration: not for use",
};

/**
 * One truck and material on one page, to be read at arm's length in a dark cab. Black and white throughout: a cell in the
 * band is a solid box in heavy type, one under it a dotted box in light type, one over it plain.
 */
export function CabCard({ printed }: Props) {
  const { card, standing, workingSpeedMph } = printed;
  const rows = card.rows.filter((row) => !row.isAtHydraulicLimit);
  const size = sized(rows.length, rowSizes, "text-[2.6cqw]");
  return (
    <article
      aria-label={`Cab card of truck ${card.unitNumber} for ${card.materialName}`}
      className="cab-card @container mx-auto mb-10 flex aspect-[17/22] w-full max-w-204 flex-col bg-[#fff] p-[4%] text-[#000] shadow-float [print-color-adjust:exact] print:mb-0 print:aspect-auto print:max-w-none print:p-0 print:shadow-none"
    >
      <div className="flex min-h-0 flex-1 flex-col">
        {standing !== "in-force" && (
          <p className="mb-[1.5cqw] bg-[#000] py-[0.8cqw] text-center text-[3.6cqw] leading-tight font-bold text-[#fff]">
            {standingWords[standing]}
          </p>
        )}
        <Head {...printed} />
        <p
          className={`flex items-center gap-[1.8cqw] py-[1.6cqw] leading-none font-bold tracking-[-0.02em] ${sized(card.words.band.length, answerSizes, "text-[3.4cqw]")}`}
        >
          {printed.band && <span aria-hidden="true" className="size-[0.8em] flex-none rounded-plate bg-[#000]" />}
          {card.words.band}
        </p>
        <Legend {...printed} />
        <table className="min-h-0 w-full flex-1 table-fixed border-collapse leading-none proportional-nums">
          <caption className="sr-only">Pounds per lane mile by feed setting and speed</caption>
          <thead>
            <tr>
              <th
                scope="col"
                className="w-[12cqw] border-b-3 border-[#000] pb-[1cqw] text-left align-bottom text-[2.4cqw] font-normal"
              >
                setting
              </th>
              {card.rows[0]?.cells.map(({ mph }) => (
                <th
                  key={mph}
                  scope="col"
                  className={`border-b-3 border-[#000] pb-[0.7cqw] text-center align-bottom text-[4.6cqw] ${mph === workingSpeedMph ? "font-bold" : "font-normal"}`}
                >
                  {formatOneDecimal(mph).replace(/\.0$/, "")}
                  <span className="text-[2.3cqw] font-normal"> mph</span>
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.setting} className="border-b-[1.5px] border-[#000]">
                <th scope="row" className={`text-left align-middle font-bold tracking-[-0.03em] ${size}`}>
                  {row.setting}
                </th>
                {row.cells.map((cell) => (
                  <td key={cell.mph} className={`h-0 p-[0.5cqw] text-center align-middle tracking-[-0.035em] ${size}`}>
                    <Cell cell={cell} band={printed.band} />
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
        <Foot {...printed} />
      </div>
    </article>
  );
}

function Head({ card, workingRpm }: Props["printed"]) {
  return (
    <header className="flex items-stretch border-b-[0.8cqw] border-[#000] pb-[1.4cqw]">
      <div className="flex flex-col justify-between border-r-2 border-[#000] pr-[3cqw]">
        <p className="text-[3.4cqw] leading-none font-semibold">Truck</p>
        <p
          className={`leading-[0.8] font-bold tracking-[-0.04em] ${sized(card.unitNumber.length, unitSizes, "text-[3.4cqw]")}`}
        >
          {card.unitNumber}
        </p>
      </div>
      <div className="flex min-w-0 flex-1 flex-col justify-between gap-[1.4cqw] pl-[3cqw]">
        <p
          className={`leading-[0.9] font-bold tracking-[-0.03em] wrap-break-word ${sized(card.materialName.length, materialSizes, "text-[3.8cqw]")}`}
        >
          {card.materialName}
        </p>
        <div className="flex flex-wrap items-end gap-x-[3cqw] gap-y-[1cqw]">
          <p className="text-[5.4cqw] leading-none">
            gate <b>{formatInches(card.gateOpeningIn)} in</b>
          </p>
          <p className="text-[2.3cqw] leading-tight">
            measured, bed to lower edge{card.gateScaleMark !== null && `, scale mark ${card.gateScaleMark}`}
            <br />
            {workingRpm === null ? "" : `engine ${formatWhole(workingRpm)} rpm, `}
            {card.lanesPerPass === 1 ? "one lane in a pass" : `${card.lanesPerPass} lanes in a pass`}
          </p>
        </div>
      </div>
    </header>
  );
}

function Legend({ band }: Props["printed"]) {
  return (
    <p className="flex flex-wrap items-center gap-x-[3cqw] text-[2.5cqw] leading-snug">
      <span>Pounds per lane mile.</span>
      {band && (
        <>
          <span className="flex items-center gap-[0.8cqw]">
            <span aria-hidden="true" className="h-[2.2cqw] w-[3.4cqw] rounded-plate bg-[#000]" /> in the band,{" "}
            {formatWhole(band.lowLbPerLaneMile)}–{formatWhole(band.highLbPerLaneMile)}
          </span>
          <span className="flex items-center gap-[0.8cqw]">
            <span
              aria-hidden="true"
              className="h-[2.2cqw] w-[3.4cqw] rounded-plate border-2 border-dotted border-[#000]"
            />{" "}
            under
          </span>
          <span>plain: over</span>
        </>
      )}
    </p>
  );
}

/** Whether the cell lies in the band was judged before rounding; what is not in it lies on one side or the other. */
function Cell({ cell, band }: { cell: CabCardCell; band: Props["printed"]["band"] }) {
  const box = "flex h-full items-center justify-center rounded-plate";
  const words = String(cell.wholeLbPerLaneMile);
  if (cell.inBand) {
    return (
      <span className={`${box} bg-[#000] font-bold text-[#fff]`}>
        <span className="sr-only">in the band: </span>
        {words}
      </span>
    );
  }
  if (band && cell.wholeLbPerLaneMile < (band.lowLbPerLaneMile + band.highLbPerLaneMile) / 2) {
    return (
      <span className={`${box} border-[0.35cqw] border-dotted border-[#000] font-normal`}>
        <span className="sr-only">under the band: </span>
        {words}
      </span>
    );
  }
  return <span className={`${box} font-semibold`}>{words}</span>;
}

function Foot({ card, townName, plusMinusPercent, qr, address }: Props["printed"]) {
  const by = card.testedBy === "" ? "" : ` by ${card.testedBy}`;
  const quiet = 3;
  return (
    <footer className="mt-[1.6cqw] flex items-start gap-[3cqw] text-[2.25cqw] leading-snug">
      <div className="flex-1">
        <p className="text-[3.4cqw] leading-tight font-bold">Not valid after {formatShortDay(card.validUntil)}</p>
        <p className="mt-[0.6cqw]">
          Weighed {formatShortDay(card.testedOn)}
          {by}
          {plusMinusPercent === null ? ", one catch only" : `, ± ${formatWhole(Math.max(1, plusMinusPercent))} %`}.
          {card.words.limit !== null && ` ${card.words.limit}.`} Weigh again after work on gate, hydraulics, feed or
          controller.
        </p>
        <p className="mt-[0.6cqw] font-semibold">A yardstick, not an order: policy, road and weather decide.</p>
        <p className="mt-[1cqw] flex items-center gap-[1cqw] text-[2.6cqw] font-bold">
          <svg viewBox="0 0 32 32" aria-hidden="true" className="size-[3cqw] flex-none fill-current">
            <path d="M2 3h28v3.6h-2V10h4l-1.7 7h-6.6L22 10h4V6.6H6V10h4l-1.7 7H1.7L0 10h4V6.6H2z" />
            <path
              fillRule="evenodd"
              d="M14.1 6.6h3.8L25.4 30H6.6zM15.4 10.4h1.2v3.4h-1.2zM15 16.4h2v4.2h-2zM14.5 23.4h3V30h-3z"
            />
          </svg>
          {townName}
        </p>
      </div>
      <div className="w-[15cqw] flex-none">
        <svg
          viewBox={`${-quiet} ${-quiet} ${qr.size + 2 * quiet} ${qr.size + 2 * quiet}`}
          role="img"
          aria-label={`QR code that leads to ${address}`}
          shapeRendering="crispEdges"
          className="block w-full"
        >
          <path d={qr.path} fill="#000" />
        </svg>
        <p className="text-center text-[1.9cqw] leading-tight">the record</p>
      </div>
    </footer>
  );
}
