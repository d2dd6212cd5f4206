/**
 * Something that is wrong or doubtful in what a town entered. An "error" must be put right; a "check" may stand once
 * somebody has looked. `message` is a sentence for the person who can put it right.
 */
export type Finding = { code: string; severity: "error" | "check"; field: string; message: string };
