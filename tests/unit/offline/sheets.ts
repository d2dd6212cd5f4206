import { emptyWorksheet, type Worksheet } from "#app/domain/calibration/worksheet.ts";

/** A filled-in sheet of an auger truck: three settings, three catches. */
export function aSheet(change: Partial<Worksheet> = {}): Worksheet {
  const clientRef = "0b8f3c1e-5b5e-4c59-9d1c-3f6d1c0a7e11";
  return {
    ...emptyWorksheet({ clientRef, truckId: 1, materialId: 2, testedOn: "2026-10-09" }),
    cautions: { counting: true, catching: true },
    gate: { scaleMark: "4", openingText: "1 7/8" },
    counts: [
      { id: "c1", setting: "1", revolutions: "6.25", seconds: "60", rpm: "1600" },
      { id: "c2", setting: "2", revolutions: "11", seconds: "60", rpm: "1600" },
      { id: "c3", setting: "3", revolutions: "15.5", seconds: "60", rpm: "1600" },
    ],
    catches: [
      { id: "k1", revolutions: "2", grossLb: "27", tareLb: "2.2" },
      { id: "k2", revolutions: "2", grossLb: "26.2", tareLb: "2.2" },
      { id: "k3", revolutions: "2", grossLb: "26.6", tareLb: "2.2" },
    ],
    ...change,
  };
}
