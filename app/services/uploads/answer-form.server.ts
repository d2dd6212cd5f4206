import { z } from "zod";
import type { Answer } from "./answers.server.ts";

/** More fields than a page offers are not taken. */
const mostFields = 300;

const Code = z.string().regex(/^[a-z-]{1,40}$/);
const Field = z.string().regex(/^(?:[a-z_]{1,40}(?::\d{1,10})?)?$/);
const Row = z
  .string()
  .regex(/^[1-9]\d{0,6}$/)
  .transform(Number);

const AnswerForm = z.discriminatedUnion("intent", [
  z.object({
    intent: z.literal("names"),
    sort: z.enum(["truck", "material", "storm-kind"]),
    code: Code,
    field: Field,
    name: z.array(z.string().min(1).max(120)).max(mostFields),
    meaning: z.array(z.string().max(24)).max(mostFields),
  }),
  z.object({
    intent: z.literal("cells"),
    cellField: z.array(Field.refine((field) => field !== "")).max(mostFields),
    row: z.array(Row).max(mostFields),
    was: z.array(z.string().max(300)).max(mostFields),
    text: z.array(z.string().max(300)).max(mostFields),
  }),
  z.object({ intent: z.enum(["as-pounds", "stands", "left-out"]), code: Code, field: Field }),
  z.object({ intent: z.literal("bring-back") }),
]);

/**
 * What a form on the page of a checked file answers.
 *
 * @returns null when it is none of these forms, or somebody has tampered with it; names and cells left as they were are
 *   no answer and are passed over
 */
export function readAnswer(form: FormData): Answer | null {
  const single = (name: string) => form.get(name) ?? undefined;
  const parsed = AnswerForm.safeParse({
    intent: single("intent"),
    sort: single("sort"),
    code: single("code"),
    field: single("field"),
    name: form.getAll("name"),
    meaning: form.getAll("meaning"),
    cellField: form.getAll("cellField"),
    row: form.getAll("row"),
    was: form.getAll("was"),
    text: form.getAll("text"),
  });
  if (!parsed.success) return null;
  const answer = parsed.data;
  switch (answer.intent) {
    case "names": {
      const names = answer.name.map((name, place) => ({ name, meaning: answer.meaning[place] ?? "" }));
      const kind = { code: answer.code, field: answer.field };
      return { type: "names", sort: answer.sort, kind, names: names.filter(({ meaning }) => meaning !== "") };
    }
    case "cells": {
      const cells = answer.row.map((sheetRow, place) => ({
        sheetRow,
        field: answer.cellField[place] ?? "",
        text: (answer.text[place] ?? "").trim(),
        was: answer.was[place] ?? "",
      }));
      return {
        type: "cells",
        cells: cells.filter(({ text, was }) => text !== was).map(({ was: _was, ...cell }) => cell),
      };
    }
    case "bring-back":
      return { type: "bring-back" };
    default:
      return { type: answer.intent, kind: { code: answer.code, field: answer.field } };
  }
}
