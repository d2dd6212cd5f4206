import type { ComponentProps, ReactNode } from "react";
import { Link } from "react-router";

type Variant = "primary" | "quiet";
type Size = "desk" | "slim" | "yard";

const shape =
  "inline-flex items-center justify-center gap-2 rounded-field text-center font-semibold leading-tight no-underline cursor-pointer print:hidden";
const sizes: Record<Size, string> = {
  desk: "min-h-target px-5 py-2 text-m",
  slim: "min-h-target px-4.5 py-1 text-m sm:min-h-9.5",
  yard: "min-h-target-yard px-5 py-2 text-head",
};
const looks: Record<Variant, string> = {
  primary: "bg-spruce text-on-spruce hover:bg-spruce-deep active:bg-asphalt active:text-salt",
  quiet:
    "border-[1.5px] border-spruce text-spruce hover:bg-spruce-wash active:bg-asphalt active:border-asphalt active:text-salt",
};
const waiting = "bg-frost text-gravel cursor-default";

type ButtonProps = Omit<ComponentProps<"button">, "className"> & {
  variant?: Variant;
  size?: Size;
  /** What is going on, with a count where there is one: "Reading row 96 of 214". */
  busy?: string | false;
  /** Not possible yet: stays in the tab order so that the reason beside it is met. Give the reason's id. */
  notYet?: { reasonId: string } | false;
};

/** One primary button a page; every other is quiet. */
export function Button({ variant = "primary", size = "desk", busy = false, notYet = false, ...rest }: ButtonProps) {
  const isWaiting = busy !== false || notYet !== false;
  const { children, onClick, type = "submit", ...attributes } = rest;
  return (
    <button
      {...attributes}
      type={isWaiting ? "button" : type}
      aria-disabled={isWaiting || undefined}
      aria-describedby={notYet === false ? attributes["aria-describedby"] : notYet.reasonId}
      onClick={isWaiting ? undefined : onClick}
      className={`${shape} ${sizes[size]} ${isWaiting ? waiting : looks[variant]}`}
    >
      {busy === false ? children : <span role="status">{busy}</span>}
    </button>
  );
}

type LinkProps = { to: string; children: ReactNode; variant?: Variant; size?: Size; isDocument?: boolean };

export function ButtonLink({ to, children, variant = "primary", size = "desk", isDocument = false }: LinkProps) {
  const look = `${shape} ${sizes[size]} ${looks[variant]}`;
  if (isDocument) {
    return (
      <a href={to} className={look}>
        {children}
      </a>
    );
  }
  return (
    <Link to={to} className={look}>
      {children}
    </Link>
  );
}
