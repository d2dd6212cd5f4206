import { useEffect, useRef } from "react";
import { linkClass } from "#app/components/ui/text-link.tsx";

export type FormError = { fieldId?: string; message: string };

type Props = {
  errors: readonly FormError[];
  title?: string;
};

/** All that is wrong with a form, above it. Takes focus when it appears, and leads to each field. */
export function ErrorSummary({ errors, title = errorTitle(errors.length) }: Props) {
  const box = useRef<HTMLDivElement>(null);
  const hasErrors = errors.length > 0;
  useEffect(() => {
    // `errors` is a new list after every reply, so a second failed attempt moves the focus here again.
    if (hasErrors) box.current?.focus();
  }, [errors, hasErrors]);

  if (!hasErrors) return null;
  return (
    <div
      ref={box}
      role="alert"
      tabIndex={-1}
      className="my-5 max-w-measure border-t-4 border-b border-rust border-b-rule py-3"
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
