import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatShortDay } from "#app/lib/format.ts";
import { partWords } from "./fleet-words.ts";

type Work = { id: number; doneOn: string; part: keyof typeof partWords; note: string };

/** What was done on a truck, newest first. */
export function WorkTable({ work }: { work: readonly Work[] }) {
  return (
    <Timetable
      caption="Work on gate, hydraulics, feed and controller, newest first"
      isCaptionHidden
      columns={[
        { key: "day", label: "on" },
        { key: "part", label: "worked on" },
        { key: "note", label: "what was done" },
      ]}
      rows={work.map(({ id, doneOn, part, note }) => ({
        key: String(id),
        cells: { day: formatShortDay(doneOn), part: partWords[part], note: note === "" ? "–" : note },
      }))}
    />
  );
}
