import type { Editor } from "./editor.ts";
import { Say } from "./yard-field.tsx";

/** Facts of the trade and of a published fatality inquiry (NIOSH, Wisconsin FACE 04WI093), in words of our own. */
const beforeCounting = [
  "Level ground, parking brake set, wheels chocked. Outdoors, or with the exhaust led away.",
  "Two people at least, one of them in charge of the signals. Nobody works behind the truck alone.",
  "Spinner at zero and out of the way. Everybody around is told before auger or spinner runs.",
  "No loose sleeves, gloves, cords or jewellery near the shaft; long hair tied back. A driver was killed when a turning auger took his sleeve.",
  "Look at the shaft's mark from the side. Nothing goes into box, auger, chain, gate or chute while anything can turn.",
  "Never feel for a hydraulic leak by hand: oil under pressure goes through the skin.",
];
const beforeCatching = [
  "Stop everything before hands go in: engine off, drive disengaged, pressure off, the key with whoever reaches in.",
  "The same before the gate is moved. Then start again from outside.",
  "Set the container down first, step clear, then give the signal. Stop at two thirds: a full pail of salt weighs over 50 lb.",
  "Safety glasses and a bright vest; ears covered at working rpm.",
  "Sweep up what has fallen and put it back. Keep it from the drain.",
];

type ListProps = {
  editor: Editor;
  kind: "counting" | "catching";
  title: string;
  lines: readonly string[];
  tick: string;
};

function Cautions({ editor, kind, title, lines, tick }: ListProps) {
  const { sheet, change, problemOf, isFinished } = editor;
  const field = `cautions.${kind}`;
  const problem = problemOf(field);
  return (
    <section className="mt-5 border-t-2 border-line pt-2.5" aria-labelledby={`${kind}-title`}>
      <h2 id={`${kind}-title`} className="font-bold">
        {title}
      </h2>
      <ul className="mt-1.5 grid gap-2 leading-snug">
        {lines.map((line) => (
          <li key={line} className="grid grid-cols-[0.7rem_1fr] gap-x-2.5">
            <span aria-hidden="true" className="mt-[0.55em] h-[3px] bg-line" />
            {line}
          </li>
        ))}
      </ul>
      <label className="mt-3 flex min-h-13 cursor-pointer items-center gap-3 rounded-field border-2 border-asphalt px-3 py-2 leading-snug font-semibold has-checked:border-spruce has-checked:bg-spruce-wash">
        <input
          type="checkbox"
          id={field}
          name={field}
          checked={sheet.cautions[kind]}
          disabled={isFinished}
          aria-invalid={problem ? true : undefined}
          aria-describedby={problem ? `${field}-problem` : undefined}
          onChange={(event) => change({ ...sheet, cautions: { ...sheet.cautions, [kind]: event.target.checked } })}
          className="size-6 flex-none accent-spruce"
        />
        {tick}
      </label>
      {problem && (
        <p id={`${field}-problem`} className="mt-1 text-table font-semibold text-rust">
          {problem.message}
        </p>
      )}
    </section>
  );
}

/** Shown before anything turns; each list is ticked by whoever is in charge. */
export function StepCautions({ editor }: { editor: Editor }) {
  return (
    <>
      <Say>A loaded spreader will run with people beside it. Read this together first.</Say>
      <p className="mt-2 leading-snug text-gravel">
        Your agency’s lockout procedure, the equipment’s manual and local rules come before anything that stands here.
      </p>
      <Cautions
        editor={editor}
        kind="counting"
        title="Before counting"
        lines={beforeCounting}
        tick="Read and seen to: we may count"
      />
      <Cautions
        editor={editor}
        kind="catching"
        title="Before catching"
        lines={beforeCatching}
        tick="Read and seen to: we may catch"
      />
    </>
  );
}
