import fc from "fast-check";
import { expect, test } from "vitest";
import { layOutStrip } from "#app/components/charts/lane-strip-layout.ts";
import { marksPerHeap, stripParts } from "#app/components/charts/lane-strip-spec.ts";
import { heapWords, laneStripSentence, markWords } from "#app/components/charts/lane-strip-words.ts";
import { fewTowns, manyTowns, nineTowns, shown, sixTowns } from "./strips.ts";

test("with five towns or fewer only the band and our flag are drawn", () => {
  expect(stripParts(fewTowns)).toEqual({
    hasPlate: false,
    hasInterval: false,
    hasMiddleHalf: false,
    heaps: "none",
    townsPerMark: 1,
    hasFlag: true,
  });
});

test("from six towns the median is drawn, from nine its interval, from twelve the middle half and the heaps", () => {
  expect(stripParts(sixTowns)).toMatchObject({ hasPlate: true, hasInterval: false, heaps: "none" });
  expect(stripParts(nineTowns)).toMatchObject({ hasPlate: true, hasInterval: true, hasMiddleHalf: false });
  expect(stripParts(manyTowns)).toMatchObject({ hasInterval: false, hasMiddleHalf: true, heaps: "grains" });
});

test("a heap of nine towns is three rows of grains; one of ten turns the strip to bars of three", () => {
  const nine = shown(manyTowns, { heaps: [{ from: 300, to: 320, count: 9 }] });
  const ten = shown(manyTowns, { heaps: [{ from: 300, to: 320, count: 10 }] });
  expect(stripParts(nine).heaps).toBe("grains");
  expect(marksPerHeap(nine)).toEqual([9]);
  expect(stripParts(ten)).toMatchObject({ heaps: "bars", townsPerMark: 3 });
  expect(marksPerHeap(ten)).toEqual([3]);
});

test("a heap of 4,000 towns still fits the near lane, and the strip says what a bar stands for", () => {
  const crowded = shown(manyTowns, { heaps: [{ from: 300, to: 320, count: 4000 }] });
  expect(stripParts(crowded).townsPerMark).toBe(1000);
  expect(markWords(crowded)).toBe("each bar is about 1000 towns");
  const layout = layOutStrip(crowded, "desk");
  expect(layout.bars).toHaveLength(4);
  expect(Math.min(...layout.bars.map((bar) => bar.y1))).toBeGreaterThan(layout.centreY);
});

test("the wall never shows our flag and never single towns, whatever it is handed", () => {
  expect(stripParts(manyTowns, "wall")).toMatchObject({ hasFlag: false, heaps: "bars" });
  expect(layOutStrip(manyTowns, "wall")).toMatchObject({ flag: null, grains: [] });
  expect(laneStripSentence(manyTowns, "wall")).not.toContain("388");
});

test("a count made in bars is told as about three towns a bar", () => {
  const bars = shown(manyTowns, { heapKind: "bars", heaps: [{ from: 340, to: 380, count: 2 }] });
  if (bars.peers.state === "withheld") throw new Error("the strip should show its peers");
  expect(heapWords({ from: 340, to: 380, count: 2 }, bars.peers, bars)).toBe(
    "340 to 379 lb per lane mile: about 6 towns",
  );
});

test("the open heaps read and less, and more", () => {
  const words = shownPeers().heaps.map((heap) => heapWords(heap, shownPeers(), manyTowns));
  expect(words[0]).toBe("220 and less lb per lane mile: 3 towns");
  expect(words.at(-1)).toBe("400 and more lb per lane mile: 4 towns");
  expect(layOutStrip(manyTowns, "desk").openEnds.map((end) => end.words)).toEqual(["‹ 220 and less", "400 and more ›"]);
});

test("the sentence says what the picture says", () => {
  expect(laneStripSentence(manyTowns)).toBe(
    "Ours is 388 lb per lane mile, 85th percentile. The peer median is 320 lb per lane mile, likely between 280 and 370. " +
      "Half of the towns lie between 270 and 380. From 36 towns. The band is 250 to 300.",
  );
  expect(laneStripSentence(fewTowns)).toBe(
    "Ours is 388 lb per lane mile, 85th percentile. The peers’ figures are hidden to protect members: too few towns. " +
      "The band is 250 to 300.",
  );
});

test("pounds have no decimals, a ratio on an axis of tenths has two", () => {
  const ratio = {
    ...sixTowns,
    unit: "times the expected",
    axis: { from: 0.6, to: 1.4, step: 0.1 },
    band: null,
    own: null,
  };
  expect(laneStripSentence(shown(ratio, { median: 1 }))).toContain("median is 1.00 times");
  expect(laneStripSentence(shown(sixTowns, { median: 319.6 }))).toContain("median is 320 lb");
});

test("a figure of ours beyond the axis stands at its end with an arrow on the flag", () => {
  const over = layOutStrip({ ...manyTowns, own: { value: 612, label: "612", note: "" } }, "desk").flag;
  const under = layOutStrip({ ...manyTowns, own: { value: 20, label: "20", note: "" } }, "desk").flag;
  expect(over).toMatchObject({ x: 883, words: "612 ›", isLeft: true });
  expect(under).toMatchObject({ x: 5, words: "‹ 20", isLeft: false });
});

test("wherever our flag stands, the plate stays clear of the stake, and plate and grains stay on the lane", () => {
  const values = fc.double({ min: 100, max: 600, noNaN: true });
  const widths = fc.integer({ min: 300, max: 1200 });
  fc.assert(
    fc.property(
      values,
      values,
      widths,
      fc.constantFrom("desk" as const, "phone" as const),
      (own, median, widthPx, size) => {
        const spec = { ...shown(manyTowns, { median }), own: { value: own, label: "388", note: "85th percentile" } };
        const layout = layOutStrip(spec, size, widthPx);
        const plate = layout.plate;
        if (plate === null || layout.flag === null) throw new Error("a part is missing");
        expect(plate.x1).toBeGreaterThanOrEqual(3.9);
        expect(plate.x2).toBeLessThanOrEqual(widthPx - 3.9);
        expect(layout.flag.x > plate.x1 - 5 && layout.flag.x < plate.x2 + 5).toBe(false);
        for (const grain of layout.grains) {
          expect(grain.x).toBeGreaterThan(0);
          expect(grain.x).toBeLessThan(widthPx);
          expect(grain.y).toBeGreaterThan(layout.centreY);
          expect(grain.y).toBeLessThan(layout.laneBottom);
        }
      },
    ),
    { numRuns: 1000 },
  );
});

function shownPeers() {
  if (manyTowns.peers.state === "withheld") throw new Error("the strip should show its peers");
  return manyTowns.peers;
}
