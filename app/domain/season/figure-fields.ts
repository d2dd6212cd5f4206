/** The fields of a season's figures that a note can be about, in the order they are reported. */
export const figureFields = [
  "laneMiles",
  "eventCount",
  "saltLb",
  "mixLb",
  "mixSaltShare",
  "sandLb",
  "brineGal",
  "wettedSaltLb",
  "materialCostCents",
  "stock",
] as const;
export type FigureField = (typeof figureFields)[number];

/** Each field as people read it, with its unit. */
export const figureFieldWords: Record<FigureField, string> = {
  laneMiles: "Lane miles",
  eventCount: "Events",
  saltLb: "Salt, tons",
  mixLb: "Sand and salt mix, tons",
  mixSaltShare: "Salt in the mix, %",
  sandLb: "Sand and grit, tons",
  brineGal: "Brine, gallons",
  wettedSaltLb: "Salt wetted when spread, tons",
  materialCostCents: "Material cost, dollars",
  stock: "Stock and storm log",
};

/** Whether a text names a field of the figures. */
export function isFigureField(text: string): text is FigureField {
  return figureFields.some((field) => field === text);
}
