import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { calibrationFileColumns } from "#app/domain/calibration/calibration-file.ts";
import type { FileProblem, FileRow } from "#app/domain/file-problem.ts";
import { truckFileColumns } from "#app/domain/fleet/truck-file.ts";
import { seasonFileColumns } from "#app/domain/season/season-file.ts";
import { readStockRow, stockFields, stockTemplate } from "#app/domain/season/stock-file.ts";
import { stormFields, stormTemplate } from "#app/domain/season/storm-fields.ts";
import { readStormRow } from "#app/domain/season/storm-file.ts";
import type { UploadField } from "#app/domain/upload/field.ts";
import type { UploadKind } from "#app/models/upload.server.ts";
import { checkCalibrations, checkSeasons, checkTrucks } from "./whole-files.server.ts";
import { spreadsheetErrors } from "./rows.server.ts";
import { calibrationFields, seasonFields, truckFields } from "./template-fields.ts";
import { stockKnowledge, stormKnowledge, townMaterials } from "./knowledge.server.ts";

/** What a row came to: what would be stored, or null while an error stands; and what is wrong or doubtful. */
export type RowOutcome = { staged: unknown; problems: FileProblem[] };

/** Reads rows that do not depend on each other. */
export type RowReader = (row: FileRow) => RowOutcome;

type Reading =
  | { by: "row"; reader: (actor: TownActor, transaction?: Transaction) => Promise<RowReader> }
  /** Rows that make sense only together; at most so many. */
  | {
      by: "file";
      mostRows: number;
      check: (actor: TownActor, rows: readonly FileRow[]) => Promise<Map<number, RowOutcome>>;
    }
  /** The public archive's own layout: no columns to match. */
  | { by: "station" };

export type Kind = {
  label: string;
  /** One row and many, in a sentence. */
  things: { one: string; many: string };
  /** Where what was accepted is seen. */
  home: { to: string; words: string };
  fields: (actor: TownActor) => Promise<readonly UploadField[]>;
  /** The heads of the file to fill in, and rows that show how. */
  template: (actor: TownActor) => Promise<{ heads: readonly string[]; example: readonly (readonly string[])[] }>;
  reading: Reading;
  /** Whether the rest makes sense without the rows that have errors. */
  canLeaveOut: boolean;
  /** Whether a later file of the same days takes the place of an earlier one. */
  isReplacing: boolean;
};

/** A cell that holds an error is told as that, and not as what its text fails to be. */
function whole(read: RowReader): RowReader {
  return (row) => {
    const errors = spreadsheetErrors(row);
    if (errors.length === 0) return read(row);
    const inError = new Set(errors.map(({ column }) => column));
    const others = read(row).problems.filter(({ column }) => !inError.has(column));
    return { staged: null, problems: [...errors, ...others] };
  };
}

async function stormReader(actor: TownActor, transaction?: Transaction): Promise<RowReader> {
  const known = await stormKnowledge(actor, transaction);
  return whole((row) => readStormRow(row, known));
}

async function stockReader(actor: TownActor, transaction?: Transaction): Promise<RowReader> {
  const known = await stockKnowledge(actor, transaction);
  return whole((row) => readStockRow(row, known));
}

async function stormExample(actor: TownActor) {
  const materials = await townMaterials(actor);
  const heads = stormTemplate(materials);
  const shown: Record<string, string> = {
    start_date: "2026-01-05",
    start_time: "04:30",
    end_date: "2026-01-05",
    end_time: "11:00",
    kind: "snow",
    pavement_temp_f: "27",
    passes: "2",
    lane_miles: "24",
    hours: "6.5",
    truck: "12",
    route: "North hill",
    note: "",
  };
  const [first] = materials;
  const amountHead = first
    ? heads.find((head) => head.startsWith(first.name.toLowerCase().split(" ")[0] ?? ""))
    : undefined;
  const row = heads.map((head) => shown[head] ?? (head === amountHead ? "5.5" : ""));
  return { heads, example: [row] };
}

