type Props = {
  svg: string;
  /** For whoever looks at the board on a phone beforehand: scaled down so far, the wall's words could not be read. */
  phoneSvg?: string;
};

/** The strip of a board, drawn by the server for the wall and scaled to its width. The title inside it is its text. */
export function WallStrip({ svg, phoneSvg }: Props) {
  if (phoneSvg === undefined) return <figure className="w-full" dangerouslySetInnerHTML={{ __html: svg }} />;
  return (
    <figure className="w-full">
      <div className="sm:hidden" dangerouslySetInnerHTML={{ __html: phoneSvg }} />
      <div className="max-sm:hidden" dangerouslySetInnerHTML={{ __html: svg }} />
    </figure>
  );
}
