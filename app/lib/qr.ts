import { encode } from "uqr";

export type QrDrawing = { size: number; path: string };

/**
 * A text as a QR code, ready to be drawn.
 *
 * @param text - an address; medium error correction, so that a scratch across the card does no harm
 * @returns the side in modules, without the quiet zone, and one path over the dark ones, a run of them a stroke
 */
export function qrDrawing(text: string): QrDrawing {
  const { size, data } = encode(text, { ecc: "M", border: 0 });
  const runs = data.flatMap((row, y) => {
    const strokes: string[] = [];
    let from = -1;
    for (let x = 0; x <= size; x += 1) {
      const isDark = row[x] === true;
      if (isDark && from < 0) from = x;
      if (!isDark && from >= 0) {
        strokes.push(`M${from} ${y}h${x - from}v1h-${x - from}z`);
        from = -1;
      }
    }
    return strokes;
  });
  return { size, path: runs.join("") };
}
