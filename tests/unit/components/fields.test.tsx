import { renderToStaticMarkup } from "react-dom/server";
import { expect, test } from "vitest";
import { CheckField } from "#app/components/forms/check-field.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField, TextField } from "#app/components/forms/field.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";

test("a field in error is marked, names its error and hint as its description, and keeps what was typed", () => {
  const markup = renderToStaticMarkup(
    <NumberField
      name="gateIn"
      label="Gate opening"
      hint="Bed to the lower edge."
      error="Not on a sixteenth."
      defaultValue="11/6"
    />,
  );
  expect(markup).toContain('aria-invalid="true"');
  expect(markup).toContain('aria-describedby="gateIn-error gateIn-hint"');
  expect(markup).toMatch(/<p id="gateIn-error"[^>]*>.*Not on a sixteenth\.<\/p>/);
  expect(markup).toMatch(/<p id="gateIn-hint"[^>]*>Bed to the lower edge\.<\/p>/);
  expect(markup).toContain('value="11/6"');
  expect(markup).toContain('inputMode="decimal"');
});

test("a field at rest has a label, no mark of error and points at no missing description", () => {
  const markup = renderToStaticMarkup(<TextField name="town" label="Town" required />);
  expect(markup).toContain('<label for="town"');
  expect(markup).not.toContain('aria-invalid="');
  expect(markup).not.toContain('aria-describedby="');
  expect(markup).not.toContain("may be left empty");
});

test("every kind of control carries the same ties", () => {
  const words = { name: "answer", label: "Answer", error: ["Say one thing.", "Only one."] };
  const controls = [
    <SelectField key="select" {...words} choices={[{ value: "1", label: "One" }]} prompt="choose one" />,
    <TextArea key="area" {...words} isOptional />,
    <CheckField key="check" {...words} />,
  ];
  for (const control of controls) {
    const markup = renderToStaticMarkup(control);
    expect(markup).toContain('<label for="answer"');
    expect(markup).toContain('id="answer"');
    expect(markup).toContain('aria-describedby="answer-error"');
    expect(markup).toContain("Say one thing. Only one.");
  }
});

test("the summary is an alert that leads to each field, and nothing when all is well", () => {
  const markup = renderToStaticMarkup(
    <ErrorSummary
      errors={[{ fieldId: "gateIn", message: "Not on a sixteenth." }, { message: "The form was sent twice." }]}
    />,
  );
  expect(markup).toContain('role="alert"');
  expect(markup).toContain('tabindex="-1"');
  expect(markup).toContain('<a href="#gateIn"');
  expect(markup).toContain("2 things are to be put right");
  expect(renderToStaticMarkup(<ErrorSummary errors={[]} />)).toBe("");
});
