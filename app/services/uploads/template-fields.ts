import type { UploadField } from "#app/domain/upload/field.ts";

/** Columns of a file of season figures. Every column is needed; a blank cell may mean "not reported". */
export const seasonFields: readonly UploadField[] = [
  { key: "season", label: "season", names: ["season", "winter", "year"], holds: "text", need: "always" },
  {
    key: "lane_miles",
    label: "lane miles",
    names: ["lane miles", "lane mi", "lane km"],
    holds: "figure",
    dimensions: ["distance"],
    unit: "mile",
    need: "always",
  },
  {
    key: "events",
    label: "events",
    names: ["events", "number of events", "storms", "number of storms"],
    holds: "figure",
    need: "always",
  },
  {
    key: "salt_tons",
    label: "salt used",
    names: ["salt tons", "salt", "salt used", "rock salt"],
    holds: "figure",
    dimensions: ["weight"],
    unit: "ton",
    need: "always",
  },
  {
    key: "mix_tons",
    label: "sand and salt mix used",
    names: ["mix tons", "mix", "mix used", "sand salt mix", "sand and salt mix", "salt sand mix"],
    holds: "figure",
    dimensions: ["weight"],
    unit: "ton",
    need: "always",
  },
  {
    key: "mix_salt_percent",
    label: "salt in the mix, percent",
    names: ["mix salt percent", "salt in mix", "percent salt in mix", "salt percent"],
    holds: "figure",
    need: "always",
  },
  {
    key: "sand_tons",
    label: "sand and grit used",
    names: ["sand tons", "sand", "sand used", "grit", "abrasives"],
    holds: "figure",
    dimensions: ["weight"],
    unit: "ton",
    need: "always",
  },
  {
    key: "brine_gal",
    label: "brine used",
    names: ["brine gal", "brine", "brine used", "liquid"],
    holds: "figure",
    dimensions: ["liquid"],
    unit: "gal",
    need: "always",
  },
  {
    key: "material_cost_usd",
    label: "material cost, dollars",
    names: ["material cost usd", "material cost", "cost", "total cost"],
    holds: "figure",
    need: "always",
  },
];

/** Columns of a file of calibrations, one reading a row. */
export const calibrationFields: readonly UploadField[] = [
  { key: "truck", label: "truck", names: ["truck", "unit", "truck number", "truck no"], holds: "text", need: "always" },
  { key: "material", label: "material", names: ["material", "product"], holds: "text", need: "always" },
  {
    key: "tested_on",
    label: "day weighed",
    names: ["tested on", "date", "day", "test date"],
    holds: "day",
    need: "always",
  },
  {
    key: "gate_opening_in",
    label: "gate opening, inches",
    names: ["gate opening in", "gate opening", "gate", "opening"],
    // Fractions are read here, which only inches have.
    holds: "text",
    need: "always",
  },
  { key: "reading", label: "count or catch", names: ["reading", "kind of reading"], holds: "text", need: "always" },
  { key: "setting", label: "feed setting", names: ["setting", "feed setting"], holds: "figure", need: "always" },
  {
    key: "revolutions",
    label: "revolutions",
    names: ["revolutions", "turns", "revs"],
    holds: "figure",
    need: "always",
  },
  { key: "seconds", label: "seconds counted", names: ["seconds", "time seconds"], holds: "figure", need: "always" },
  {
    key: "gross_lb",
    label: "gross weight",
    names: ["gross lb", "gross", "gross weight"],
    holds: "figure",
    dimensions: ["weight"],
    unit: "lb",
    need: "always",
  },
  {
    key: "tare_lb",
    label: "tare weight",
    names: ["tare lb", "tare", "tare weight"],
    holds: "figure",
    dimensions: ["weight"],
    unit: "lb",
    need: "always",
  },
];

/** Columns of a file of trucks, one truck a row. Blank cells of what is not known are fine, missing columns are not. */
export const truckFields: readonly UploadField[] = [
  {
    key: "truck",
    label: "truck",
    names: ["truck", "unit", "unit number", "truck number"],
    holds: "text",
    need: "always",
  },
  { key: "body", label: "body", names: ["body"], holds: "text", need: "always" },
  { key: "spreader", label: "spreader", names: ["spreader", "spreader kind"], holds: "text", need: "always" },
  { key: "control", label: "control", names: ["control"], holds: "text", need: "always" },
  { key: "lanes_per_pass", label: "lanes per pass", names: ["lanes per pass"], holds: "figure", need: "always" },
  {
    key: "working_speed_mph",
    label: "working speed, mph",
    names: ["working speed mph"],
    holds: "figure",
    need: "always",
  },
  { key: "working_setting", label: "working setting", names: ["working setting"], holds: "figure", need: "always" },
  { key: "working_rpm", label: "working rpm", names: ["working rpm"], holds: "figure", need: "always" },
  // Fractions are read here, which only inches have.
  { key: "gate_max_in", label: "widest gate, inches", names: ["gate max in"], holds: "text", need: "always" },
  { key: "capacity_tons", label: "load, tons", names: ["capacity tons"], holds: "figure", need: "always" },
  { key: "in_service", label: "in service", names: ["in service"], holds: "text", need: "always" },
  { key: "materials", label: "materials", names: ["materials"], holds: "text", need: "always" },
];
