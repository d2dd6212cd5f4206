import { useState } from "react";
import { NumberField, TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { stockKinds } from "#app/domain/season/stock-balance.ts";
import { stockUnits, usualLbPerCubicYard } from "#app/domain/season/stock-quantity.ts";
import { stockKindWords, stockUnitWords } from "./stock-form.ts";

type Props = {
  piles: readonly { id: number; name: string; kind: string }[];
  userId: number;
  clientRef: string;
  errors: Record<string, string>;
  values: Record<string, string>;
};

/** The fields that kind and unit ask for. Without script, a missing one is asked for when the form comes back. */
export function StockForm({ piles, userId, clientRef, errors, values }: Props) {
  const [kind, setKind] = useState(values.kind ?? "");
  const [unit, setUnit] = useState(values.typedUnit ?? "ton");
  const needsPrice = kind === "" || kind === "delivery";
  return (
    <KeptForm key={clientRef} formKey="stock" ownerId={userId} method="post" className="grid gap-5">
      <input type="hidden" name="clientRef" value={clientRef} />
      <div className="grid gap-x-8 gap-y-5 sm:grid-cols-2 lg:grid-cols-3">
        <SelectField
          name="materialId"
          label="Material"
          error={errors.materialId}
          defaultValue={values.materialId ?? (piles.length === 1 ? String(piles[0]?.id ?? "") : "")}
          prompt="choose a material"
          choices={piles.map(({ id, name }) => ({ value: String(id), label: name }))}
        />
        <SelectField
          name="kind"
          label="What happened"
          error={errors.kind}
          defaultValue={kind}
          prompt="choose what happened"
          onChange={(event) => setKind(event.currentTarget.value)}
          choices={stockKinds.map((each) => ({ value: each, label: stockKindWords[each] }))}
        />
        <TextField name="day" type="date" label="Day" error={errors.day} defaultValue={values.day ?? ""} />
        <NumberField
          name="typedQuantity"
          label="Quantity"
          error={errors.typedQuantity}
          defaultValue={values.typedQuantity ?? ""}
        />
        <SelectField
          name="typedUnit"
          label="In"
          error={errors.typedUnit}
          defaultValue={unit}
          onChange={(event) => setUnit(event.currentTarget.value)}
          choices={stockUnits.map((each) => ({ value: each, label: stockUnitWords[each] }))}
        />
        {unit === "cubic-yard" && (
          <NumberField
            name="lbPerCubicYard"
            label="A cubic yard weighs"
            unit="lb"
            hint={`Usual: salt ${usualLbPerCubicYard.salt.toLocaleString("en-US")}, sand ${usualLbPerCubicYard.sand.toLocaleString("en-US")}, mix ${usualLbPerCubicYard.mix.toLocaleString("en-US")} lb (Minnesota Pollution Control Agency, Stormwater Manual). Yours, weighed, is better.`}
            error={errors.lbPerCubicYard}
            defaultValue={values.lbPerCubicYard ?? ""}
          />
        )}
        {needsPrice && (
          <>
            <NumberField
              name="priceUsd"
              label="Paid for the delivery"
              unit="dollars"
              isOptional
              error={errors.priceUsd}
              defaultValue={values.priceUsd ?? ""}
            />
            <TextField
              name="supplier"
              label="Supplier"
              isOptional
              maxLength={80}
              error={errors.supplier}
              defaultValue={values.supplier ?? ""}
            />
          </>
        )}
      </div>
      <div>
        <Button>Write it down</Button>
      </div>
    </KeptForm>
  );
}
