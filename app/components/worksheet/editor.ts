import type { Worksheet } from "#app/domain/calibration/worksheet.ts";
import type { KitCalibration, KitMaterial, KitTruck } from "#app/domain/calibration/yard-kit.ts";
import type { Band } from "#app/domain/calibration/band.ts";
import type { Finding } from "#app/domain/finding.ts";

/** What every step of the worksheet works with. */
export type Editor = {
  sheet: Worksheet;
  truck: KitTruck;
  material: KitMaterial;
  band: Band | null;
  tolerancePercent: number;
  /** Of the same truck and material, newest first. */
  earlier: readonly KitCalibration[];
  /** Kept at once. A finished sheet takes nothing more. */
  change: (sheet: Worksheet) => void;
  isFinished: boolean;
  /** What is wrong or doubtful and already worth saying, by field. */
  problemOf: (field: string) => Finding | null;
};

/** The sheet with one field of one row changed. */
export function withRow<Row extends { id: string }>(rows: readonly Row[], id: string, change: Partial<Row>): Row[] {
  return rows.map((row) => (row.id === id ? { ...row, ...change } : row));
}

/** An id for a new reading, made here so that it is the same reading however often it is sent. */
export function newReadingId(): string {
  return crypto.randomUUID();
}

/** Put the focus into a field that is about to appear. */
export function focusSoon(field: string): void {
  requestAnimationFrame(() => requestAnimationFrame(() => document.getElementById(field)?.focus()));
}
