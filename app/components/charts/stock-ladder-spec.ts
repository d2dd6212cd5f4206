import { flaggedUnexplainedShare, type StockBalance } from "#app/domain/season/stock-balance.ts";
import { lbToShortTons } from "#app/domain/units.ts";

/** One rung: a pile, or what was added to it or taken from it. In short tons. */
export type Rung = {
  key: "opening" | "received" | "transfers" | "logged" | "unexplained" | "used" | "closing";
  label: string;
  fromTons: number;
  toTons: number;
  /** With its sign for what moved. */
  words: string;
  tone: "pile" | "in" | "out" | "over";
};

export type StockLadderSpec = { materialName: string; rungs: Rung[]; sentence: string; mostTons: number };

const oneDecimal = new Intl.NumberFormat("en-US", { minimumFractionDigits: 1, maximumFractionDigits: 1 });

function signed(tons: number) {
  return `${tons < 0 ? "−" : "+"}${oneDecimal.format(Math.abs(tons))}`;
}

/**
 * The pile's way through the season, rung by rung, as far as it is known.
 *
 * @returns null when nothing was measured, moved or logged
 */
export function stockLadder(materialName: string, balance: StockBalance): StockLadderSpec | null {
  const tons = (weightLb: number): number => lbToShortTons(weightLb);
  const opening = tons(balance.openingLb ?? 0);
  const received = tons(balance.receivedLb);
  const transfers = tons(balance.transferredInLb - balance.transferredOutLb);
  const logged = tons(balance.loggedLb ?? 0);
  if (balance.openingLb === null && balance.closingLb === null && received === 0 && logged === 0) return null;
  const rungs: Rung[] = [];
  const add = (key: Rung["key"], label: string, from: number, to: number, words: string, tone: Rung["tone"]) =>
    rungs.push({ key, label, fromTons: from, toTons: to, words, tone });

  if (balance.openingLb !== null) add("opening", "opening", 0, opening, oneDecimal.format(opening), "pile");
  const afterReceived = opening + received;
  add("received", "received", opening, afterReceived, signed(received), "in");
  const available = afterReceived + transfers;
  if (transfers !== 0) {
    add("transfers", "transfers", afterReceived, available, signed(transfers), transfers > 0 ? "in" : "out");
  }
  const afterLogged = available - logged;
  if (balance.loggedLb !== null) add("logged", "logged", available, afterLogged, signed(-logged), "out");
  if (balance.closingLb !== null) {
    const closing = tons(balance.closingLb);
    if (balance.unexplainedLb !== null) {
      const isOver = Math.abs(balance.unexplainedShare ?? 1) > flaggedUnexplainedShare;
      add(
        "unexplained",
        "unexplained",
        afterLogged,
        closing,
        signed(-tons(balance.unexplainedLb)),
        isOver ? "over" : "out",
      );
    }
    if (balance.loggedLb === null && balance.usedLb !== null) {
      add("used", "used, no log", available, closing, signed(-tons(balance.usedLb)), "out");
    }
    add("closing", "closing", 0, closing, oneDecimal.format(closing), "pile");
  }
  const said = rungs.map(({ label, words }) => `${label} ${words}`).join(", ");
  return {
    materialName,
    rungs,
    sentence: `${materialName}, tons: ${said}.`,
    mostTons: Math.max(1, ...rungs.flatMap(({ fromTons, toTons }) => [fromTons, toTons])),
  };
}
