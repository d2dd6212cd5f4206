type Choice = { value: string; label: string };
export type ProblemRowView = {
  /** As a spreadsheet counts; 0 for the file as a whole. */
  sheetRow: number;
  value: string | null;
  message: string;
  /** Cells that tell which row it is. */
  context: string[];
  /** The cell that is to be put right, "" when it is none in particular. */
  field: string;
  columnName: string | null;
};
export type ProblemGroupView = {
  key: string;
  code: string;
  field: string;
  columnName: string | null;
  severity: "error" | "check";
  rowCount: number;
  message: string | null;
  names: { sort: "truck" | "material" | "storm-kind"; values: { value: string; rowCount: number }[] } | null;
  contextHeads: string[];
  rows: ProblemRowView[];
};

export type RepairProps = {
  uploadId: number;
  group: ProblemGroupView;
  choices: Record<"truck" | "material" | "storm-kind", Choice[]>;
  /** Whether cells can be put right here. */
  canFix: boolean;
  settledNames: readonly { sort: string; name: string; meaning: string }[];
};

/** The key of the list of problems that occur once. */
export function singlesKey(severity: "error" | "check"): string {
  return `${severity}-single`;
}

function isSingle({ rowCount, names, code, rows }: ProblemGroupView) {
  return rowCount === 1 && names === null && code !== "tons-or-pounds" && rows[0]?.sheetRow !== 0;
}

/**
 * Kinds of problem that occur once are put into one list: a head for each of them would hide how little there is to do.
 * Alone of its severity, such a kind keeps its own head.
 */
export function withSinglesTogether(groups: readonly ProblemGroupView[]): ProblemGroupView[] {
  return (["error", "check"] as const).flatMap((severity) => {
    const own = groups.filter((group) => group.severity === severity);
    const singles = own.filter(isSingle);
    if (singles.length < 2) return own;
    const together: ProblemGroupView = {
      key: singlesKey(severity),
      code: "single",
      field: "",
      columnName: null,
      severity,
      rowCount: singles.length,
      message: null,
      names: null,
      contextHeads: [],
      rows: singles.flatMap(({ rows }) => rows).sort((a, b) => a.sheetRow - b.sheetRow),
    };
    return [...own.filter((group) => !isSingle(group)), together];
  });
}
