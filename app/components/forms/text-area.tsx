import type { ComponentProps } from "react";
import { FieldFrame, fieldLook, fieldTies, type FieldWords } from "./field-frame.tsx";

type Props = FieldWords & Omit<ComponentProps<"textarea">, keyof FieldWords | "className">;

export function TextArea({ name, label, hint, error, id, rows = 3, ...rest }: Props) {
  const words = { name, label, hint, error, id };
  return (
    <FieldFrame words={words} isRequired={rest.required === true}>
      <textarea
        rows={rows}
        {...rest}
        {...fieldTies(words)}
        className={`${fieldLook} field-sizing-content leading-normal`}
      />
    </FieldFrame>
  );
}
