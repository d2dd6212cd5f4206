import type { ReactNode } from "react";
import { Link } from "react-router";

type Props = {
  to: string;
  children: ReactNode;
  /** Bold links stand on their own; plain ones run in a sentence. */
  weight?: "plain" | "bold";
  /** A file, or a page outside the app's own: loaded by the browser, not by the router. */
  isDocument?: boolean;
  className?: string;
};

export const linkClass =
  "text-spruce underline decoration-1 underline-offset-3 hover:text-spruce-deep hover:decoration-2";

export function TextLink({ to, children, weight = "plain", isDocument = false, className = "" }: Props) {
  const look = `${linkClass} ${weight === "bold" ? "font-semibold" : ""} ${className}`;
  if (isDocument || to.startsWith("#")) {
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
