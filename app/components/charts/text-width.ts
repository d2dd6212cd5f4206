/** Advance widths of Public Sans 600 with proportional figures, in hundredths of the font size. */
const advances = new Map<string, number>();
const classes: readonly [number, string][] = [
  [25, " .,:·il'’|"],
  [30, "‹›jI"],
  [40, "frt-1"],
  [52, "csvz"],
  [57, "aeokxy–"],
  [60, "bdghnpqu"],
  [64, "023456789EFJLT"],
  [71, "ABCDGHKNOPQRSUVXYZ"],
  [84, "mwMW%"],
];
for (const [hundredths, letters] of classes) for (const letter of letters) advances.set(letter, hundredths);

/** About how wide a text is drawn, in px. Good to a few per cent: enough to see what collides with what. */
export function textWidthPx(text: string, fontSizePx: number, isBold = false) {
  const hundredths = Array.from(text, (letter) => advances.get(letter) ?? 62).reduce((sum, each) => sum + each, 0);
  return (hundredths / 100) * fontSizePx * (isBold ? 1.04 : 1);
}
