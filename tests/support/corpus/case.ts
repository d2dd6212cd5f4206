/** A file that somebody might send, and what is to come of it. */
export type CorpusCase = {
  name: string;
  fileName?: string;
  content: Uint8Array;
  outcome: Outcome;
};

/** A problem by its row, its field and its code; of the value only what is given is compared. */
export type Expected = { row: number; field?: string; code: string; value?: string | null };

export type Outcome =
  /** Every row looked at: how many were ready, doubtful and wrong, and the first problems. */
  | { state: "checked"; ok: number; check?: number; error?: number; problems?: Expected[] }
  /** The columns have to be matched by somebody. */
  | { state: "matching"; words?: string }
  /** Not readable, in these words. */
  | { state: "failed"; words: string };

export const heads = "start_date,start_time,end_time,kind,truck,lane_miles,salt_tons,note";
/** A line with nothing wrong in it. `{}` are its changes by head. */
export function line(change: Record<string, string> = {}): string {
  const usual: Record<string, string> = {
    start_date: "2024-12-04",
    start_time: "04:30",
    end_time: "11:00",
    kind: "snow",
    truck: "12",
    lane_miles: "24",
    salt_tons: "5.5",
    note: "",
  };
  return heads
    .split(",")
    .map((head) => change[head] ?? usual[head] ?? "")
    .join(",");
}

export const second = line({ start_date: "2024-12-19" });

/** A file of these lines under the usual heads. */
export function file(...lines: string[]): string {
  return `${[heads, ...lines].join("\r\n")}\r\n`;
}

export function textCase(name: string, content: string | Uint8Array, outcome: Outcome): CorpusCase {
  return { name, content: typeof content === "string" ? Buffer.from(content) : content, outcome };
}

/** One changed cell in row 2 beside a good row 3. */
export function cellCase(name: string, change: Record<string, string>, outcome: Outcome): CorpusCase {
  return textCase(name, file(line(change), second), outcome);
}

export const ready = (ok: number): Outcome => ({ state: "checked", ok, problems: [] });

/** The first row wrong in one cell, the second right. */
export function wrong(field: string, code: string, value?: string): Outcome {
  const problem: Expected = value === undefined ? { row: 2, field, code } : { row: 2, field, code, value };
  return { state: "checked", ok: 1, error: 1, problems: [problem] };
}

/** The first row doubtful in one cell, the second right. */
export function doubtful(field: string, code: string): Outcome {
  return { state: "checked", ok: 1, check: 1, problems: [{ row: 2, field, code }] };
}