/** The kinds of file that are taken, each with its columns and its checks. */
export const uploadKinds: Record<UploadKind, Kind> = {
  storms: {
    label: "Storm log",
    things: { one: "line of the storm log", many: "lines of the storm log" },
    home: { to: "/season", words: "Open the season" },
    fields: async (actor) => stormFields(await townMaterials(actor)),
    template: stormExample,
    reading: { by: "row", reader: stormReader },
    canLeaveOut: true,
    isReplacing: true,
  },
  stock: {
    label: "Stock",
    things: { one: "stock entry", many: "stock entries" },
    home: { to: "/season", words: "Open the season" },
    fields: async () => stockFields,
    template: async () => ({
      heads: stockTemplate,
      example: [
        ["2025-10-01", "opening", "Salt", "420", "", "measured by tape"],
        ["2025-11-14", "delivery", "Salt", "210.5", "15997", "pit on the county road"],
      ],
    }),
    reading: { by: "row", reader: stockReader },
    canLeaveOut: true,
    isReplacing: true,
  },
  "season-figures": {
    label: "Season figures",
    things: { one: "season", many: "seasons" },
    home: { to: "/season", words: "Open the season" },
    fields: async () => seasonFields,
    template: async () => ({
      heads: seasonFileColumns,
      example: [["2025-26", "118", "24", "1890.5", "0", "", "240", "", "131400"]],
    }),
    reading: { by: "file", mostRows: 5_000, check: checkSeasons },
    canLeaveOut: true,
    isReplacing: false,
  },
  calibrations: {
    label: "Calibrations",
    things: { one: "calibration", many: "calibrations" },
    home: { to: "/fleet", words: "Open the fleet" },
    fields: async () => calibrationFields,
    template: async () => ({
      heads: calibrationFileColumns,
      example: [
        ["12", "Salt", "2026-10-09", "1 7/8", "count", "1", "11.25", "60", "", ""],
        ["12", "Salt", "2026-10-09", "1 7/8", "count", "2", "19.5", "60", "", ""],
        ["12", "Salt", "2026-10-09", "1 7/8", "catch", "", "1", "", "9.4", "1.6"],
      ],
    }),
    reading: { by: "file", mostRows: 20_000, check: checkCalibrations },
    // Without one of its readings a calibration would be another one.
    canLeaveOut: false,
    isReplacing: false,
  },
  trucks: {
    label: "Trucks",
    things: { one: "truck", many: "trucks" },
    home: { to: "/fleet", words: "Open the fleet" },
    fields: async () => truckFields,
    template: async () => ({
      heads: truckFileColumns,
      example: [
        [
          "12",
          "8-yard hopper",
          "hopper-auger",
          "manual",
          "1",
          "25",
          "3",
          "1600",
          "4 1/2",
          "8.6",
          "yes",
          "Salt; Sand mix",
        ],
        ["14", "10-yard chain body", "conveyor", "ground-speed", "1", "25", "4", "", "", "", "yes", "Salt"],
      ],
    }),
    reading: { by: "file", mostRows: 2_000, check: checkTrucks },
    canLeaveOut: true,
    isReplacing: false,
  },
  weather: {
    label: "Daily weather",
    things: { one: "day", many: "days" },
    home: { to: "/season", words: "Open the season" },
    fields: async () => [],
    template: async () => ({
      heads: [
        "STATION",
        "DATE",
        "TMAX",
        "TMAX_ATTRIBUTES",
        "TMIN",
        "TMIN_ATTRIBUTES",
        "SNOW",
        "SNOW_ATTRIBUTES",
        "SNWD",
        "SNWD_ATTRIBUTES",
        "PRCP",
        "PRCP_ATTRIBUTES",
      ],
      example: [
        [
          "USC00000001",
          "2026-01-15",
          "-22",
          ",,0,0700",
          "-100",
          ",,0,0700",
          "51",
          ",,0,0700",
          "102",
          ",,0,0700",
          "64",
          ",,0,0700",
        ],
      ],
    }),
    reading: { by: "station" },
    canLeaveOut: true,
    isReplacing: false,
  },
};

/** Whether a text names a kind of file. */
export function isUploadKind(text: unknown): text is UploadKind {
  return typeof text === "string" && Object.hasOwn(uploadKinds, text);
}
