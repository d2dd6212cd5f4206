import { getFormProps, type SubmissionResult, useForm } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { useNavigation } from "react-router";
import { CheckField } from "#app/components/forms/check-field.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField, TextField } from "#app/components/forms/field.tsx";
import { fieldWords } from "#app/components/forms/field-words.ts";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Heading } from "#app/components/layout/answer.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { controlKinds, spreaderKinds, type TruckFacts } from "#app/domain/fleet/truck.ts";
import { formatInches } from "#app/lib/format.ts";
import { sentenceStart } from "#app/lib/words.ts";
import { controlWords, spreaderWords } from "./fleet-words.ts";
import { TruckFormSchema, type TypedMaterial } from "./truck-form-schema.ts";

type Props = {
  truck: TruckFacts | null;
  version: string;
  materials: readonly { id: number; name: string }[];
  typedMaterials: readonly TypedMaterial[];
  ownerId: number;
  isDirector: boolean;
  today: string;
  reply: SubmissionResult<string[]> | undefined;
  /** Errors of the dates beside the materials, by material. */
  sinceErrors: Readonly<Record<string, string>>;
  button: string;
  backTo: string;
};

function shown(value: number | null | undefined) {
  return value === null || value === undefined ? "" : String(value);
}

function startValues(truck: TruckFacts | null, version: string) {
  return {
    version,
    unitNumber: truck?.unitNumber ?? "",
    body: truck?.body ?? "",
    spreaderKind: truck?.spreaderKind ?? "",
    control: truck?.control ?? "",
    lanesPerPass: shown(truck?.lanesPerPass ?? 1),
    workingSpeedMph: shown(truck?.workingSpeedMph),
    workingSetting: shown(truck?.workingSetting),
    workingRpm: shown(truck?.workingRpm),
    gateMaxIn: truck?.gateMaxIn == null ? "" : exactInches(truck.gateMaxIn),
    capacityTons: shown(truck?.capacityTons),
    isInService: truck === null || truck.isInService ? "yes" : "",
  };
}

/** As a fraction when that says it exactly, so that saving the form unchanged changes nothing. */
function exactInches(inches: number) {
  return Number.isInteger(inches * 16) ? formatInches(inches) : String(inches);
}

/** The form of one truck, new or known. */
export function TruckForm(props: Props) {
  const { truck, version, ownerId, isDirector, reply, sinceErrors, button, backTo } = props;
  const isSending = useNavigation().formMethod === "POST";
  const [form, fields] = useForm({
    lastResult: reply,
    defaultValue: startValues(truck, version),
    onValidate: ({ formData }) => parseWithZod(formData, { schema: TruckFormSchema }),
    shouldRevalidate: "onBlur",
  });
  const errors = [
    ...(form.errors ?? []).map((message) => ({ message })),
    ...Object.values(fields).flatMap((field) =>
      (field.errors ?? []).map((message: string) => ({ fieldId: field.id, message })),
    ),
    ...Object.entries(sinceErrors).map(([id, message]) => ({ fieldId: `since-${id}`, message })),
  ];
  return (
    <>
      {reply !== undefined && errors.length > 0 && <ErrorSummary key={JSON.stringify(reply)} errors={errors} />}
      <KeptForm formKey="truck" ownerId={ownerId} method="post" {...getFormProps(form)} noValidate>
        <input type="hidden" name="version" value={version} />
        <Heading>The truck and its spreader</Heading>
        <div className="grid gap-5 md:grid-cols-2">
          <TextField {...fieldWords(fields.unitNumber)} label="Unit number" autoComplete="off" />
          <TextField {...fieldWords(fields.body)} label="Body" hint="As in 8-yard hopper." isOptional />
          <SelectField
            {...fieldWords(fields.spreaderKind)}
            label="Spreader"
            prompt="choose the spreader"
            choices={spreaderKinds.map((value) => ({ value, label: spreaderWords[value] }))}
          />
          <SelectField
            {...fieldWords(fields.control)}
            label="Control"
            hint="Ground-speed: a controller keeps the rate while the speed changes."
            prompt="choose the control"
            choices={controlKinds.map((value) => ({ value, label: controlWords[value] }))}
          />
          <NumberField
            {...fieldWords(fields.gateMaxIn)}
            label="Widest gate opening"
            unit="in"
            hint="Measured from the bed to the gate’s lower edge; 4 1/2 is taken."
            isOptional
          />
          <NumberField {...fieldWords(fields.capacityTons)} label="Load" unit="tons" isOptional />
        </div>
        <Heading>Where it works</Heading>
        <div className="grid gap-5 md:grid-cols-2">
          <NumberField {...fieldWords(fields.workingSpeedMph)} label="Working speed" unit="mph" />
          <NumberField {...fieldWords(fields.workingSetting)} label="Working setting" hint="Of the feed control." />
          <NumberField {...fieldWords(fields.lanesPerPass)} label="Lanes spread in one pass" />
          <NumberField
            {...fieldWords(fields.workingRpm)}
            label="Engine speed"
            unit="rpm"
            hint="While spreading; counts are taken at it."
            isOptional
          />
        </div>
        <Materials {...props} />
        <Heading>In service</Heading>
        {isDirector ? (
          <CheckField
            id={fields.isInService.id}
            name={fields.isInService.name}
            value="yes"
            defaultChecked={fields.isInService.initialValue === "yes"}
            label="This truck is in service"
            hint="A truck out of service is never due and counts in no figure; its calibrations are kept."
          />
        ) : (
          <p className="text-gravel">
            {truck === null || truck.isInService ? "In service." : "Out of service."} The director changes this.
          </p>
        )}
        <div className="mt-8 flex flex-wrap items-center gap-x-5 gap-y-3">
          <Button busy={isSending && "Saving"}>{button}</Button>
          <TextLink to={backTo}>{truck === null ? "Back to the fleet" : "Leave it as it is"}</TextLink>
        </div>
      </KeptForm>
    </>
  );
}

function Materials({ materials, typedMaterials, sinceErrors, today }: Props) {
  return (
    <>
      <Heading>What it carries</Heading>
      {materials.length === 0 && <p className="text-gravel">The town has no materials yet.</p>}
      <ul className="max-w-answer">
        {materials.map(({ id, name }) => {
          const typed = typedMaterials.find(({ materialId }) => materialId === id);
          return (
            <li key={id} className="grid gap-x-6 border-b border-rule py-2 sm:grid-cols-2">
              <CheckField
                name={`material-${id}`}
                value="yes"
                defaultChecked={typed?.isCarried === true}
                label={<b>{sentenceStart(name)}</b>}
              />
              <TextField
                name={`since-${id}`}
                type="date"
                max={today}
                label={
                  <span className="text-note font-normal text-gravel">
                    new, or from a new supplier, since<span className="sr-only">: {name}</span>
                  </span>
                }
                defaultValue={typed?.since ?? ""}
                error={sinceErrors[String(id)] ?? null}
              />
            </li>
          );
        })}
      </ul>
      <p className="mt-2 text-note text-gravel">
        A day here makes every earlier calibration with that material due. Leave it empty while nothing has changed.
      </p>
    </>
  );
}
