import { expect, test } from "vitest";
import type { MemberCell, WallCell } from "#app/domain/peers/cell.ts";
import { placeSentence, sentenceText, wallSentence } from "#app/domain/peers/sentence.ts";

const band = { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 };
const axis = { from: 150, to: 550, step: 50 };
const indicator = "rate-at-working-setting";
const cell: MemberCell = {
  state: "shown",
  towns: 65,
  median: 320,
  interval: { low: 300, high: 340 },
  middleHalf: { low: 270, high: 380 },
  tenths: { low: 220, high: 460 },
  bins: [],
  axis,
};
const few: MemberCell = { ...cell, towns: 8, interval: null, middleHalf: null, tenths: null };
const withheld: MemberCell = { state: "withheld", reason: "too-few", axis };
const wall: WallCell = {
  state: "shown",
  townBand: "50 and more",
  median: 320,
  middleHalf: { low: 270, high: 380 },
  bars: [],
  axis,
};

test("388 at place 85 is 88 above the band, and only that part carries the tone", () => {
  const sentence = placeSentence({ indicator, ownValue: 388, cell, percentile: 85, band });
  expect(sentenceText(sentence)).toBe(
    "Your salt trucks lay a median of 388 lb per lane mile at the working setting: 88 above the band, more than about 85 in 100 of your peers.",
  );
  expect(sentence.parts.filter(({ tone }) => tone)).toEqual([{ words: "88 above the band", tone: "over" }]);
});

test.each([
  [275, 30, "inside the band, less than about 70 in 100 of your peers.", "in"],
  [212.4, 5, "38 below the band, less than about 95 in 100 of your peers.", "under"],
  [300.3, 50, "1 above the band, in the middle of your peers.", "over"],
])('%d at place %i ends in "%s"', (ownValue, percentile, ending, tone) => {
  const sentence = placeSentence({ indicator, ownValue, cell, percentile, band });
  expect(sentenceText(sentence).endsWith(`: ${ending}`)).toBe(true);
  expect(sentence.parts.find((part) => part.tone)?.tone).toBe(tone);
});

test("the speed is named when all trucks work at one", () => {
  const text = sentenceText(placeSentence({ indicator, ownValue: 388, cell, percentile: 85, band, speedMph: 25 }));
  expect(text).toContain("at the working setting and 25 mph: 88 above");
});

test("without a place the median of the 8 towns takes its stead", () => {
  expect(sentenceText(placeSentence({ indicator, ownValue: 388, cell: few, percentile: null, band }))).toMatch(
    /: 88 above the band, about 68 above the median of the 8 towns\.$/,
  );
});

test("a figure without a band is set against the median and the place", () => {
  const text = sentenceText(
    placeSentence({ indicator: "salt-per-event", ownValue: 410.2, cell, percentile: 80, band: null }),
  );
  expect(text).toBe(
    "Your town laid 410 lb of salt on a lane mile in each event: about 90 above the median of the 65 towns, more than about 80 in 100 of your peers.",
  );
});

test("withheld peers are said with the reason, with and without a band", () => {
  expect(sentenceText(placeSentence({ indicator, ownValue: 388, cell: withheld, percentile: null, band }))).toBe(
    "Your salt trucks lay a median of 388 lb per lane mile at the working setting: 88 above the band. The figures of your peers are withheld: too few towns.",
  );
  expect(
    sentenceText(
      placeSentence({ indicator: "salt-per-event", ownValue: 388, cell: withheld, percentile: null, band: null }),
    ),
  ).toBe(
    "Your town laid 388 lb of salt on a lane mile in each event. The figures of your peers are withheld: too few towns.",
  );
});

test("a town without a figure is told so, and what its peers lay", () => {
  expect(sentenceText(placeSentence({ indicator, ownValue: null, cell, percentile: null, band }))).toBe(
    "This edition holds no rate of your salt trucks. Half of 65 towns lie between 270 and 380 lb per lane mile.",
  );
  expect(sentenceText(placeSentence({ indicator, ownValue: null, cell: few, percentile: null, band }))).toContain(
    "The median of 8 towns is about 320 lb per lane mile.",
  );
});

test("the wall says where half lie and what the band does there", () => {
  expect(sentenceText(wallSentence({ indicator, cell: wall, band }))).toBe(
    "Half of us lay between 270 and 380 lb of salt on a lane mile. The band ends at 300.",
  );
  expect(sentenceText(wallSentence({ indicator, cell: { ...wall, median: 230 }, band }))).toContain(
    "The band begins at 250.",
  );
  expect(sentenceText(wallSentence({ indicator, cell: { ...wall, median: 280 }, band }))).toContain("from 250 to 300.");
  expect(sentenceText(wallSentence({ indicator: "salt-per-event", cell: wall, band: null }))).toBe(
    "Half of us laid between 270 and 380 lb of salt on a lane mile in each event.",
  );
});

test("the wall without a middle half says the median, and a withheld board its reason", () => {
  expect(sentenceText(wallSentence({ indicator, cell: { ...wall, middleHalf: null }, band }))).toContain(
    "The middle one of us lays about 320 lb",
  );
  expect(sentenceText(wallSentence({ indicator, cell: { state: "withheld", reason: "too-close", axis }, band }))).toBe(
    "Nothing to show here: too close to another group.",
  );
});
