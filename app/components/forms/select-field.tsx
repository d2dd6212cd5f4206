import type { ComponentProps } from "react";
import { FieldFrame, fieldLook, fieldTies, type FieldWords } from "./field-frame.tsx";

type Choice = { value: string; label: string; isDisabled?: boolean };

type SelectProps = FieldWords &
  Omit<ComponentProps<"select">, keyof FieldWords | "className" | "children"> & {
    choices: readonly Choice[];
    /** Shown while nothing is chosen: "choose a truck". */
    prompt?: string;
  };

export function SelectField(props: SelectProps) {
  const { name, label, hint, error, id, isOptional, isWide, choices, prompt, ...rest } = props;
  const words = { name, label, hint, error, id, isOptional, isWide };
  return (
    <FieldFrame words={words}>
      <span className="relative block">
        <select
          {...rest}
          {...fieldTies(words)}
          className={`${fieldLook} appearance-none pr-9 font-semibold text-ellipsis`}
        >
          {prompt !== undefined && <option value="">{prompt}</option>}
          {choices.map((choice) => (
            <option key={choice.value} value={choice.value} disabled={choice.isDisabled}>
              {choice.label}
            </option>
          ))}
        </select>
        <svg
          viewBox="0 0 10 7"
          aria-hidden="true"
          className="pointer-events-none absolute top-1/2 right-3.5 h-1.75 w-2.5 -translate-y-1/2 fill-none stroke-gravel stroke-2"
        >
          <path d="M1 1l4 4 4-4" />
        </svg>
      </span>
    </FieldFrame>
  );
}
