import { lbPerLaneMileToKgPerLaneKm, lbToKg, milesToKm } from "#app/domain/units.ts";

export type UnitChoice = "us" | "si";
export type BasisChoice = "lane" | "mile";
export type StepChoice = 5 | 10;
export type RateView = { units: UnitChoice; basis: BasisChoice; stepMph: StepChoice };

/** How the rates are to be shown, from the address; what is not asked for is US, per lane mile, every 5 mph. */
export function readRateView(search: URLSearchParams): RateView {
  return {
    units: search.get("units") === "si" ? "si" : "us",
    basis: search.get("basis") === "mile" ? "mile" : "lane",
    stepMph: search.get("step") === "10" ? 10 : 5,
  };
}

/** The address of the same page with one choice changed. */
export function viewAddress(path: string, view: RateView, change: Partial<RateView>) {
  const { units, basis, stepMph } = { ...view, ...change };
  const search = new URLSearchParams();
  if (stepMph !== 5) search.set("step", String(stepMph));
  if (basis !== "lane") search.set("basis", basis);
  if (units !== "us") search.set("units", units);
  return search.size === 0 ? path : `${path}?${search.toString()}`;
}

/** A rate in the unit chosen; the factor is the same for a mile of travel and a mile of lane. */
export function shownRate(rateLb: number, units: UnitChoice) {
  return units === "us" ? rateLb : lbPerLaneMileToKgPerLaneKm(rateLb);
}

export function shownSpeed(speedMph: number, units: UnitChoice) {
  return units === "us" ? speedMph : milesToKm(speedMph);
}

export function shownWeight(weightLb: number, units: UnitChoice) {
  return units === "us" ? weightLb : lbToKg(weightLb);
}

export function rateUnitWords({ units, basis }: Pick<RateView, "units" | "basis">) {
  if (units === "us") return basis === "lane" ? "lb per lane mile" : "lb per mile";
  return basis === "lane" ? "kg per lane km" : "kg per km";
}

export function speedUnitWords(units: UnitChoice) {
  return units === "us" ? "mph" : "km/h";
}

/** Whole in mph, a tenth in km/h: the speeds are round in mph only. */
export function speedWords(speedMph: number, units: UnitChoice) {
  const speed = shownSpeed(speedMph, units);
  return String(Number(speed.toFixed(1)));
}

export function weightUnitWords(units: UnitChoice) {
  return units === "us" ? "lb" : "kg";
}
