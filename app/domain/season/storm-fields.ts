import type { UploadField } from "../upload/field.ts";
import { plainHead } from "../upload/match-columns.ts";

export type SpreadMaterial = { id: number; name: string; kind: "salt" | "mix" | "sand" | "brine" };

/** How a cell under a material's own column is keyed. @example usedKey(7) // "used:7" */
export function usedKey(materialId: number): string {
  return `used:${materialId}`;
}

const amount = { oneOf: "material used" };

const fixedFields: readonly UploadField[] = [
  {
    key: "started_on",
    label: "start day",
    names: [
      "start date",
      "date",
      "storm date",
      "day",
      "start day",
      "start",
      "started",
      "begin",
      "begin date",
      "storm start",
      "date time",
      "from date",
    ],
    holds: "day",
    need: "always",
  },
  {
    key: "start_time",
    label: "start time",
    names: ["start time", "time", "time in", "time started", "begin time", "from", "time start", "time out of yard"],
    holds: "time",
  },
  {
    key: "ended_on",
    label: "end day",
    names: ["end date", "end", "end day", "ended", "storm end", "finish", "finish date", "to date"],
    holds: "day",
  },
  {
    key: "end_time",
    label: "end time",
    names: ["end time", "time out", "to", "finish time", "time ended", "time end"],
    holds: "time",
  },
  {
    key: "kind",
    label: "kind of storm",
    names: [
      "kind",
      "type",
      "storm type",
      "event",
      "event type",
      "storm",
      "precipitation",
      "precip",
      "precip type",
      "weather",
      "kind of storm",
    ],
    holds: "text",
  },
  {
    key: "pavement_temp_f",
    label: "pavement temperature",
    names: [
      "pavement temp",
      "pavement temperature",
      "road temp",
      "road temperature",
      "surface temp",
      "surface temperature",
      "pvmt temp",
      "temp",
      "temperature",
    ],
    holds: "figure",
    dimensions: ["temperature"],
    unit: "degF",
  },
  {
    key: "passes",
    label: "passes",
    names: ["passes", "number of passes", "no of passes", "rounds", "trips", "times treated"],
    holds: "figure",
  },
  {
    key: "lane_miles",
    label: "lane miles treated",
    names: ["lane miles", "lane miles treated", "ln mi", "lane mi", "miles treated", "lane km", "miles"],
    holds: "figure",
    dimensions: ["distance"],
    unit: "mile",
  },
  {
    key: "hours",
    label: "hours",
    names: ["hours", "hrs", "labor hours", "truck hours", "total hours", "man hours", "hours worked"],
    holds: "figure",
  },
  {
    key: "truck",
    label: "truck",
    names: [
      "truck",
      "unit",
      "truck no",
      "truck number",
      "truck id",
      "unit no",
      "unit number",
      "vehicle",
      "vehicle no",
      "plow",
      "plow truck",
      "equipment",
    ],
    holds: "text",
  },
  {
    key: "route",
    label: "route",
    names: ["route", "run", "beat", "section", "plow route", "route no", "route number", "road"],
    holds: "text",
  },
  {
    key: "material",
    label: "material",
    names: ["material", "product", "material used", "product used", "type of material", "material type"],
    holds: "text",
  },
  {
    key: "quantity",
    label: "quantity used",
    names: [
      "quantity",
      "amount",
      "used",
      "amount used",
      "quantity used",
      "material amount",
      "qty",
      "tons",
      "tons used",
      "loads",
      "applied",
      "spread",
    ],
    holds: "figure",
    dimensions: ["weight", "liquid"],
    unit: "ton",
    need: amount,
  },
  {
    key: "unit",
    label: "unit of the quantity",
    names: ["unit of measure", "uom", "units", "quantity unit", "measure"],
    holds: "text",
  },
  {
    key: "town",
    label: "town",
    names: ["town", "municipality", "agency", "city", "village", "township"],
    holds: "text",
  },
  {
    key: "note",
    label: "note",
    names: ["note", "notes", "remarks", "comment", "comments", "remark"],
    holds: "text",
  },
];

function materialField(material: SpreadMaterial, materials: readonly SpreadMaterial[]): UploadField {
  const isLiquid = material.kind === "brine";
  const name = plainHead(material.name);
  const isOnlyOne = materials.filter(({ kind }) => kind === material.kind).length === 1;
  const bases = isOnlyOne ? [...new Set([name, material.kind])] : [name];
  const unit = isLiquid ? "gal" : "ton";
  return {
    key: usedKey(material.id),
    label: `${material.name} used`,
    names: [
      `${name} ${isLiquid ? "gal" : "tons"}`,
      ...bases.flatMap((base) => [base, `${base} used`, `${base} spread`, `${base} applied`, `used ${base}`]),
    ],
    holds: "figure",
    dimensions: isLiquid ? ["liquid"] : ["weight"],
    unit,
    need: amount,
  };
}

/** What a storm log of this town may say; its materials may each have a column of their own. */
export function stormFields(materials: readonly SpreadMaterial[]): UploadField[] {
  const own = materials.map((material) => materialField(material, materials));
  const place = fixedFields.findIndex(({ key }) => key === "material");
  return [...fixedFields.slice(0, place), ...own, ...fixedFields.slice(place)];
}

/** The heads of a template: a column for each of the town's materials, none for what those make needless. */
export function stormTemplate(materials: readonly SpreadMaterial[]): string[] {
  const needless = materials.length > 0 ? ["material", "quantity", "unit", "town"] : ["unit", "town"];
  return stormFields(materials)
    .filter(({ key }) => !needless.includes(key))
    .map(({ key, names }) => (key === "pavement_temp_f" ? "pavement_temp_f" : (names[0] ?? key).replaceAll(" ", "_")));
}
