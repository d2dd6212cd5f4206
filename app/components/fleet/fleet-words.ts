import type { ControlKind, SpreaderKind } from "#app/domain/fleet/truck.ts";
import { formatInches } from "#app/lib/format.ts";

export const spreaderWords: Record<SpreaderKind, string> = {
  "tailgate-auger": "auger under the tailgate",
  "hopper-auger": "auger in the hopper",
  conveyor: "conveyor or belt",
  "liquid-tanks": "liquid tanks",
};

export const controlWords: Record<ControlKind, string> = {
  manual: "manual",
  "ground-speed": "ground-speed",
};

export const partWords = {
  gate: "gate",
  hydraulics: "hydraulics",
  feed: "feed (auger, chain or belt)",
  controller: "controller",
} as const;

/** "setting 3, 25 mph": where a truck is when it works. */
export function workingPointWords({
  workingSetting,
  workingSpeedMph,
}: {
  workingSetting: number;
  workingSpeedMph: number;
}) {
  return `setting ${workingSetting}, ${workingSpeedMph} mph`;
}

/** An opening for a column headed "in", or that there is none: liquid passes no gate. */
export function gateWords(gateOpeningIn: number | null): string {
  return gateOpeningIn === null ? "no gate" : formatInches(gateOpeningIn);
}

/** An opening within a sentence, with its unit. */
export function gateInWords(gateOpeningIn: number | null): string {
  return gateOpeningIn === null ? "no gate" : `${formatInches(gateOpeningIn)} in`;
}
