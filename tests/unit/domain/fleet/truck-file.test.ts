import fc from "fast-check";
import { expect, test } from "vitest";
import type { FileRow } from "#app/domain/file-problem.ts";
import { controlKinds, spreaderKinds } from "#app/domain/fleet/truck.ts";
import {
  type FileTruck,
  readTruckRows,
  truckFileColumns,
  truckFileRow,
  type TruckKnowledge,
} from "#app/domain/fleet/truck-file.ts";

const materials = [
  { id: 1, name: "Salt" },
  { id: 2, name: "Sand mix" },
];
const known: TruckKnowledge = {
  trucks: [{ id: 12, unitNumber: "12", isInService: true }],
  materials,
  maySetService: true,
};

const good = {
  truck: "12",
  body: "8-yard hopper",
  spreader: "hopper-auger",
  control: "manual",
  lanes_per_pass: "1",
  working_speed_mph: "25",
  working_setting: "3",
  working_rpm: "1,600",
  gate_max_in: "4 1/2",
  capacity_tons: "8.6",
  in_service: "yes",
  materials: "Salt; sand mix",
};

function rowOf(cells: Partial<Record<(typeof truckFileColumns)[number], string>>, row = 2): FileRow {
  return { row, cells: new Map(Object.entries({ ...good, ...cells })) };
}

test("a row with a known number changes that truck, and any other adds one", () => {
  const { staged, problems } = readTruckRows([rowOf({}), rowOf({ truck: "Truck 14" }, 3)], known);
  expect(problems).toEqual([]);
  expect(staged.map(({ truckId, unitNumber }) => [truckId, unitNumber])).toEqual([
    [12, "12"],
    [null, "14"],
  ]);
  expect(staged[0]).toMatchObject({ gateMaxIn: 4.5, workingRpm: 1600, materialIds: [1, 2], isInService: true });
});

test("what is not known may be left empty, and stays unknown", () => {
  const { staged, problems } = readTruckRows(
    [rowOf({ working_rpm: "", gate_max_in: "", capacity_tons: "", body: "", materials: "", in_service: "" })],
    known,
  );
  expect(problems).toEqual([]);
  expect(staged[0]).toMatchObject({ workingRpm: null, gateMaxIn: null, capacityTons: null, body: "", materialIds: [] });
  expect(staged[0]?.isInService).toBe(true);
});

test.each([
  ["truck", "", "blank"],
  ["truck", "x".repeat(21), "too-long"],
  ["body", "x".repeat(61), "too-long"],
  ["spreader", "catapult", "no-spreader"],
  ["control", "by hand", "no-control"],
  ["lanes_per_pass", "0", "too-small"],
  ["lanes_per_pass", "1.5", "not-whole"],
  ["working_speed_mph", "0", "too-small"],
  ["working_speed_mph", "-25", "too-small"],
  ["working_speed_mph", "12345678901234567890", "not-a-number"],
  ["working_setting", "three", "not-a-number"],
  ["working_rpm", "16", "too-small"],
  ["gate_max_in", "40", "not-a-gate"],
  ["gate_max_in", "wide", "not-a-gate"],
  ["capacity_tons", "8600", "absurd"],
  ["in_service", "perhaps", "not-yes-or-no"],
  ["materials", "Salt; Gravel", "unknown-material"],
] as const)("%s of %j is refused as %s, with its row and column", (column, text, code) => {
  const { staged, problems } = readTruckRows([rowOf({ [column]: text }, 7)], known);
  expect(staged).toEqual([]);
  expect(problems.map((problem) => [problem.row, problem.column, problem.code])).toContainEqual([7, column, code]);
});

test("a truck that stands in the file twice is refused", () => {
  const { problems } = readTruckRows([rowOf({}), rowOf({ truck: "truck 12" }, 3)], known);
  expect(problems.map(({ row, code }) => [row, code])).toEqual([[3, "truck-twice"]]);
});

test("only the director takes a truck out of service", () => {
  const out = rowOf({ in_service: "no" });
  expect(readTruckRows([out], known).problems).toEqual([]);
  const { problems } = readTruckRows([out], { ...known, maySetService: false });
  expect(problems.map(({ code }) => code)).toEqual(["directors-own"]);
  expect(readTruckRows([rowOf({})], { ...known, maySetService: false }).problems).toEqual([]);
});

const text = (maxLength: number) =>
  fc.string({ unit: "grapheme-ascii", maxLength }).map((typed) => typed.trim().replace(/^truck\s+/i, ""));
const truck: fc.Arbitrary<FileTruck> = fc.record({
  unitNumber: text(20).filter((unit) => unit !== "" && !unit.startsWith("'")),
  body: text(60).filter((body) => !body.startsWith("'")),
  spreaderKind: fc.constantFrom(...spreaderKinds),
  control: fc.constantFrom(...controlKinds),
  lanesPerPass: fc.integer({ min: 1, max: 4 }),
  workingSpeedMph: fc.integer({ min: 6, max: 120 }).map((half) => half / 2),
  workingSetting: fc.integer({ min: 1, max: 40 }),
  workingRpm: fc.option(fc.integer({ min: 400, max: 4000 })),
  gateMaxIn: fc.option(fc.integer({ min: 4, max: 384 }).map((sixteenths) => sixteenths / 16)),
  capacityTons: fc.option(fc.integer({ min: 1, max: 600 }).map((tenths) => tenths / 10)),
  isInService: fc.boolean(),
  materialNames: fc.subarray(["Salt", "Sand mix"]),
});

test("what is written out reads back as the same truck", () => {
  fc.assert(
    fc.property(truck, (written) => {
      const cells = truckFileRow(written).map((cell) => (cell === null ? "" : String(cell)));
      const fileRow = { row: 2, cells: new Map(truckFileColumns.map((column, place) => [column, cells[place] ?? ""])) };
      const { staged, problems } = readTruckRows([fileRow], { ...known, trucks: [] });
      expect(problems).toEqual([]);
      const { materialNames, ...facts } = written;
      const materialIds = materials.filter(({ name }) => materialNames.includes(name)).map(({ id }) => id);
      expect(staged).toEqual([{ ...facts, row: 2, truckId: null, materialIds }]);
    }),
  );
});

test("the apostrophe that guards a text from being read as a formula is taken off again", () => {
  const { staged } = readTruckRows([rowOf({ truck: "'-12", body: "'=new" })], known);
  expect(staged[0]).toMatchObject({ unitNumber: "-12", body: "=new" });
});
