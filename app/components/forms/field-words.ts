import type { FieldMetadata } from "@conform-to/react";

/** What a form library knows of a field, as our fields take it: name, id, what was typed, what is wrong. */
export function fieldWords(field: FieldMetadata<string>) {
  return {
    name: field.name,
    id: field.id,
    defaultValue: typeof field.initialValue === "string" ? field.initialValue : "",
    error: field.errors ?? null,
  };
}
