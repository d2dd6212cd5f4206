import type { Finding } from "#app/domain/finding.ts";
import { median } from "#app/domain/stats/median.ts";
import { lbToShortTons } from "#app/domain/units.ts";
import { type SeasonAmounts, fewestEvents, seasonTotals } from "./season-totals.ts";

/** Limits of our own, set wide: they catch a slipped decimal or a wrong unit, not a hard winter. */
const absurdSaltTonsPerLaneMile = 60;
const doubtfulSaltTonsPerLaneMile = 25;
const mostEvents = 120;
const doubtfulFactor = 2;
const doubtfulLaneMileShare = 0.2;
const costPerTonUsd = { low: 20, high: 200 };
const centsPerUsd = 100;
/** No town reports less than this; a division by less could run out of the range of numbers. */
const fewestLaneMiles = 0.1;
const mostOfAnything = 1e12;

function error(code: string, field: string, message: string): Finding {
  return { code, severity: "error", field, message };
}

function check(code: string, field: string, message: string): Finding {
  return { code, severity: "check", field, message };
}

function isAmount(value: number) {
  return value >= 0 && value <= mostOfAnything;
}

/** Figures that cannot be right whatever the winter; while one stands, nothing is computed from them. */
function impossibleFindings(amounts: SeasonAmounts): Finding[] {
  const findings: Finding[] = [];
  if (!(amounts.laneMiles >= fewestLaneMiles && amounts.laneMiles <= mostOfAnything)) {
    findings.push(error("lane-miles", "laneMiles", `Lane miles must be ${fewestLaneMiles} or more.`));
  }
  if (!Number.isInteger(amounts.eventCount) || amounts.eventCount < 0) {
    findings.push(error("events", "eventCount", "The number of events must be a whole number, 0 or more."));
  }
  const named = [
    ["saltLb", "Salt", amounts.saltLb],
    ["mixLb", "Mix", amounts.mixLb],
    ["sandLb", "Sand", amounts.sandLb],
    ["brineGal", "Brine", amounts.brineGal ?? 0],
    ["materialCostCents", "Material cost", amounts.materialCostCents ?? 0],
  ] as const;
  for (const [field, name, value] of named) {
    if (!isAmount(value))
      findings.push(error("out-of-range", field, `${name} must be 0 or more, and below a trillion.`));
  }
  const share = amounts.mixSaltShare;
  if (share !== null && !(share >= 0 && share <= 1)) {
    findings.push(error("mix-salt-share", "mixSaltShare", "The salt in the mix must lie between 0 and 100 %."));
  } else if (share === null && amounts.mixLb > 0) {
    findings.push(error("mix-salt-share", "mixSaltShare", "Mix was used: say how much of it is salt, in percent."));
  }
  return findings;
}

function eventFindings({ eventCount }: SeasonAmounts): Finding[] {
  if (eventCount > mostEvents) {
    const message = `${eventCount} events are more than a season holds; ${mostEvents} is the most that is taken.`;
    return [error("too-many-events", "eventCount", message)];
  }
  if (eventCount >= fewestEvents) return [];
  const message = `With ${eventCount === 1 ? "1 event" : `${eventCount} events`} no salt per event is worked out; it takes ${fewestEvents}.`;
  return [check("few-events", "eventCount", message)];
}

function saltFindings(amounts: SeasonAmounts): Finding[] {
  const tons = seasonTotals(amounts).saltTonsPerLaneMile;
  const shown = `${tons.toFixed(1)} tons of salt on each lane mile`;
  if (tons > absurdSaltTonsPerLaneMile) {
    return [error("absurd-salt", "saltLb", `${shown} cannot be right. Check the unit and the decimal point.`)];
  }
  if (tons <= doubtfulSaltTonsPerLaneMile) return [];
  return [
    check("much-salt", "saltLb", `${shown} is more than a hard winter takes. Check the tons and the lane miles.`),
  ];
}

function timesWords(ratio: number) {
  if (ratio < 1) return `about ${(100 * ratio).toFixed(0)} % of`;
  return `about ${ratio < 9.5 ? String(Number(ratio.toFixed(1))) : ratio.toFixed(0)} times`;
}

function earlierFindings(amounts: SeasonAmounts, earlier: readonly SeasonAmounts[]): Finding[] {
  const known = earlier.filter((season) => impossibleFindings(season).length === 0);
  const last = known.at(-1);
  if (!last) return [];
  const findings: Finding[] = [];
  const now = seasonTotals(amounts).saltLbPerLaneMile;
  const before = known.map((season) => seasonTotals(season).saltLbPerLaneMile).filter((rate) => rate > 0);
  if (now > 0 && before.length > 0) {
    // On the log scale twice as much and half as much are equally far off.
    const logRatio = Math.log(now) - median(before.map((rate) => Math.log(rate)));
    if (Math.abs(logRatio) > Math.log(doubtfulFactor)) {
      const seasons =
        before.length === 1 ? "that of its earlier season" : `the median of its ${before.length} earlier seasons`;
      const message = `Salt per lane mile is ${timesWords(Math.exp(logRatio))} ${seasons}. Check it, or say why.`;
      findings.push(check("unlike-earlier", "saltLb", message));
    }
  }
  const change = (amounts.laneMiles - last.laneMiles) / last.laneMiles;
  if (Math.abs(change) > doubtfulLaneMileShare) {
    const from = `from ${last.laneMiles.toFixed(0)} to ${amounts.laneMiles.toFixed(0)}`;
    const message = `Lane miles went ${from}, ${change > 0 ? "up" : "down"} ${Math.abs(100 * change).toFixed(0)} % on the season before.`;
    findings.push(check("lane-miles-changed", "laneMiles", message));
  }
  return findings;
}

function costFindings({ materialCostCents, saltLb, mixLb, sandLb }: SeasonAmounts): Finding[] {
  const tons = lbToShortTons(saltLb + mixLb + sandLb);
  if (materialCostCents === null || tons === 0) return [];
  const usdPerTon = materialCostCents / centsPerUsd / tons;
  if (usdPerTon >= costPerTonUsd.low && usdPerTon <= costPerTonUsd.high) return [];
  const usual = `$${costPerTonUsd.low} to $${costPerTonUsd.high}`;
  const message = `Material cost comes to $${usdPerTon.toFixed(0)} a ton; ${usual} is usual. Check the cost and the tons.`;
  return [check("cost-per-ton", "materialCostCents", message)];
}

/**
 * What is wrong or doubtful in a season's figures, as sentences for the town and the coordinator.
 *
 * Never throws, whatever the numbers.
 *
 * @param amounts - the season in question
 * @param earlier - the same town's earlier seasons, oldest first; may be empty
 * @returns errors first found, then checks; empty when all is well
 * @example seasonFindings({ ...amounts, eventCount: 9400 }, [])[0].code // "too-many-events"
 */
export function seasonFindings(amounts: SeasonAmounts, earlier: readonly SeasonAmounts[]): Finding[] {
  const impossible = impossibleFindings(amounts);
  if (impossible.length > 0) return impossible;
  const findings = [
    ...saltFindings(amounts),
    ...eventFindings(amounts),
    ...earlierFindings(amounts, earlier),
    ...costFindings(amounts),
  ];
  return [...findings.filter((one) => one.severity === "error"), ...findings.filter((one) => one.severity === "check")];
}
