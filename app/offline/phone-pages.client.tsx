import { useState } from "react";
import { useLocation } from "react-router";
import { FootButton, SheetFrame } from "#app/components/worksheet/sheet-frame.tsx";
import { Say } from "#app/components/worksheet/yard-field.tsx";
import { emptyWorksheet, type Worksheet, worksheetAtNewGate } from "#app/domain/calibration/worksheet.ts";
import type { YardKit } from "#app/domain/calibration/yard-kit.ts";
import { OnThisPhone } from "./on-this-phone.client.tsx";
import { todayOnPhone, useYard } from "./use-yard.client.ts";
import { YardMessage } from "./yard-message.client.tsx";

/** What the phone has by itself: shown in place of the town's list when there is no signal. */
export function PhoneList() {
  return (
    <SheetFrame
      title="Worksheets"
      standing={null}
      steps={[]}
      foot={<FootButton onClick={() => window.location.assign("/fleet/worksheets/new")}>Start a worksheet</FootButton>}
    >
      <Say>There is no signal. These worksheets are on this phone.</Say>
      <div className="mt-4">
        <OnThisPhone />
      </div>
    </SheetFrame>
  );
}

/** Choose truck and material, and begin; with signal or without. */
export function NewWorksheet() {
  const { yard, snapshot } = useYard(null);
  const { kit } = snapshot;
  if (!kit) return <YardMessage snapshot={snapshot} />;

  async function begin(sheet: Worksheet) {
    await yard.begin(sheet);
    window.location.assign(`/fleet/worksheets/${sheet.clientRef}#truck`);
  }
  return <Choose kit={kit} onBegin={(sheet) => void begin(sheet)} />;
}

const box =
  "block h-13 w-full rounded-field border-2 border-rule-field bg-snow px-3 text-head font-semibold focus:border-spruce";

function Choose({ kit, onBegin }: { kit: YardKit; onBegin: (sheet: Worksheet) => void }) {
  const wanted = new URLSearchParams(useLocation().search);
  const [truckId, setTruckId] = useState(Number(wanted.get("truck") ?? 0));
  const [materialId, setMaterialId] = useState(Number(wanted.get("material") ?? 0));
  const [isAsked, setAsked] = useState(false);
  const truck = kit.trucks.find(({ id }) => id === truckId);
  const carried = truck && truck.materialIds.length > 0 ? truck.materialIds : kit.materials.map(({ id }) => id);
  const materials = kit.materials.filter(({ id }) => carried.includes(id));
  const material = materials.find(({ id }) => id === materialId) ?? (materials.length === 1 ? materials[0] : undefined);
  const earlier = kit.calibrations.find(
    ({ id, truckId: own }) => id === Number(wanted.get("countsFrom") ?? 0) && own === truckId,
  );

  function begin() {
    if (!truck || !material) {
      setAsked(true);
      document.getElementById(truck ? "material" : "truck")?.focus();
      return;
    }
    const clientRef = crypto.randomUUID();
    const head = { clientRef, truckId: truck.id, materialId: material.id, testedOn: todayOnPhone() };
    onBegin(
      earlier ? worksheetAtNewGate(head, { calibrationId: earlier.id, counts: earlier.counts }) : emptyWorksheet(head),
    );
  }
  return (
    <SheetFrame
      title="New worksheet"
      standing={null}
      steps={[]}
      foot={<FootButton onClick={begin}>{earlier ? "Weigh at the new gate" : "Begin"}</FootButton>}
    >
      <Say>
        {earlier
          ? "The counts are taken over; weigh one revolution at the new gate."
          : "Which truck, and what is in it?"}
      </Say>
      {kit.trucks.length === 0 && <p className="mt-2 text-gravel">No truck is in the fleet yet.</p>}
      <div className="mt-4 grid gap-4">
        <label className="block">
          <span className="mb-1 block font-semibold">Truck</span>
          <select
            id="truck"
            value={truck?.id ?? ""}
            aria-invalid={isAsked && !truck ? true : undefined}
            onChange={(event) => setTruckId(Number(event.target.value))}
            className={box}
          >
            <option value="">choose a truck</option>
            {kit.trucks
              .filter(({ isInService, id }) => isInService || id === truckId)
              .map(({ id, unitNumber }) => (
                <option key={id} value={id}>
                  Truck {unitNumber}
                </option>
              ))}
          </select>
          {isAsked && !truck && (
            <span className="mt-1 block text-table font-semibold text-rust">Choose the truck.</span>
          )}
        </label>
        <label className="block">
          <span className="mb-1 block font-semibold">Material</span>
          <select
            id="material"
            value={material?.id ?? ""}
            aria-invalid={isAsked && !material ? true : undefined}
            onChange={(event) => setMaterialId(Number(event.target.value))}
            className={box}
          >
            <option value="">choose a material</option>
            {materials.map(({ id, name }) => (
              <option key={id} value={id}>
                {name}
              </option>
            ))}
          </select>
          {isAsked && truck && !material && (
            <span className="mt-1 block text-table font-semibold text-rust">Choose the material.</span>
          )}
        </label>
      </div>
      <p className="mt-4 leading-snug text-gravel">
        Each material is weighed by itself, and each truck: two of a kind can differ widely. About 20 minutes a truck,
        two people, a scale, a pail and a rule.
      </p>
    </SheetFrame>
  );
}
