import { emptyWorksheet, type Worksheet, type WorksheetTruck } from "#app/domain/calibration/worksheet.ts";

export const truck: WorksheetTruck = { gateMaxIn: 4, workingSetting: 2, lanesPerPass: 1, workingSpeedMph: 25 };

export const head = { clientRef: "sheet-1", truckId: 12, materialId: 1, testedOn: "2026-10-09" };

/** Three settings and three catches: 10, 15 and 20 a minute with 10 lb a revolution. */
export function filledSheet(change: Partial<Worksheet> = {}): Worksheet {
  return {
    ...emptyWorksheet(head),
    cautions: { counting: true, catching: true },
    gate: { scaleMark: " 3 ", openingText: "1 7/8" },
    counts: [
      { id: "a", setting: "1", revolutions: "10", seconds: "60", rpm: "1800" },
      { id: "b", setting: "2", revolutions: "7.5", seconds: "30", rpm: "" },
      { id: "c", setting: "3", revolutions: "20", seconds: "60", rpm: "" },
    ],
    catches: [
      { id: "d", revolutions: "1", grossLb: "12", tareLb: "2" },
      { id: "e", revolutions: "2", grossLb: "22.2", tareLb: "2" },
      { id: "f", revolutions: "1", grossLb: "9.9", tareLb: "" },
    ],
    ...change,
  };
}
