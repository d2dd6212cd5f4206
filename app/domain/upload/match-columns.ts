import type { UploadField } from "./field.ts";
import { dimensionOf, type MeasureUnit, unitNamed } from "./measure.ts";

/** What a column of a file is taken for. */
export type ColumnMatch = {
  /** Its place in the file, from 0. */
  index: number;
  /** Its head as the file writes it. */
  head: string;
  /** The field it fills, or null when it is not used. */
  field: string | null;
  unit: MeasureUnit | null;
  /** False when somebody should look at it before the file is read. */
  isCertain: boolean;
};

/** What the town said of a head in an earlier file. */
export type RememberedColumn = { head: string; field: string | null; unit: MeasureUnit | null };

/**
 * A head without case, marks and runs of blanks, so that "Salt_Tons " and "salt tons" are the same.
 *
 * @example plainHead(" Salt (Tons) ") // "salt tons"
 */
export function plainHead(head: string): string {
  return head
    .normalize("NFKC")
    .replace(/[\u200b-\u200f\u202a-\u202e\u2060\ufeff]/g, "")
    .toLowerCase()
    .replace(/[^\p{L}\p{N}°"]+/gu, " ")
    .trim();
}

/** The head without its unit, wherever in it the unit stands. */
function splitHead(plain: string): { base: string; unit: MeasureUnit | null } {
  const words = plain.split(" ");
  for (const length of [2, 1]) {
    for (let start = words.length - length; start >= 0; start--) {
      const unit = unitNamed(words.slice(start, start + length).join(" "));
      if (unit === null || words.length === length) continue;
      const base = words.filter((_, place) => place < start || place >= start + length).join(" ");
      return { base: base.replace(/^(?:in|of) | (?:in|of)$/g, ""), unit };
    }
  }
  return { base: plain, unit: null };
}

function fits(field: UploadField, unit: MeasureUnit | null) {
  return unit === null || (field.dimensions?.includes(dimensionOf(unit)) ?? false);
}

type Candidate = { field: UploadField; unit: MeasureUnit | null; score: number };

/** How well a head names a field: 3 its very name, 2 its name and a unit, 1 its name among other words. */
function candidatesFor(plain: string, fields: readonly UploadField[]): Candidate[] {
  const { base, unit } = splitHead(plain);
  return fields.flatMap((field): Candidate[] => {
    if (field.names.includes(plain)) return [{ field, unit: null, score: 3 }];
    if (field.names.includes(base) && fits(field, unit)) return [{ field, unit, score: 2 }];
    const words = ` ${base} `;
    const longest = Math.max(
      0,
      ...field.names.filter((name) => words.includes(` ${name} `)).map((name) => name.length),
    );
    return longest > 0 && fits(field, unit) ? [{ field, unit, score: longest / 100 }] : [];
  });
}

/**
 * What each column seems to hold: what the town said of the same head before, else the field whose name the head bears.
 * A field is given to one column only, to the one that names it best.
 *
 * @param heads - of the file, in its order
 * @param fields - of the kind of file
 * @param remembered - what was said of heads in earlier files
 * @example proposeColumns(["Salt (tons)"], fields, [])[0] // { index: 0, field: "used:1", unit: "ton", isCertain: true, … }
 */
export function proposeColumns(
  heads: readonly string[],
  fields: readonly UploadField[],
  remembered: readonly RememberedColumn[],
): ColumnMatch[] {
  const known = new Map(remembered.map((column) => [column.head, column]));
  const plains = heads.map(plainHead);
  const matches: ColumnMatch[] = heads.map((head, index) => {
    const isNamed = plains[index] !== "";
    return { index, head, field: null, unit: null, isCertain: !isNamed };
  });
  const taken = new Set<string>();
  const settled = new Set<number>();
  const settle = (index: number, field: string | null, unit: MeasureUnit | null, isCertain: boolean) => {
    const match = matches[index];
    if (!match) return;
    matches[index] = { ...match, field, unit, isCertain };
    settled.add(index);
    if (field !== null) taken.add(field);
  };
  plains.forEach((plain, index) => {
    const before = known.get(plain);
    if (!before || (before.field !== null && taken.has(before.field))) return;
    if (before.field === null || fields.some(({ key }) => key === before.field)) {
      settle(index, before.field, before.unit, true);
    }
  });
  const candidates = plains
    .flatMap((plain, index) => candidatesFor(plain, fields).map((candidate) => ({ ...candidate, index })))
    .sort((a, b) => b.score - a.score || a.index - b.index);
  for (const { index, field, unit, score } of candidates) {
    if (settled.has(index) || taken.has(field.key)) continue;
    const isUnitKnown = unit !== null || field.unit === undefined || field.names[0] === plains[index];
    settle(index, field.key, unit ?? field.unit ?? null, score >= 2 && isUnitKnown);
  }
  return matches;
}

/**
 * Which of the first rows holds the heads: the one that names most fields; the first that is not blank when none does.
 *
 * @param rows - the first rows of the file, cells as text
 * @returns its place in `rows`, from 0; -1 when all are blank
 */
export function headRowOf(
  rows: readonly (readonly string[])[],
  fields: readonly UploadField[],
  remembered: readonly RememberedColumn[],
): number {
  let best = { place: -1, named: -1 };
  rows.forEach((cells, place) => {
    if (cells.every((cell) => cell.trim() === "")) return;
    // A row of data may hold one word that is also a head; two or more make a row of heads.
    const named = new Set(
      proposeColumns(cells, fields, remembered).flatMap(({ field, isCertain }) =>
        field !== null && isCertain ? [field] : [],
      ),
    ).size;
    const weight = named >= 2 || fields.length === 1 ? named : 0;
    if (best.place === -1 || weight > best.named) best = { place, named: weight };
  });
  return best.place;
}
