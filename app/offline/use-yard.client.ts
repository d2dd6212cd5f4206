import { useMemo, useSyncExternalStore } from "react";
import { openYard, type Snapshot, type Yard } from "./session.client.ts";

/** The phone's worksheets, alive; one of them open when `clientRef` is given. */
export function useYard(clientRef: string | null): { yard: Yard; snapshot: Snapshot } {
  const yard = useMemo(() => openYard(clientRef), [clientRef]);
  return { yard, snapshot: useSyncExternalStore(yard.subscribe, yard.snapshot) };
}

/** Today where the phone is, as a local date. */
export function todayOnPhone(): string {
  const today = new Date();
  const two = (part: number) => String(part).padStart(2, "0");
  return `${today.getFullYear()}-${two(today.getMonth() + 1)}-${two(today.getDate())}`;
}
