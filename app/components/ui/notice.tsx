import type { ReactNode } from "react";

type Tone = "plain" | "good" | "problem";

const rules: Record<Tone, string> = {
  plain: "border-line",
  good: "border-spruce",
  problem: "border-rust",
};
const heads: Record<Tone, string> = { plain: "text-asphalt", good: "text-spruce", problem: "text-rust" };
const glyphs: Record<Tone, string> = {
  plain: "",
  good: "M1.2 5.4 4 8.4 9 2l1 1L4 10.4.2 6.4z",
  problem: "M5 0 10 10H0z",
};

type Props = { title: string; tone?: Tone; children?: ReactNode; id?: string };

/** Something the page has to say: what happened, what was kept, what to do. Two rules, no box. */
export function Notice({ title, tone = "plain", children, id }: Props) {
  return (
    <div
      id={id}
      role={tone === "problem" ? "alert" : "status"}
      className={`my-5 border-t-4 border-b border-b-rule py-3 ${rules[tone]}`}
    >
      <p className={`text-head font-bold ${heads[tone]}`}>
        {glyphs[tone] !== "" && (
          <svg
            viewBox="0 0 10 11"
            aria-hidden="true"
            className="mr-2 inline-block size-[0.8em] align-[-0.03em] fill-current"
          >
            <path d={glyphs[tone]} />
          </svg>
        )}
        {title}
      </p>
      {children !== undefined && <div className="mt-1 max-w-method text-pretty">{children}</div>}
    </div>
  );
}
