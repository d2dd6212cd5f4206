export const spreaderKinds = ["tailgate-auger", "hopper-auger", "conveyor", "liquid-tanks"] as const;
export type SpreaderKind = (typeof spreaderKinds)[number];

export const controlKinds = ["manual", "ground-speed"] as const;
/** Who keeps the rate while the speed changes: the driver by hand, or a controller that knows the speed. */
export type ControlKind = (typeof controlKinds)[number];

/** What a town says of one of its trucks. `null` where it is not known. */
export type TruckFacts = {
  unitNumber: string;
  body: string;
  spreaderKind: SpreaderKind;
  control: ControlKind;
  lanesPerPass: number;
  workingSpeedMph: number;
  workingSetting: number;
  workingRpm: number | null;
  /** The widest the gate opens, inches from the bed to its lower edge. */
  gateMaxIn: number | null;
  capacityTons: number | null;
  isInService: boolean;
};

type Limits = { what: string; min: number; max: number; isWhole?: boolean };

/** What any truck can have. Wide on purpose: they catch slips of the pen and of the unit, and judge no equipment. */
export const truckLimits = {
  lanesPerPass: { what: "lanes spread in one pass", min: 1, max: 4, isWhole: true },
  workingSpeedMph: { what: "working speed, mph", min: 3, max: 60 },
  workingSetting: { what: "working setting", min: 1, max: 40, isWhole: true },
  workingRpm: { what: "engine rpm", min: 400, max: 4000, isWhole: true },
  gateMaxIn: { what: "widest gate opening, inches", min: 0.25, max: 24 },
  capacityTons: { what: "load, tons", min: 0.1, max: 60 },
} as const satisfies Record<string, Limits>;

export const longestUnitNumber = 20;
export const longestBody = 60;
