import { type MaterialKind, materialKinds } from "#app/domain/calibration/band.ts";
import { cellNumber } from "#app/domain/cell-number.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";

export const materialKindWords: Record<MaterialKind, string> = {
  salt: "straight salt",
  mix: "sand and salt mixed",
  sand: "sand or grit",
  brine: "brine",
};

type Values = Readonly<Record<string, string>>;
type Refused = { ok: false; errors: Record<string, string> };

function reader(values: Values) {
  const problems: FileProblem[] = [];
  const row = { row: 0, cells: new Map(Object.entries(values)) };
  const read = (name: string, limits: Parameters<typeof cellNumber>[2]) => cellNumber(row, name, limits, problems);
  return { problems, read };
}

const saltPercentLimits = { what: "salt in it, percent", min: 0, max: 100 };

/** A material to add, out of the form's texts; or what is wrong by field. */
export function readNewMaterial(
  values: Values,
): { ok: true; material: { name: string; kind: MaterialKind; saltShare: number } } | Refused {
  const { problems, read } = reader(values);
  const saltPercent = read("saltPercent", saltPercentLimits);
  const errors = Object.fromEntries(problems.map(({ column, message }) => [column ?? "", message]));
  const name = (values.name ?? "").replace(/\s+/g, " ").trim();
  if (name === "" || name.length > 60) errors.name = "Give it a name of at most 60 letters.";
  const kind = materialKinds.find((each) => each === values.kind);
  if (kind === undefined) errors.kind = "Choose a kind.";
  if (Object.keys(errors).length > 0 || saltPercent === null || kind === undefined) return { ok: false, errors };
  return { ok: true, material: { name, kind, saltShare: saltPercent / 100 } };
}

/** A change of salt share and price, out of the form's texts; or what is wrong, by the ids of that material's fields. */
export function readMaterialChange(
  values: Values,
  materialId: number,
): { ok: true; change: { saltShare: number; centsPerTon: number | null } } | Refused {
  const { problems, read } = reader(values);
  const saltPercent = read("saltPercent", saltPercentLimits);
  const usdPerTon = read("usdPerTon", { what: "price of a ton", min: 0, max: 5000, mayBeBlank: true });
  const ids: Record<string, string> = { saltPercent: `salt-${materialId}`, usdPerTon: `price-${materialId}` };
  const errors = Object.fromEntries(problems.map(({ column, message }) => [ids[column ?? ""] ?? "", message]));
  if (problems.length > 0 || saltPercent === null) return { ok: false, errors };
  const centsPerTon = usdPerTon === null ? null : Math.round(usdPerTon * 100);
  return { ok: true, change: { saltShare: saltPercent / 100, centsPerTon } };
}
