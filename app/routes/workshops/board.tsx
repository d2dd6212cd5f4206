import { useEffect } from "react";
import { Link, useNavigate } from "react-router";
import { laneStripSvg } from "#app/components/charts/lane-strip-svg.server.ts";
import { WallStrip } from "#app/components/charts/wall-strip.tsx";
import { wallStripSpec } from "#app/components/peers/strip-specs.ts";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { indicators } from "#app/domain/peers/indicators.ts";
import { sentenceText, wallSentence } from "#app/domain/peers/sentence.ts";
import { notFound } from "#app/lib/errors.ts";
import { idParam } from "#app/lib/params.ts";
import type { WallCell } from "#app/services/editions.server.ts";
import { getWorkshop } from "#app/services/workshops.server.ts";
import type { Route } from "./+types/board";

export const handle = { isWall: true };

/** Whose figures they are, and how many towns as a band. */
function basisWords({ groupLabel, ...cell }: WallCell) {
  if (cell.state === "withheld") return groupLabel;
  const isOpen = cell.townBand.endsWith(" and more");
  const towns = isOpen ? cell.townBand.replace(" and", " towns and") : `${cell.townBand} towns`;
  return `${groupLabel}, ${towns}; each bar about three`;
}

export async function loader({ context, params }: Route.LoaderArgs) {
  const workshop = await getWorkshop(networkActor(context), idParam(params.workshopId, "workshop"));
  const position = idParam(params.position, "board");
  const board = workshop.boards.find((candidate) => candidate.position === position);
  if (!board) throw notFound("board");
  const { indicator, cell, question } = board;
  const spec = wallStripSpec(indicator, cell);
  return {
    workshopId: workshop.id,
    title: workshop.title,
    edition: `${seasonLabel(workshop.seasonStartYear)}, edition ${workshop.editionNumber}`,
    position,
    boardCount: workshop.boards.length,
    question,
    sentence: sentenceText(wallSentence({ indicator, cell, band: indicators[indicator].band })),
    basis: `${indicators[indicator].wallName}. ${basisWords(cell)}`,
    svg: { wall: laneStripSvg(spec, "wall"), phone: laneStripSvg(spec, "phone") },
  };
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Board ${loaderData?.position ?? ""} of ${loaderData?.boardCount ?? ""} · Commonweigh` },
];

export default function BoardPage({ loaderData }: Route.ComponentProps) {
  const { workshopId, position, boardCount, edition, question, sentence, basis, svg } = loaderData;
  const navigate = useNavigate();
  const to = (next: number) => `/workshops/${workshopId}/boards/${next}`;

  useEffect(() => {
    // A room is presented to from the keyboard: arrows, page keys (clickers send those), Escape back to the list.
    function turn(event: KeyboardEvent) {
      const forward = ["ArrowRight", "PageDown", " "].includes(event.key);
      const back = ["ArrowLeft", "PageUp"].includes(event.key);
      if (event.key === "Escape") void navigate(`/workshops/${workshopId}`);
      if (forward && position < boardCount) void navigate(to(position + 1));
      if (back && position > 1) void navigate(to(position - 1));
      if (event.key === "f") void document.documentElement.requestFullscreen();
    }
    window.addEventListener("keydown", turn);
    return () => window.removeEventListener("keydown", turn);
  });

  return (
    <main id="main" className="flex min-h-dvh flex-col px-4 pt-6 text-wall leading-tight sm:px-11 sm:pt-7">
      <h1 className="max-w-[25em] text-[clamp(1.75rem,3.5vw,4.2rem)] leading-[1.12] font-bold tracking-[-0.02em] text-balance">
        {sentence}
      </h1>
      <p className="mt-2 text-gravel max-sm:text-l">{basis}</p>
      <div className="mt-4">
        <WallStrip svg={svg.wall} phoneSvg={svg.phone} />
      </div>
      <p className="mt-5 mb-6 max-w-[28em] text-[clamp(1.75rem,3.1vw,3.6rem)] leading-[1.15] font-semibold tracking-[-0.012em] text-balance">
        {question}
      </p>
      <footer className="-mx-4 mt-auto flex max-sm:text-l flex-wrap items-baseline gap-x-10 gap-y-1 border-t-[5px] border-line px-4 py-3.5 sm:-mx-11 sm:px-11">
        <nav aria-label="Boards" className="flex gap-8">
          {position > 1 && (
            <Link className="text-spruce underline underline-offset-4" to={to(position - 1)}>
              Back
            </Link>
          )}
          {position < boardCount && (
            <Link className="text-spruce underline underline-offset-4" to={to(position + 1)}>
              Next
            </Link>
          )}
          <Link className="text-gravel underline underline-offset-4" to={`/workshops/${workshopId}`}>
            Close
          </Link>
        </nav>
        <span className="ml-auto text-gravel">
          {edition} · board {position} of {boardCount}
        </span>
      </footer>
    </main>
  );
}
