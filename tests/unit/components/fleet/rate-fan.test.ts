import { expect, test } from "vitest";
import { roundStep, spread } from "#app/components/charts/chart-parts.ts";
import { driftSvgs } from "#app/components/charts/drift-svg.server.ts";
import type { DriftSpec } from "#app/components/charts/drift-spec.ts";
import {
  fanGroups,
  fanTop,
  groupWords,
  type RateFanSpec,
  rateFanSentence,
} from "#app/components/charts/rate-fan-spec.ts";
import { rateFanSvgs } from "#app/components/charts/rate-fan-svg.server.ts";

/** Setting 2 lays 320 at 25, setting 3 and 4 turn alike. */
const spec: RateFanSpec = {
  rateUnit: "lb per lane mile",
  speedUnit: "mph",
  lines: [
    { setting: 1, rateAtOne: 4500, isAtHydraulicLimit: false },
    { setting: 2, rateAtOne: 8000, isAtHydraulicLimit: false },
    { setting: 3, rateAtOne: 12_000, isAtHydraulicLimit: false },
    { setting: 4, rateAtOne: 12_000, isAtHydraulicLimit: true },
  ],
  band: { low: 250, high: 300 },
  speeds: { from: 5, to: 45, step: 5 },
  working: { setting: 2, speed: 25 },
};

const drift: DriftSpec = {
  rateUnit: "lb per lane mile",
  points: [
    { testedOn: "2024-10-02", dayNumber: 0, rate: 340, plusMinus: 12, isOurs: false },
    { testedOn: "2025-10-09", dayNumber: 372, rate: 352, plusMinus: null, isOurs: false },
    { testedOn: "2026-10-13", dayNumber: 741, rate: 288, plusMinus: 10, isOurs: true },
  ],
  band: { low: 250, high: 300 },
};

function countOf(svg: string, pattern: RegExp) {
  return svg.match(pattern)?.length ?? 0;
}

test("settings that turn alike share a line and its name", () => {
  expect(fanGroups(spec).map(groupWords)).toEqual(["1", "2", "3–4"]);
  expect(fanGroups(spec).map(({ isWorking }) => isWorking)).toEqual([false, true, false]);
});

test("both drawings are one image with a line a group, one hatch, and no style of their own", () => {
  for (const svg of Object.values(rateFanSvgs(spec))) {
    expect(svg.startsWith("<svg")).toBe(true);
    expect(countOf(svg, /role="img"/g)).toBe(1);
    expect(countOf(svg, /<title>/g)).toBe(1);
    expect(countOf(svg, /<style|style=|aria-label=/g)).toBe(0);
    expect(countOf(svg, /NaN|undefined|Infinity/g)).toBe(0);
    expect(countOf(svg, /<pattern /g)).toBe(1);
    // A line for each group: paths with a stroke and no fill of their own.
    expect(countOf(svg, /<path[^>]*d="M[^"]*L[^"]*"/g)).toBe(3);
  }
  const { desk, phone } = rateFanSvgs(spec);
  const hatchIds = [desk, phone].map((svg) => /<pattern [^>]*id="([^"]+)"/.exec(svg)?.[1]);
  expect(new Set(hatchIds).size).toBe(2);
});

test("without a band there is no hatch, and no square marks a cell", () => {
  const { desk } = rateFanSvgs({ ...spec, band: null });
  expect(countOf(desk, /<pattern /g)).toBe(0);
  expect(desk).not.toContain("band 250–300");
});

test("the picture reaches over the band and the working point, and not to the walking speeds", () => {
  expect(fanTop(spec)).toBe(720);
  expect(fanTop({ ...spec, working: { setting: 3, speed: 15 } })).toBe(800 * 1.7);
  expect(fanTop({ ...spec, band: null, working: { setting: 9, speed: 25 } })).toBe(2400);
});

test("the sentence says where each setting lies at the working speed", () => {
  expect(rateFanSentence(spec)).toContain("At 25 mph: setting 1 180, under the band; setting 2 320, over the band");
  expect(rateFanSentence({ ...spec, band: null })).toContain("setting 2 320; setting 3–4 480 lb per lane mile.");
});

test("the history is drawn with a mark for each calibration and a bar where its ± is known", () => {
  for (const svg of Object.values(driftSvgs(drift))) {
    expect(countOf(svg, /<circle/g)).toBe(3);
    expect(countOf(svg, /<style|style=|NaN|Infinity/g)).toBe(0);
    expect(svg).toContain("from 340 to 288 lb per lane mile");
  }
});

test("labels that would touch are moved apart in their order, and none below the floor", () => {
  expect(spread([10, 12, 50], 15, 100)).toEqual([10, 25, 50]);
  const crowded = spread([96, 97, 98], 15, 100);
  expect(crowded).toEqual([70, 85, 100]);
});

test("axes go in round steps", () => {
  expect(roundStep(900, 5)).toBe(200);
  expect(roundStep(450, 5)).toBe(100);
  expect(roundStep(100, 4)).toBe(50);
});
