import type { Editor } from "./editor.ts";
import { Problem, Say, YardField } from "./yard-field.tsx";
import { formatShortDay } from "#app/lib/format.ts";

const spreaderWords: Record<Editor["truck"]["spreaderKind"], string> = {
  "tailgate-auger": "auger under the tailgate",
  "hopper-auger": "auger in the hopper",
  conveyor: "conveyor",
  "liquid-tanks": "liquid tanks",
};

/** What is weighed, and on which day. Truck and material were chosen when the worksheet was begun. */
export function StepTruck({ editor }: { editor: Editor }) {
  const { sheet, truck, material, earlier, change } = editor;
  const last = earlier.find(({ isInForce }) => isInForce) ?? earlier[0];
  return (
    <>
      <Say>
        You calibrate truck {truck.unitNumber} for {material.name.toLowerCase()}.
      </Say>
      <dl className="mt-4 grid grid-cols-[auto_1fr] gap-x-4 gap-y-1.5 border-t border-rule pt-3">
        <dt className="text-gravel">Spreader</dt>
        <dd>
          {spreaderWords[truck.spreaderKind]}
          {truck.control === "ground-speed" ? ", ground-speed control" : ""}
        </dd>
        <dt className="text-gravel">Works at</dt>
        <dd>
          setting {truck.workingSetting}, {truck.workingSpeedMph} mph
          {truck.workingRpm === null ? "" : `, ${truck.workingRpm.toLocaleString("en-US")} rpm`}
        </dd>
        <dt className="text-gravel">A pass spreads</dt>
        <dd>{truck.lanesPerPass === 1 ? "one lane" : `${truck.lanesPerPass} lanes`}</dd>
        <dt className="text-gravel">Last weighed</dt>
        <dd>{last ? formatShortDay(last.testedOn) : "never, with this material"}</dd>
      </dl>
      <div className="mt-5">
        <label htmlFor="testedOn" className="mb-1 block font-semibold">
          Day of the test
        </label>
        <input
          id="testedOn"
          name="testedOn"
          type="date"
          value={sheet.testedOn}
          disabled={editor.isFinished}
          onChange={(event) => {
            if (event.target.value !== "") change({ ...sheet, testedOn: event.target.value });
          }}
          className="block h-12.5 w-52 rounded-field border-2 border-rule-field bg-snow px-3 text-head font-semibold text-asphalt focus:border-spruce disabled:bg-frost disabled:text-gravel"
        />
        <Problem editor={editor} field="testedOn" />
      </div>
      <div className="mt-5">
        <YardField
          editor={editor}
          field="note"
          name="Note"
          label={
            <>
              Note <span className="font-normal text-gravel">(may be left empty)</span>
            </>
          }
          value={sheet.note}
          onText={(note) => change({ ...sheet, note })}
          mode="text"
          isWide
          hint="Who helped, how damp the material was, what was out of the ordinary."
        />
      </div>
    </>
  );
}
