import type { DueReason } from "#app/domain/calibration/due.ts";
import { dueWords, mostUrgent, urgencyOf } from "./due-words.ts";
import { spreaderWords } from "./fleet-words.ts";

type Rate = { lbPerLaneMile: number } | null;
type Line = {
  materialName: string;
  materialKind: string;
  due: DueReason;
  inForce: { testedOn: string; working: Rate } | null;
};
type Truck = {
  unitNumber: string;
  body: string;
  spreaderKind: keyof typeof spreaderWords;
  isInService: boolean;
  materials: readonly Line[];
};

export const sortChoices = [
  { value: "truck", label: "unit number" },
  { value: "due", label: "most overdue" },
  { value: "lays", label: "most salt" },
  { value: "weighed", label: "longest unweighed" },
];
export const stateChoices = [
  { value: "service", label: "in service" },
  { value: "due", label: "due or overdue" },
  { value: "in-date", label: "in date" },
  { value: "never", label: "never weighed" },
  { value: "all", label: "all trucks" },
];

export type RegisterView = { q: string; sort: string; state: string };

/** What of the register is asked for, from the address. Anything unknown is as if it were not there. */
export function readView(search: URLSearchParams): RegisterView {
  const known = (name: string, choices: readonly { value: string }[]) =>
    choices.find(({ value }) => value === search.get(name))?.value ?? choices[0]?.value ?? "";
  return {
    q: (search.get("q") ?? "").trim().slice(0, 60),
    sort: known("sort", sortChoices),
    state: known("state", stateChoices),
  };
}

/** The most urgent state over a truck's materials; null out of service, where nothing is due, and without a material. */
export function dueOfTruck({ isInService, materials }: Pick<Truck, "isInService" | "materials">): DueReason | null {
  return isInService ? mostUrgent(materials.map(({ due }) => due)) : null;
}

/** The salt calibration in force that speaks for the truck, else that of its first material. */
export function mainLine<T extends { materials: readonly Line[] }>(truck: T): T["materials"][number] | undefined {
  return truck.materials.find(({ materialKind }) => materialKind === "salt") ?? truck.materials[0];
}

function isLike(truck: Truck, q: string) {
  const text = [
    truck.unitNumber,
    truck.body,
    spreaderWords[truck.spreaderKind],
    ...truck.materials.map(({ materialName }) => materialName),
    ...truck.materials.map(({ due }) => dueWords[due.state]),
  ].join("\n");
  return text.toLowerCase().includes(q.toLowerCase());
}

function isInState(truck: Truck, state: string) {
  const due = dueOfTruck(truck)?.state;
  if (state === "all") return true;
  if (state === "service") return truck.isInService;
  if (state === "due") return due === "due" || due === "overdue";
  return due === state;
}

/** The trucks that are asked for, in the order asked for; the given order decides between equals. */
export function showTrucks<T extends Truck>(trucks: readonly T[], { q, sort, state }: RegisterView): T[] {
  const shown = trucks.filter((truck) => isLike(truck, q) && isInState(truck, state));
  const rate = (truck: Truck) => mainLine(truck)?.inForce?.working?.lbPerLaneMile ?? -1;
  const day = (truck: Truck) => mainLine(truck)?.inForce?.testedOn ?? "";
  if (sort === "due") return shown.sort((a, b) => urgencyOf(dueOfTruck(b)) - urgencyOf(dueOfTruck(a)));
  if (sort === "lays") return shown.sort((a, b) => rate(b) - rate(a));
  if (sort === "weighed") return shown.sort((a, b) => (day(a) < day(b) ? -1 : Number(day(a) > day(b))));
  return shown;
}
