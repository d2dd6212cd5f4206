/** The text fields of a form by name; the last one of a name holds. */
export function formTexts(form: FormData): Record<string, string> {
  return Object.fromEntries([...form].flatMap(([name, value]) => (typeof value === "string" ? [[name, value]] : [])));
}
