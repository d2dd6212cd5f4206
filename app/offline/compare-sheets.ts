import type { Worksheet } from "#app/domain/calibration/worksheet.ts";

const listNames = ["counts", "catches", "timedCatches", "verification", "liquids"] as const;
type ListName = (typeof listNames)[number];
type ReadingRow = { id: string } & Record<string, string>;

const listWords: Record<ListName, string> = {
  counts: "Count",
  catches: "Catch",
  timedCatches: "Timed catch",
  verification: "Ground speed",
  liquids: "Liquid",
};
const figureWords: Record<string, string> = {
  setting: "setting",
  revolutions: "turns",
  seconds: "s",
  rpm: "rpm",
  grossLb: "lb gross",
  tareLb: "lb pail",
  speedMph: "mph",
  commandedLbPerLaneMile: "lb per lane mile commanded",
  gallons: "gal",
  lanes: "lanes",
  dryLbPerMin: "lb/min dry",
  kind: "",
};

export type Choice = "mine" | "theirs" | "both";

/** One thing in which two versions of a worksheet differ. A side is null when that version does not have it. */
export type Difference = {
  key: string;
  label: string;
  mine: string | null;
  theirs: string | null;
  /** Two readings of one kind may both stand; two gate openings or two counts of one setting may not. */
  mayKeepBoth: boolean;
  /** What only one side has changed since they were the same; null when a person has to say. */
  proposed: Choice | null;
};

const fields = {
  testedOn: { label: "Day of the test", read: (sheet: Worksheet) => sheet.testedOn },
  gate: {
    label: "Gate",
    read: ({ gate }: Worksheet) =>
      `${gate.openingText || "not measured"} in, scale mark ${gate.scaleMark === "" ? "–" : gate.scaleMark}`,
  },
  method: {
    label: "Method",
    read: ({ method }: Worksheet) => (method === "counts" ? "turns counted" : "caught by time"),
  },
  note: { label: "Note", read: ({ note }: Worksheet) => (note === "" ? "none" : note) },
} as const;
type FieldName = keyof typeof fields;
const fieldNames: readonly FieldName[] = ["testedOn", "gate", "method", "note"];

function rowsOf(sheet: Worksheet, list: ListName): readonly ReadingRow[] {
  return sheet[list];
}

function words(row: ReadingRow) {
  const parts = Object.entries(row).flatMap(([name, text]) =>
    name === "id" || text === "" ? [] : [`${text} ${figureWords[name] ?? ""}`.trim()],
  );
  return parts.length === 0 ? "empty" : parts.join(", ");
}

function isSame(a: ReadingRow | null, b: ReadingRow | null) {
  return JSON.stringify(a) === JSON.stringify(b);
}

/** The same reading in another version: by its id, and a count by its setting, since a setting is counted once. */
function counterpart<Row extends ReadingRow>(list: ListName, row: Row, others: readonly Row[]): Row | null {
  const byId = others.find(({ id }) => id === row.id);
  if (byId || list !== "counts") return byId ?? null;
  const setting = row.setting?.trim() ?? "";
  return others.find((other) => setting !== "" && other.setting?.trim() === setting) ?? null;
}

type Pair<Row> = { list: ListName; key: string; mine: Row | null; theirs: Row | null };

function pairRows<Row extends ReadingRow>(list: ListName, mine: readonly Row[], theirs: readonly Row[]): Pair<Row>[] {
  const met = new Set<string>();
  const own = mine.map((row) => {
    const other = counterpart(list, row, theirs);
    if (other) met.add(other.id);
    return { list, key: `${list}.${row.id}`, mine: row, theirs: other };
  });
  const rest = theirs
    .filter(({ id }) => !met.has(id))
    .map((row) => ({ list, key: `${list}.${row.id}`, mine: null, theirs: row }));
  return [...own, ...rest];
}

function propose(mine: unknown, theirs: unknown, base: unknown): Choice | null {
  const [ours, others, before] = [JSON.stringify(mine), JSON.stringify(theirs), JSON.stringify(base)];
  if (ours === before) return "theirs";
  return others === before ? "mine" : null;
}

