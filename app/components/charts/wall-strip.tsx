/** The strip of a board, drawn by the server for the wall and scaled to its width. The title inside it is its text. */
export function WallStrip({ svg }: { svg: string }) {
  return <figure className="w-full" dangerouslySetInnerHTML={{ __html: svg }} />;
}
