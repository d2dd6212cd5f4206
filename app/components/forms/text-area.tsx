import type { ComponentProps } from "react";
import { FieldFrame, fieldLook, fieldTies, type FieldWords } from "./field-frame.tsx";

type Props = FieldWords & Omit<ComponentProps<"textarea">, keyof FieldWords | "className">;

export function TextArea({ name, label, hint, error, id, isOptional, rows = 3, ...rest }: Props) {
  const words = { name, label, hint, error, id, isOptional };
  return (
    <FieldFrame words={words}>
      <textarea
        rows={rows}
        {...rest}
        {...fieldTies(words)}
        className={`${fieldLook} field-sizing-content leading-normal`}
      />
    </FieldFrame>
  );
}