/**
 * What two versions of a worksheet differ in, reading by reading.
 *
 * @param base - the version both grew from; null when it is not known, then a person decides everything that both have
 * @returns empty when they say the same. A reading that only one side has is proposed to be kept, so that nothing is lost
 */
export function sheetDifferences(mine: Worksheet, theirs: Worksheet, base: Worksheet | null): Difference[] {
  const heads = fieldNames.flatMap((name) => {
    if (JSON.stringify(mine[name]) === JSON.stringify(theirs[name])) return [];
    const { label, read } = fields[name];
    const proposed = base === null ? null : propose(mine[name], theirs[name], base[name]);
    return [{ key: name, label, mine: read(mine), theirs: read(theirs), mayKeepBoth: false, proposed }];
  });
  const pairs = listNames.flatMap((list) => pairRows(list, rowsOf(mine, list), rowsOf(theirs, list)));
  const readings = pairs.flatMap((pair) => {
    if (isSame(pair.mine, pair.theirs)) return [];
    const row = pair.mine ?? pair.theirs;
    const side = rowsOf(pair.mine ? mine : theirs, pair.list);
    const number = side.findIndex(({ id }) => id === row?.id) + 1;
    const place = pair.list === "counts" ? ` at setting ${row?.setting ?? ""}` : ` ${number}`;
    const before = base && row ? counterpart(pair.list, row, rowsOf(base, pair.list)) : null;
    const hasBoth = pair.mine !== null && pair.theirs !== null;
    const oneSided: Choice = pair.mine === null ? "theirs" : "mine";
    return [
      {
        key: pair.key,
        label: `${listWords[pair.list]}${place}`,
        mine: pair.mine && words(pair.mine),
        theirs: pair.theirs && words(pair.theirs),
        mayKeepBoth: hasBoth && pair.list !== "counts",
        proposed: hasBoth ? (base === null ? null : propose(pair.mine, pair.theirs, before)) : oneSided,
      },
    ];
  });
  return [...heads, ...readings];
}

type Choices = Readonly<Record<string, Choice>>;

function chosenRows<Row extends ReadingRow>(pairs: readonly Pair<Row>[], choices: Choices, newId: () => string): Row[] {
  return pairs.flatMap(({ key, mine, theirs }) => {
    const choice = isSame(mine, theirs) ? "mine" : (choices[key] ?? (mine ? "mine" : "theirs"));
    if (choice === "both" && mine && theirs) return [mine, { ...theirs, id: newId() }];
    const row = choice === "theirs" ? theirs : mine;
    return row ? [row] : [];
  });
}

/**
 * One worksheet out of two, as a person chose.
 *
 * @param choices - by the differences' keys; what is not named keeps ours, and what only one side has is kept
 * @param newId - makes the id of a reading that stands beside its other version
 */
export function settledSheet(mine: Worksheet, theirs: Worksheet, choices: Choices, newId: () => string): Worksheet {
  const pick = (name: FieldName) => (choices[name] === "theirs" ? theirs : mine);
  const merge = <Row extends ReadingRow>(list: ListName, ours: readonly Row[], others: readonly Row[]) =>
    chosenRows(pairRows(list, ours, others), choices, newId);
  return {
    ...theirs,
    testedOn: pick("testedOn").testedOn,
    gate: pick("gate").gate,
    method: pick("method").method,
    note: pick("note").note,
    cautions: {
      counting: mine.cautions.counting || theirs.cautions.counting,
      catching: mine.cautions.catching || theirs.cautions.catching,
    },
    counts: merge("counts", mine.counts, theirs.counts).sort((a, b) => Number(a.setting) - Number(b.setting)),
    catches: merge("catches", mine.catches, theirs.catches),
    timedCatches: merge("timedCatches", mine.timedCatches, theirs.timedCatches),
    verification: merge("verification", mine.verification, theirs.verification),
    liquids: merge("liquids", mine.liquids, theirs.liquids),
  };
}
