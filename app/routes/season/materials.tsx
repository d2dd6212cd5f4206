import { data, Form, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField, TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { materialKindWords, readMaterialChange, readNewMaterial } from "#app/components/season/material-form.ts";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { townActor } from "#app/context.ts";
import { materialKinds } from "#app/domain/calibration/band.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { notFound } from "#app/lib/errors.ts";
import { formatShare } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { addMaterial, changeMaterial, listMaterials } from "#app/services/materials.server.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/materials";

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const asked = url.searchParams.get("season");
  const [view, workingYear] = await Promise.all([listMaterials(actor), workingSeason()]);
  const seasonStartYear = asked === null ? workingYear : seasonParam(asked);
  if (seasonStartYear === null || !view.seasonStartYears.includes(seasonStartYear)) throw notFound("season");
  return { ...view, seasonStartYear, userId: actor.userId, isDirector: actor.role === "director" };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const values = formTexts(await readForm(request));
  const season = seasonParam(values.seasonStartYear);
  if (values.intent === "add") {
    const reading = readNewMaterial(values);
    if (!reading.ok) return data({ errors: reading.errors, values }, { status: 400 });
    if (!(await addMaterial(actor, reading.material))) {
      return data({ errors: { name: "You have a material of that name already." }, values }, { status: 409 });
    }
  } else {
    const materialId = idParam(values.materialId, "material");
    const reading = readMaterialChange(values, materialId);
    if (!reading.ok) return data({ errors: reading.errors, values }, { status: 400 });
    await changeMaterial(actor, materialId, { ...reading.change, seasonStartYear: season });
  }
  return redirect(`/season/materials?season=${season}`);
}

export const meta: Route.MetaFunction = () => [{ title: "Materials · Commonweigh" }];

function plain(value: number | null, divisor: number) {
  return value === null ? "" : String(Number((value / divisor).toFixed(2)));
}

export default function Materials({ loaderData, actionData }: Route.ComponentProps) {
  const { materials, seasonStartYears, seasonStartYear, userId, isDirector } = loaderData;
  const label = seasonLabel(seasonStartYear);
  const errors: Record<string, string> = actionData?.errors ?? {};
  const values: Record<string, string> = actionData?.values ?? {};
  const salt = materials.find(({ kind }) => kind === "salt");
  const price =
    salt?.prices.find((each) => each.seasonStartYear === seasonStartYear)?.centsPerTon ??
    salt?.usualCentsPerTon ??
    null;
  return (
    <Page>
      <Answer>
        {price === null
          ? `What you spread, and what it costs in ${label}`
          : `A ton of salt costs you $${plain(price, 100)} in ${label}.`}
      </Answer>
      <Method>
        The season’s cost takes what deliveries were paid at where they carry a price, and this price otherwise. Salt in
        a mix is by weight.
      </Method>
      <SeasonPages seasonStartYear={seasonStartYear} />
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      <div className="border-t-2 border-line">
        {materials.map(({ id, name, kind, saltShare, usualCentsPerTon, prices }) => {
          const own = prices.find((each) => each.seasonStartYear === seasonStartYear)?.centsPerTon ?? null;
          const isBack = values.materialId === String(id);
          return (
            <Form
              key={`${id} ${own} ${saltShare} ${seasonStartYear}`}
              method="post"
              className="grid items-end gap-x-6 gap-y-3 border-b border-rule py-4 sm:grid-cols-[12rem_12rem_14rem_auto]"
            >
              <input type="hidden" name="materialId" value={id} />
              <input type="hidden" name="seasonStartYear" value={seasonStartYear} />
              <div className="self-center">
                <h2 className="text-head font-bold">{name}</h2>
                <p className="text-note text-gravel">
                  {materialKindWords[kind]}
                  {!isDirector && `, ${formatShare(saltShare)} salt`}
                </p>
              </div>
              {isDirector ? (
                <>
                  <NumberField
                    name="saltPercent"
                    id={`salt-${id}`}
                    label="Salt in it"
                    unit="%"
                    error={errors[`salt-${id}`]}
                    defaultValue={isBack ? (values.saltPercent ?? "") : plain(saltShare, 0.01)}
                  />
                  <NumberField
                    name="usdPerTon"
                    id={`price-${id}`}
                    label={`Price in ${label}`}
                    unit="$ a ton"
                    placeholder={usualCentsPerTon === null ? "" : plain(usualCentsPerTon, 100)}
                    error={errors[`price-${id}`]}
                    defaultValue={isBack ? (values.usdPerTon ?? "") : plain(own, 100)}
                  />
                  <div>
                    <Button variant="quiet">
                      Save<span className="sr-only"> {name}</span>
                    </Button>
                  </div>
                </>
              ) : (
                <p className="self-center">{own === null ? "no price of its own" : `$${plain(own, 100)} a ton`}</p>
              )}
            </Form>
          );
        })}
      </div>
      {isDirector && (
        <section>
          <Heading>Add a material</Heading>
          <KeptForm key={materials.length} formKey="material" ownerId={userId} method="post" className="grid gap-5">
            <input type="hidden" name="seasonStartYear" value={seasonStartYear} />
            <div className="grid gap-x-8 gap-y-5 sm:grid-cols-3">
              <TextField name="name" label="Name" maxLength={60} error={errors.name} defaultValue={values.name ?? ""} />
              <SelectField
                name="kind"
                label="Kind"
                error={errors.kind}
                defaultValue={values.kind ?? ""}
                prompt="choose a kind"
                choices={materialKinds.map((kind) => ({ value: kind, label: materialKindWords[kind] }))}
              />
              <NumberField
                name="saltPercent"
                label="Salt in it"
                unit="%"
                hint="By weight: 100 for salt, 0 for clean sand, 23.3 for brine."
                error={errors.saltPercent}
                defaultValue={values.materialId === undefined ? (values.saltPercent ?? "") : ""}
              />
            </div>
            <div>
              <Button name="intent" value="add">
                Add it
              </Button>
            </div>
          </KeptForm>
        </section>
      )}
      <SeasonSwitch
        seasonStartYears={seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/season/materials?season=${year}`}
      />
    </Page>
  );
}
