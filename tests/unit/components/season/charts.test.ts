import { expect, test } from "vitest";
import { buildUpPlot } from "#app/components/charts/build-up-plot.ts";
import type { BuildUpSpec } from "#app/components/charts/build-up-spec.ts";
import { chartSvgs } from "#app/components/charts/chart-svg.server.ts";
import { stockLadderPlot } from "#app/components/charts/stock-ladder-plot.ts";
import { stockLadder } from "#app/components/charts/stock-ladder-spec.ts";
import { type LogLine, stockBalance, type StockLine } from "#app/domain/season/stock-balance.ts";

const lines: StockLine[] = [
  { kind: "opening", day: "2025-10-01", quantityLb: 200_000 },
  { kind: "delivery", day: "2025-11-20", quantityLb: 400_000 },
  { kind: "closing", day: "2026-04-30", quantityLb: 120_000 },
];
const log = (usedLb: number): LogLine[] => [{ day: "2026-01-01", usedLb }];

function ladder(usedLb: number | null) {
  const spec = stockLadder("Salt", stockBalance(lines, usedLb === null ? null : log(usedLb)));
  if (!spec) throw new Error("a ladder was expected");
  return spec;
}

test("each rung of the ladder starts where the one before ended, down to the closing pile", () => {
  const { rungs, sentence } = ladder(450_000);
  expect(rungs.map(({ key, fromTons, toTons, words }) => [key, fromTons, toTons, words])).toEqual([
    ["opening", 0, 100, "100.0"],
    ["received", 100, 300, "+200.0"],
    ["logged", 300, 75, "−225.0"],
    ["unexplained", 75, 60, "−15.0"],
    ["closing", 0, 60, "60.0"],
  ]);
  expect(sentence).toBe("Salt, tons: opening 100.0, received +200.0, logged −225.0, unexplained −15.0, closing 60.0.");
});

test("over a tenth unexplained is marked, under it is not, and without a log the use has its own rung", () => {
  const tone = (usedLb: number) => ladder(usedLb).rungs.find(({ key }) => key === "unexplained")?.tone;
  expect([tone(450_000), tone(400_000)]).toEqual(["out", "over"]);
  expect(ladder(null).rungs.map(({ key }) => key)).toEqual(["opening", "received", "used", "closing"]);
});

test("nothing written down is no ladder", () => {
  expect(stockLadder("Salt", stockBalance([], null))).toBeNull();
});

test("the ladder is drawn with a bar for each rung, its words, a title, and no style element", () => {
  const { desk, phone } = chartSvgs(stockLadderPlot, ladder(400_000));
  for (const svg of [desk, phone]) {
    expect(svg).toContain('role="img"');
    expect(svg).toContain("<title>Salt, tons: opening");
    expect(svg).not.toContain("<style");
    expect(svg).not.toContain("NaN");
    for (const words of ["opening", "unexplained", "−40.0", "60.0"]) expect(svg).toContain(`>${words}</text>`);
    expect(svg.match(/<rect /g)).toHaveLength(5);
    expect(svg).not.toMatch(/<g[^>]*aria-label/);
  }
});

const days: BuildUpSpec["days"] = Array.from({ length: 120 }, (_, place) => ({
  dayOfSeason: 140 + place,
  totalPoints: 8 * place,
  snowPoints: 3 * place,
  isMissing: place % 40 === 0,
}));
const usual = Array.from({ length: 243 }, (_, place) => ({
  dayOfSeason: 93 + place,
  lowPoints: 3 * place,
  medianPoints: 4 * place,
  highPoints: 5 * place,
}));

test("the build-up is drawn with its line's end in words and a tick for each day with a missing reading", () => {
  const spec = { days, usual, endWords: "952", sentence: "952 points." };
  const { desk } = chartSvgs(buildUpPlot, spec);
  expect(desk).toContain(">952</text>");
  expect(desk).toContain("<title>952 points.</title>");
  expect(
    desk
      .match(/stroke="var\(--color-rust\)"[^>]*>(?:<line[^>]*><\/line>|<line[^>]*\/>)+/g)
      ?.join("")
      ?.match(/<line/g),
  ).toHaveLength(3);
  expect(desk).not.toContain("NaN");
  const alone = chartSvgs(buildUpPlot, {
    ...spec,
    usual: null,
    days: days.map((day) => ({ ...day, isMissing: false })),
  });
  expect(alone.desk).not.toContain("var(--color-rust)");
  expect(alone.desk).not.toContain("stroke-dasharray");
});
