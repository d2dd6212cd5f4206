import type { LocalDate } from "#app/domain/dates.ts";
import type { Band, MaterialKind } from "./band.ts";
import type { Catch } from "./catch-weight.ts";
import type { Count } from "./count-rate.ts";

export type KitTruck = {
  id: number;
  unitNumber: string;
  isInService: boolean;
  spreaderKind: "tailgate-auger" | "hopper-auger" | "conveyor" | "liquid-tanks";
  control: "manual" | "ground-speed";
  lanesPerPass: number;
  workingSpeedMph: number;
  workingSetting: number;
  workingRpm: number | null;
  gateMaxIn: number | null;
  /** Those it carries; empty when nobody has said. */
  materialIds: number[];
};

export type KitMaterial = { id: number; name: string; kind: MaterialKind };

/** A calibration of the same town, for its counts and for what was weighed at other gate openings. */
export type KitCalibration = {
  id: number;
  truckId: number;
  materialId: number;
  testedOn: LocalDate;
  gateOpeningIn: number;
  isInForce: boolean;
  counts: (Count & { engineRpm: number | null })[];
  catches: Catch[];
};

/** All that a phone needs in the yard, so that worksheets can be begun and worked out without signal. */
export type YardKit = {
  userId: number;
  personName: string;
  townId: number;
  townName: string;
  trucks: KitTruck[];
  materials: KitMaterial[];
  bands: Record<MaterialKind, Band | null>;
  tolerancePercent: number;
  /** Newest first, at most three of each truck and material. */
  calibrations: KitCalibration[];
};
