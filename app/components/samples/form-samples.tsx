import { CheckField } from "#app/components/forms/check-field.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { FileField, NumberField, TextField } from "#app/components/forms/field.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";
import { Heading } from "#app/components/layout/answer.tsx";

const gateError = "1.83 in is not on a sixteenth. Did you mean 1\u00a011/16?";
const trucks = [
  { value: "12", label: "Truck 12" },
  { value: "14", label: "Truck 14" },
];

/** Every field at rest and in error, and the summary that leads to them. */
export function FormSamples() {
  return (
    <>
      <Heading>Fields</Heading>
      <ErrorSummary
        errors={[
          { fieldId: "gateIn", message: gateError },
          { fieldId: "truckChoice", message: "Say which truck “Old Red” is." },
        ]}
      />
      <div className="grid gap-x-9 gap-y-5 md:grid-cols-2 lg:grid-cols-3">
        <TextField name="townName" label="Town" hint="As it stands on the agreement." defaultValue="Quillbrook" />
        <NumberField
          name="openingIn"
          label="Gate opening"
          unit="in"
          hint="Bed to the lower edge."
          defaultValue="1 7/8"
        />
        <NumberField name="gateIn" label="Gate opening" unit="in" error={gateError} defaultValue="11/6" />
        <SelectField name="material" label="Truck" choices={trucks} defaultValue="12" />
        <SelectField
          name="truckChoice"
          label="Which truck is “Old Red”?"
          choices={trucks}
          prompt="choose a truck"
          error="Say which truck “Old Red” is."
        />
        <TextArea name="note" label="Note for the coordinator" isOptional hint="Goes with the figures." />
        <FileField name="file" label="Storm log" accept=".csv" hint="CSV, up to 5 MB. Your file is not changed." />
        <CheckField
          name="terms"
          label="I have read how towns are protected, and will not try to find out which town a row is."
        />
        <CheckField
          name="cautions"
          label="Wheels chocked, nobody behind the spinner."
          error="Tick this before you count."
        />
      </div>
    </>
  );
}
