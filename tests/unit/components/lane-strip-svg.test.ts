import { expect, test } from "vitest";
import { laneStripSvg } from "#app/components/charts/lane-strip-svg.server.ts";
import type { LaneStripSpec, StripSize } from "#app/components/charts/lane-strip-spec.ts";
import { fewTowns, manyTowns, nineTowns, sixTowns } from "./strips.ts";

const sizes: readonly StripSize[] = ["desk", "phone", "wall"];
const everyStrip: readonly LaneStripSpec[] = [fewTowns, sixTowns, nineTowns, manyTowns];

function countOf(svg: string, pattern: RegExp) {
  return svg.match(pattern)?.length ?? 0;
}

/** Grains are the only circles with a rim; the foot of the stake has none of its own. */
function grainCount(svg: string) {
  const heaps = /<g [^>]*fill="var\(--color-lane-paint\)"[^>]*>((?:<circle[^>]*>(?:<\/circle>)?)+)<\/g>/.exec(svg);
  return countOf(heaps?.[1] ?? "", /<circle/g);
}

test("every strip at every size is one image with one title and no style of its own", () => {
  for (const spec of everyStrip) {
    for (const size of sizes) {
      const svg = laneStripSvg(spec, size);
      expect(svg.startsWith("<svg")).toBe(true);
      expect(countOf(svg, /role="img"/g)).toBe(1);
      expect(countOf(svg, /<title>/g)).toBe(1);
      expect(countOf(svg, /<style|style=|aria-label=/g)).toBe(0);
      expect(countOf(svg, /NaN|undefined|Infinity/g)).toBe(0);
    }
  }
});

test("there are as many grains as towns", () => {
  expect(grainCount(laneStripSvg(manyTowns, "desk"))).toBe(36);
  expect(grainCount(laneStripSvg(manyTowns, "phone"))).toBe(36);
  expect(grainCount(laneStripSvg(sixTowns, "desk"))).toBe(0);
  expect(grainCount(laneStripSvg(manyTowns, "wall"))).toBe(0);
});

test("only a strip with a band has a hatch", () => {
  expect(countOf(laneStripSvg(manyTowns, "desk"), /<pattern /g)).toBe(1);
  expect(countOf(laneStripSvg({ ...manyTowns, band: null }, "desk"), /<pattern |data-part="hatch"/g)).toBe(0);
});

test("hatches of different strips and sizes on one page do not share a name", () => {
  const names = everyStrip.flatMap((spec) =>
    sizes.map((size) => /<pattern[^>]* id="([^"]+)"/.exec(laneStripSvg(spec, size))?.[1]),
  );
  expect(names).not.toContain(undefined);
  expect(new Set(names).size).toBe(everyStrip.length * sizes.length);
});

test("the wall's drawing holds nothing of ours", () => {
  const svg = laneStripSvg(manyTowns, "wall");
  expect(svg).not.toContain("388");
  expect(svg).not.toContain("85th");
  expect(svg).not.toContain('data-part="flag"');
});

test("the same strip is drawn the same, from the kept drawings or anew", () => {
  const first = laneStripSvg(manyTowns, "desk");
  for (let i = 0; i < 201; i += 1) laneStripSvg({ ...sixTowns, townCountWords: `${i} towns` }, "phone");
  expect(laneStripSvg(structuredClone(manyTowns), "desk")).toBe(first);
});

test("words given to a strip are written as words, never as markup", () => {
  const svg = laneStripSvg({ ...manyTowns, own: { value: 388, label: "<b>388</b>", note: "a & b" } }, "desk");
  expect(svg).not.toContain("<b>");
  expect(svg).toContain("&lt;b&gt;388&lt;/b&gt;");
});
