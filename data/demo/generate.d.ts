// Types for the TypeScript that reads the demo; the rows are those of the tables of the same names.
export type TownRow = {
  id: number;
  name: string;
  district: string;
  time_zone: string;
  reports_through_town_id: number | null;
  created_at: string;
};

export type PersonRow = {
  id: number;
  subject: string;
  name: string;
  email: string;
  role: "recorder" | "director" | "coordinator" | "analyst";
  town_id: number | null;
  is_active: 0 | 1;
  created_at: string;
};

export type MaterialRow = {
  id: number;
  town_id: number;
  name: string;
  kind: "salt" | "mix" | "sand" | "brine";
  salt_share: number;
  price_cents_per_ton: number | null;
};

export type TruckRow = {
  id: number;
  town_id: number;
  unit_number: string;
  body: string;
  spreader_kind: "tailgate-auger" | "hopper-auger" | "conveyor" | "liquid-tanks";
  control: "manual" | "ground-speed";
  lanes_per_pass: number;
  working_speed_mph: number;
  working_setting: number;
  working_rpm: number | null;
  gate_max_in: number | null;
  capacity_tons: number;
  is_in_service: 0 | 1;
  created_at: string;
};

export type SeasonFigureRow = {
  id: number;
  town_id: number;
  season_start_year: number;
  version: number;
  lane_miles: number;
  event_count: number;
  salt_lb: number;
  mix_lb: number;
  mix_salt_share: number | null;
  sand_lb: number;
  brine_gal: number | null;
  material_cost_cents: number | null;
  upload_id: null;
  state: "sent" | "returned" | "accepted";
  created_at: string;
  sent_at: string;
  sent_by_id: number;
  reviewed_at: string | null;
  reviewed_by_id: number | null;
  review_note: string | null;
};

export type CalibrationRow = {
  id: number;
  client_ref: string;
  town_id: number;
  truck_id: number;
  material_id: number;
  tested_on: string;
  gate_opening_in: number;
  counts_from_calibration_id: number | null;
  state: "ready" | "approved";
  upload_id: null;
  created_by_id: number;
  created_at: string;
  approved_at: string | null;
  approved_by_id: number | null;
};

export type CountRow = {
  calibration_id: number;
  setting: number;
  revolutions: number;
  seconds: number;
  rpm: number | null;
};

export type CatchRow = {
  calibration_id: number;
  position: number;
  revolutions: number;
  gross_lb: number;
  tare_lb: number;
};

export type VerificationRow = {
  calibration_id: number;
  position: number;
  speed_mph: number;
  commanded_lb_per_lane_mile: number;
  seconds: number;
  gross_lb: number;
  tare_lb: number;
};

export type LiquidRow = {
  calibration_id: number;
  position: number;
  kind: "prewet" | "direct";
  gallons: number;
  seconds: number;
  speed_mph: number | null;
  lanes: number | null;
  dry_lb_per_min: number | null;
};

export type TruckMaterialRow = { truck_id: number; material_id: number; since_on: string | null };

export type TruckWorkRow = {
  client_ref: string;
  town_id: number;
  truck_id: number;
  done_on: string;
  part: "gate" | "hydraulics" | "feed" | "controller";
  note: string;
  created_by_id: number;
  created_at: string;
};

export type JobRow = {
  id: number;
  kind: "publish-edition";
  payload: string;
  dedupe_key: string;
  state: "ready";
  created_by_id: number;
};

export type Region = {
  town: TownRow[];
  user_account: PersonRow[];
  material: MaterialRow[];
  truck: TruckRow[];
  season: { start_year: number; figures_due_on: string }[];
  season_figure: SeasonFigureRow[];
  calibration: CalibrationRow[];
  calibration_count: CountRow[];
  calibration_catch: CatchRow[];
  calibration_verification: VerificationRow[];
  calibration_liquid: LiquidRow[];
  truck_material: TruckMaterialRow[];
  truck_work: TruckWorkRow[];
  job: JobRow[];
  doubtful: { town: string; slip: string }[];
};

export function generateRegion(options?: { seed?: number }): Region;
