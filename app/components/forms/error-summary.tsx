import { useEffect, useRef } from "react";
import { linkClass } from "#app/components/ui/text-link.tsx";

type FormError = { fieldId?: string; message: string };

type Props = {
  errors: readonly FormError[];
  title?: string;
};

/** All that is wrong with a form, above it. Takes focus when it appears, and leads to each field. Give it a `key` per reply. */
export function ErrorSummary({ errors, title = errorTitle(errors.length) }: Props) {
  const box = useRef<HTMLDivElement>(null);
  // On mount only: focus must not be taken from a field while it is being put right.
  useEffect(() => box.current?.focus(), []);

  if (errors.length === 0) return null;
  return (
    <div
      ref={box}
      role="alert"
      tabIndex={-1}
      className="my-5 max-w-measure border-t-4 border-b border-rust border-b-rule py-3 focus-visible:outline-offset-8"
    >
      <h2 className="text-head font-bold text-rust">
        <svg viewBox="0 0 10 10" aria-hidden="true" className="mr-2 inline-block size-[0.72em] fill-current">
          <path d="M5 0 10 10H0z" />
        </svg>
        {title}
      </h2>
      <ul className="mt-1">
        {errors.map((error) => (
          <li key={`${error.fieldId ?? ""} ${error.message}`} className="py-0.5">
            {error.fieldId === undefined ? (
              error.message
            ) : (
              <a href={`#${error.fieldId}`} className={linkClass}>
                {error.message}
              </a>
            )}
          </li>
        ))}
      </ul>
    </div>
  );
}

function errorTitle(count: number) {
  return count === 1 ? "One thing is to be put right" : `${count} things are to be put right`;
}
