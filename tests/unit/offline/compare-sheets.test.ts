import fc from "fast-check";
import { expect, test } from "vitest";
import { type Choice, settledSheet, sheetDifferences } from "#app/offline/compare-sheets.ts";
import { aSheet } from "./sheets.ts";

const base = aSheet();
const never = () => {
  throw new Error("no new id is needed here");
};

test("a sheet does not differ from itself", () => {
  expect(sheetDifferences(base, aSheet(), null)).toEqual([]);
});

test("a catch that both corrected is undecided, and both may be kept", () => {
  const corrected = (grossLb: string) => ({
    catches: base.catches.map((one) => (one.id === "k1" ? { ...one, grossLb } : one)),
  });
  const [mine, theirs] = [aSheet(corrected("27.4")), aSheet(corrected("28"))];
  expect(sheetDifferences(mine, theirs, base)).toEqual([
    {
      key: "catches.k1",
      label: "Catch 1",
      mine: "2 turns, 27.4 lb gross, 2.2 lb pail",
      theirs: "2 turns, 28 lb gross, 2.2 lb pail",
      mayKeepBoth: true,
      proposed: null,
    },
  ]);
  const both = settledSheet(mine, theirs, { "catches.k1": "both" }, () => "k9");
  expect(both.catches.map(({ id, grossLb }) => [id, grossLb])).toEqual([
    ["k1", "27.4"],
    ["k9", "28"],
    ["k2", "26.2"],
    ["k3", "26.6"],
  ]);
});

test("what only one side changed is proposed from that side", () => {
  const theirs = aSheet({ gate: { scaleMark: "5", openingText: "2" } });
  expect(sheetDifferences(base, theirs, base)).toMatchObject([{ key: "gate", proposed: "theirs" }]);
  expect(sheetDifferences(theirs, base, base)).toMatchObject([{ key: "gate", proposed: "mine" }]);
});

test("two phones that counted the same setting under ids of their own meet as one count, which cannot stand twice", () => {
  const four = (id: string, revolutions: string) =>
    aSheet({ counts: [...base.counts, { id, setting: "4", revolutions, seconds: "60", rpm: "" }] });
  const [mine, theirs] = [four("mine", "20"), four("theirs", "20.5")];
  expect(sheetDifferences(mine, theirs, base)).toMatchObject([
    { key: "counts.mine", label: "Count at setting 4", mayKeepBoth: false, proposed: null },
  ]);
  expect(settledSheet(mine, theirs, { "counts.mine": "theirs" }, never).counts).toEqual(theirs.counts);
});

test("a reading that only one side has is kept, and left out only when somebody says so", () => {
  const extra = { id: "k4", revolutions: "2", grossLb: "27.1", tareLb: "2.2" };
  const theirs = aSheet({ catches: [...base.catches, extra] });
  const [difference] = sheetDifferences(base, theirs, base);
  expect(difference).toMatchObject({ key: "catches.k4", mine: null, proposed: "theirs" });
  expect(settledSheet(base, theirs, {}, never).catches).toContainEqual(extra);
  expect(settledSheet(base, theirs, { "catches.k4": "mine" }, never).catches).toEqual(base.catches);
});

test("whatever two phones added, settling as proposed keeps every reading of both exactly once", () => {
  const added = fc.uniqueArray(fc.integer({ min: 1, max: 999 }), { maxLength: 6 });
  fc.assert(
    fc.property(added, added, (ours, others) => {
      const rows = (numbers: readonly number[], side: string) =>
        numbers.map((number) => ({ id: `${side}${number}`, revolutions: "1", grossLb: String(number), tareLb: "" }));
      const mine = aSheet({ catches: [...base.catches, ...rows(ours, "a")] });
      const theirs = aSheet({ catches: [...base.catches, ...rows(others, "b")] });
      const proposed = sheetDifferences(mine, theirs, base).map(({ key, proposed: choice }): [string, Choice] => [
        key,
        choice ?? "both",
      ]);
      const settled = settledSheet(mine, theirs, Object.fromEntries(proposed), never);
      const ids = settled.catches.map(({ id }) => id);
      const expected = [...base.catches, ...rows(ours, "a"), ...rows(others, "b")].map(({ id }) => id);
      expect(ids.toSorted()).toEqual(expected.toSorted());
    }),
  );
});
