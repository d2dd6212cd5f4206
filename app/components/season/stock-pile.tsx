import { Form } from "react-router";
import type { DrawChart } from "#app/components/charts/chart-finish.ts";
import { LiveChart } from "#app/components/charts/live-chart.tsx";
import type { StockLadderSpec } from "#app/components/charts/stock-ladder-spec.ts";
import { Button } from "#app/components/ui/button.tsx";
import { Facts } from "#app/components/ui/facts.tsx";
import { SideBySide } from "#app/components/ui/side-by-side.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import type { StockBalance, StockKind } from "#app/domain/season/stock-balance.ts";
import type { StockUnit } from "#app/domain/season/stock-quantity.ts";
import { formatDollars, formatShareOneDecimal, formatShortDay, formatTons } from "#app/lib/format.ts";
import { stockKindWords, stockUnitWords } from "./stock-form.ts";

const load = (): Promise<DrawChart<StockLadderSpec>> =>
  import("#app/components/charts/stock-ladder-plot.ts").then((module) => module.stockLadderPlot);

type Pile = {
  name: string;
  balance: StockBalance;
  ladder: { spec: StockLadderSpec; svg: { desk: string; phone: string } } | null;
};

/** One material's pile: its facts, its ladder, the table that proves it. */
export function StockPile({ pile: { name, balance, ladder } }: { pile: Pile }) {
  if (ladder === null) return null;
  const facts = [
    { name: "used", value: balance.usedLb === null ? "not known yet" : `${formatTons(balance.usedLb)} tons` },
    { name: "logged", value: balance.loggedLb === null ? "no storm yet" : `${formatTons(balance.loggedLb)} tons` },
    { name: "unexplained", value: balance.usedLb === null ? "–" : formatShareOneDecimal(balance.unexplainedShare) },
    ...(balance.openedOn === null ? [] : [{ name: "opened", value: formatShortDay(balance.openedOn) }]),
    ...(balance.closedOn === null ? [] : [{ name: "closed", value: formatShortDay(balance.closedOn) }]),
    ...(balance.leftOutCount === 0
      ? []
      : [{ name: "left out, before opening or after closing", value: `${balance.leftOutCount} lines` }]),
  ];
  return (
    <SideBySide
      hasRule
      side={
        <>
          <h2 className="text-head leading-tight font-bold">{name}</h2>
          <p className="mb-1 text-note text-gravel">tons of 2,000 lb</p>
          <Facts facts={facts} />
        </>
      }
    >
      <figure>
        <LiveChart spec={ladder.spec} svg={ladder.svg} load={load} />
      </figure>
      <details className="group">
        <summary className="flex min-h-target w-fit list-none items-center text-note font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2 print:hidden">
          <span className="group-open:hidden">Table</span>
          <span className="hidden group-open:inline">Hide the table</span>
          <span className="sr-only">: {name}</span>
        </summary>
        <Timetable
          caption={`${name}, step by step`}
          isCaptionHidden
          onPhone="keep"
          columns={[
            { key: "step", label: "step" },
            { key: "tons", label: "tons", isNumeric: true },
            { key: "after", label: "pile after it", unit: "tons", isNumeric: true },
          ]}
          rows={ladder.spec.rungs.map(({ key, label, words, toTons }) => ({
            key,
            cells: { step: label, tons: words, after: formatTons(toTons * 2000) },
          }))}
        />
      </details>
    </SideBySide>
  );
}

type Entry = {
  id: number;
  materialId: number;
  kind: StockKind;
  day: string;
  quantityLb: number;
  typedQuantity: number;
  typedUnit: StockUnit;
  lbPerCubicYard: number | null;
  priceCents: number | null;
  supplier: string;
};

function typedWords({ typedQuantity, typedUnit, lbPerCubicYard }: Entry) {
  if (typedUnit === "ton") return "";
  const density = lbPerCubicYard === null ? "" : ` at ${lbPerCubicYard.toLocaleString("en-US")} lb`;
  return `${typedQuantity.toLocaleString("en-US")} ${stockUnitWords[typedUnit]}${density}`;
}

type EntriesProps = {
  entries: readonly Entry[];
  piles: readonly { id: number; name: string }[];
  canRemove: boolean;
};

/** Everything that moved or measured a pile, by day. */
export function StockEntries({ entries, piles, canRemove }: EntriesProps) {
  return (
    <Timetable
      caption="By day"
      isCaptionHidden
      columns={[
        { key: "day", label: "day" },
        { key: "what", label: "what" },
        { key: "material", label: "material" },
        { key: "tons", label: "tons", isNumeric: true },
        { key: "typed", label: "as written" },
        { key: "price", label: "paid", unit: "$", isNumeric: true },
        { key: "supplier", label: "supplier" },
        ...(canRemove ? [{ key: "remove", label: "" }] : []),
      ]}
      rows={entries.map((entry) => ({
        key: String(entry.id),
        cells: {
          day: formatShortDay(entry.day),
          what: stockKindWords[entry.kind],
          material: piles.find(({ id }) => id === entry.materialId)?.name ?? "–",
          tons: formatTons(entry.quantityLb),
          typed: typedWords(entry) || "tons",
          price: formatDollars(entry.priceCents),
          supplier: entry.supplier || "–",
          remove: (
            <Form method="post">
              <input type="hidden" name="entryId" value={entry.id} />
              <Button variant="quiet" size="slim" name="intent" value="remove">
                Remove
                <span className="sr-only">
                  {" "}
                  {stockKindWords[entry.kind]} of {formatShortDay(entry.day)}
                </span>
              </Button>
            </Form>
          ),
        },
      }))}
    />
  );
}
