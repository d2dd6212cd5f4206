/** A town's own names of one sort of thing, and the other names its files use for them. */
export type NameList<Id> = {
  /** The id by name, in small letters. */
  byName: ReadonlyMap<string, Id>;
  /** Names in the town's own writing, for the sentence that says what it could be. */
  names: readonly string[];
};

function key(text: string) {
  return text.normalize("NFKC").toLowerCase().replace(/\s+/g, " ").trim();
}

/**
 * A list to look names up in.
 *
 * @param own - the town's things
 * @param others - what the town has said that other names mean; the things' own names come first
 */
export function nameList<Id>(
  own: readonly { id: Id; name: string }[],
  others: readonly { text: string; id: Id }[],
): NameList<Id> {
  const byName = new Map<string, Id>();
  for (const { text, id } of others) byName.set(key(text), id);
  for (const { name, id } of own) byName.set(key(name), id);
  return { byName, names: own.map(({ name }) => name) };
}

/** The id that the name means, or undefined. @example named(nameList([{ id: 1, name: "Salt" }], []), " salt") // 1 */
export function named<Id>(list: NameList<Id>, text: string): Id | undefined {
  return list.byName.get(key(text));
}

/** A truck's id by its number, however the file writes it: "Truck 12", "#12", "No. 012", "12". */
export function truckNamed<Id>(list: NameList<Id>, text: string): Id | undefined {
  const bare = text.replace(/^\s*(?:(?:truck|unit|plow|no|nr)\b\.?|#)\s*/i, "").replace(/^#/, "");
  return named(list, text) ?? named(list, bare) ?? named(list, bare.replace(/^0+(?=\d)/, ""));
}

/** The first names of a list, for a sentence. */
export function someNames(names: readonly string[]): string {
  return names.length <= 12 ? names.join(", ") : `${names.slice(0, 12).join(", ")} and others`;
}
