import { renderToStaticMarkup } from "react-dom/server";
import { expect, test } from "vitest";
import { CabCard } from "#app/components/fleet/cab-card.tsx";
import { cabCard } from "#app/domain/calibration/card.ts";
import { qrDrawing } from "#app/lib/qr.ts";

const band = { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 };
const address = "http://127.0.0.1:1/fleet/calibrations/7";

function printed(standing: "in-force" | "ready" | "history" = "in-force") {
  return {
    card: cabCard({
      unitNumber: "12",
      materialName: "Salt",
      gateOpeningIn: 1.6875,
      gateScaleMark: "3",
      testedOn: "2026-10-13",
      testedBy: "Dell Farrow",
      lanesPerPass: 1,
      // At 10 lb a turn and 25 mph a count of 11.25 a minute lays 270 on a lane mile; the third turns no faster.
      counts: [
        { setting: 1, revolutions: 5, seconds: 60 },
        { setting: 2, revolutions: 11.25, seconds: 60 },
        { setting: 3, revolutions: 20, seconds: 60 },
        { setting: 4, revolutions: 20, seconds: 60 },
      ],
      catches: [{ revolutions: 1, grossLb: 12, tareLb: 2 }],
      speedsMph: [20, 25],
      workingSpeedMph: 25,
      band,
    }),
    townName: "Quillbrook",
    band,
    workingSpeedMph: 25,
    workingRpm: 1600,
    plusMinusPercent: null,
    standing,
    address,
    qr: qrDrawing(address),
  };
}

const markup = renderToStaticMarkup(<CabCard printed={printed()} />);
const words = markup.replace(/<[^>]+>/g, " ").replace(/\s+/g, " ");

test("the card says truck, material, gate, day, who, and until when it holds", () => {
  for (const part of ["Truck 12", "Salt", "1 11/16 in", "scale mark 3", "13 Oct 2026", "Dell Farrow"]) {
    expect(words).toContain(part);
  }
  expect(words).toContain("Not valid after 30 Jun 2027");
  expect(words).toContain("one catch only");
});

test("cells in and under the band are told apart by box and weight and by a word for the ear", () => {
  const cellOf = (figure: string) =>
    new RegExp(`<span class="([^"]*)">(?:<span[^>]*>([^<]*)</span>)?${figure}</span>`).exec(markup);
  expect(cellOf("270")?.[1]).toMatch(/bg-\[#000\].*font-bold/);
  expect(cellOf("270")?.[2]).toBe("in the band: ");
  expect(cellOf("120")?.[1]).toMatch(/border-dotted.*font-normal/);
  expect(cellOf("120")?.[2]).toBe("under the band: ");
  expect(cellOf("480")?.[1]).not.toMatch(/border|bg-/);
  expect(cellOf("480")?.[2]).toBeUndefined();
});

test("the setting in the band is stated, never ordered", () => {
  expect(words).toContain("In the band at 25 mph: setting 2");
  expect(words).toContain("A yardstick, not an order");
  expect(words).not.toMatch(/\b(use|apply|spread at|must|should)\b/i);
});

test("settings at the hydraulics' limit get no row of their own, but a line", () => {
  expect(words).toContain("Hydraulics at their limit: setting 4 as setting 3");
  expect(markup.match(/<tr class/g)).toHaveLength(3);
});

test("a card that is not in force says so on its face", () => {
  expect(words).not.toContain("not for use");
  expect(renderToStaticMarkup(<CabCard printed={printed("ready")} />)).toContain("Not approved: not for use");
  expect(renderToStaticMarkup(<CabCard printed={printed("history")} />)).toContain("Replaced by a later calibration");
});

test("nothing on the card needs a style of its own", () => {
  expect(markup).not.toMatch(/style=/);
});

test("a QR code is square, begins with its finder pattern, and changes with the text", () => {
  const { size, path } = qrDrawing(address);
  expect((size - 17) % 4).toBe(0);
  // The finder pattern in the corner is seven modules wide.
  expect(path.startsWith("M0 0h7v1h-7z")).toBe(true);
  expect(path).toContain(`M${size - 7} 0h7v1h-7z`);
  expect(qrDrawing(`${address}1`).path).not.toBe(path);
});
