import { Children, Fragment, type ReactNode } from "react";

const season = /(\d{4}–\d{2})/;

/** Words in which a season keeps on one line: a browser may break after the dash of 2025–26. */
export function WholeSeasons({ children }: { children: ReactNode }) {
  return Children.map(children, (child) => (typeof child === "string" ? wholeSeasons(child) : child));
}

function wholeSeasons(text: string) {
  if (!season.test(text)) return text;
  return text.split(season).map((piece, position) =>
    position % 2 === 0 ? (
      <Fragment key={position}>{piece}</Fragment>
    ) : (
      <span key={position} className="whitespace-nowrap">
        {piece}
      </span>
    ),
  );
}
