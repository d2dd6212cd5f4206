import type { ComponentProps } from "react";
import { FieldFrame, fieldLook, fieldTies, type FieldWords } from "./field-frame.tsx";

/** Words first; every other attribute of the control may be given too, so a form library's props can be spread in. */
type InputProps = FieldWords & Omit<ComponentProps<"input">, keyof FieldWords | "className">;

export function TextField({ name, label, hint, error, id, isOptional, isWide, ...rest }: InputProps) {
  const words = { name, label, hint, error, id, isOptional, isWide };
  return (
    <FieldFrame words={words}>
      <input type="text" {...rest} {...fieldTies(words)} className={fieldLook} />
    </FieldFrame>
  );
}

type NumberProps = Omit<InputProps, "type" | "inputMode"> & {
  /** Stands after the figure: lb, in, tons. */
  unit?: string;
};

/** A figure as typed: text with the numeric keyboard, so that "1 7/8" and "1,200" reach the server as they were written. */
export function NumberField({ name, label, hint, error, id, isOptional, unit, ...rest }: NumberProps) {
  const words = { name, label, hint, error, id, isOptional };
  return (
    <FieldFrame words={words}>
      <span className="flex items-center gap-2">
        <span className="block w-40">
          <input
            autoComplete="off"
            {...rest}
            type="text"
            inputMode="decimal"
            {...fieldTies(words)}
            className={`${fieldLook} tabular-nums`}
          />
        </span>
        {unit !== undefined && <span className="text-gravel">{unit}</span>}
      </span>
    </FieldFrame>
  );
}

type FileProps = Omit<InputProps, "type" | "defaultValue" | "value">;

export function FileField({ name, label, hint, error, id, isOptional, ...rest }: FileProps) {
  const words = { name, label, hint, error, id, isOptional };
  return (
    <FieldFrame words={words}>
      <input
        {...rest}
        type="file"
        {...fieldTies(words)}
        className={`${fieldLook} border-dashed file:mr-4 file:min-h-8 file:cursor-pointer file:rounded-field file:border-[1.5px] file:border-spruce file:bg-snow file:px-3 file:font-semibold file:text-spruce`}
      />
    </FieldFrame>
  );
}
