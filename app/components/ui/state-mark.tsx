import type { ReactNode } from "react";

type Props = {
  children: ReactNode;
  /** In tables, where the column head already says it: the word is then for the ear only. */
  isWordHidden?: boolean;
};

/** In a table the sign never parts from its figure; in a sentence the words may run on. */
const look = (isWordHidden: boolean) => `font-bold ${isWordHidden ? "whitespace-nowrap" : ""}`;
const glyph = "mr-[0.2em] inline-block size-[0.72em] align-[-0.02em] fill-current";

/** Over the band, or wrong: rust, triangle up, and a word. */
export function Over({ children, isWordHidden = false }: Props) {
  return (
    <span className={`${look(isWordHidden)} text-rust`}>
      <svg viewBox="0 0 10 10" aria-hidden="true" className={glyph}>
        <path d="M5 0 10 10H0z" />
      </svg>
      {isWordHidden && <span className="sr-only">over: </span>}
      {children}
    </span>
  );
}

/** Under the band: glacier, triangle down, and a word. */
export function Under({ children, isWordHidden = false }: Props) {
  return (
    <span className={`${look(isWordHidden)} text-glacier`}>
      <svg viewBox="0 0 10 10" aria-hidden="true" className={glyph}>
        <path d="M0 0h10L5 10z" />
      </svg>
      {isWordHidden && <span className="sr-only">under: </span>}
      {children}
    </span>
  );
}

/** In the band: beacon ink, a boxed square, and a word. */
export function InBand({ children, isWordHidden = false }: Props) {
  return (
    <span className={`${look(isWordHidden)} text-beacon-ink`}>
      <svg viewBox="0 0 10 10" aria-hidden="true" className={glyph}>
        <path fillRule="evenodd" d="M0 0h10v10H0zM1.6 1.6v6.8h6.8V1.6zM3.2 3.2h3.6v3.6H3.2z" />
      </svg>
      {isWordHidden && <span className="sr-only">in the band: </span>}
      {children}
    </span>
  );
}
