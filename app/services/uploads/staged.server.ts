import { z } from "zod";
import type { StagedCalibration } from "#app/domain/calibration/calibration-file.ts";
import { controlKinds, spreaderKinds } from "#app/domain/fleet/truck.ts";
import type { StagedTruck } from "#app/domain/fleet/truck-file.ts";
import type { StagedSeason } from "#app/domain/season/season-file.ts";
import { type StagedStock, stockKinds } from "#app/domain/season/stock-file.ts";
import type { StagedStorm } from "#app/domain/season/storm-file.ts";
import type { WeatherDay } from "#app/domain/severity/weather-day.ts";
import { stormKinds } from "#app/domain/season/storm-kind.ts";

const Positive = z.number().positive();
const Amount = z.number().nonnegative();

/** The shapes in which rows wait to be accepted. They are read back from text, so they are looked over again. */
export const SeasonShape = z.object({
  row: z.number(),
  seasonStartYear: z.number().int(),
  amounts: z.object({
    laneMiles: Positive,
    eventCount: Amount,
    saltLb: Amount,
    mixLb: Amount,
    mixSaltShare: Amount.nullable(),
    sandLb: Amount,
    brineGal: Amount.nullable(),
    materialCostCents: Amount.nullable(),
  }),
}) satisfies z.ZodType<StagedSeason>;

export const CalibrationShape = z.object({
  row: z.number(),
  truckId: z.number().int(),
  unitNumber: z.string(),
  materialId: z.number().int(),
  materialName: z.string(),
  testedOn: z.string(),
  gateOpeningIn: Positive,
  counts: z.array(z.object({ setting: z.number().int(), revolutions: Positive, seconds: Positive })),
  catches: z.array(z.object({ revolutions: Positive, grossLb: Positive, tareLb: Amount })),
}) satisfies z.ZodType<StagedCalibration>;

export const TruckShape = z.object({
  row: z.number(),
  truckId: z.number().int().nullable(),
  unitNumber: z.string(),
  body: z.string(),
  spreaderKind: z.enum(spreaderKinds),
  control: z.enum(controlKinds),
  lanesPerPass: Positive,
  workingSpeedMph: Positive,
  workingSetting: Positive,
  workingRpm: Positive.nullable(),
  gateMaxIn: Positive.nullable(),
  capacityTons: Positive.nullable(),
  isInService: z.boolean(),
  materialIds: z.array(z.number().int()),
}) satisfies z.ZodType<StagedTruck>;

export const StormShape = z.object({
  seasonStartYear: z.number().int(),
  startedAt: z.string(),
  endedAt: z.string().nullable(),
  kind: z.enum(stormKinds),
  pavementTempF: z.number().nullable(),
  passes: Amount.nullable(),
  laneMilesTreated: Amount.nullable(),
  hours: Amount.nullable(),
  truckId: z.number().int().nullable(),
  route: z.string(),
  note: z.string(),
  uses: z.array(z.object({ materialId: z.number().int(), usedLb: Amount.nullable(), usedGal: Amount.nullable() })),
}) satisfies z.ZodType<StagedStorm>;

export const StockShape = z.object({
  seasonStartYear: z.number().int(),
  day: z.string(),
  kind: z.enum(stockKinds),
  materialId: z.number().int(),
  quantityLb: Amount,
  typedQuantity: Amount,
  typedUnit: z.enum(["ton", "lb", "kg", "tonne", "cubic-yard"]),
  lbPerCubicYard: z.number().nullable(),
  priceCents: Amount.nullable(),
  supplier: z.string(),
}) satisfies z.ZodType<StagedStock>;

export const WeatherShape = z.object({
  day: z.string(),
  tmaxF: z.number().nullable(),
  tminF: z.number().nullable(),
  snowfallIn: Amount.nullable(),
  isSnowfallTrace: z.boolean(),
  snowDepthIn: Amount.nullable(),
  isSnowDepthTrace: z.boolean(),
  precipIn: Amount.nullable(),
  isPrecipTrace: z.boolean(),
}) satisfies z.ZodType<WeatherDay>;

/** A row that waits, or nothing for rows that only belong to another. */
export type StagedRow = { sheetRow: number; staged: unknown };

/** Why nothing was taken in, in a sentence; the upload can then be checked again. */
export class NotNow extends Error {}

/** What one batch of rows came to: how many were stored, in which seasons, on which days. */
export type Stored = { rowCount: number; seasonStartYears: readonly number[]; days: readonly string[] };
