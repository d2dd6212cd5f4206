import { data, Link, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import {
  type FigureAmounts,
  figureFormFields,
  type FigureFormValues,
  figureFormValues,
  readFigureForm,
} from "#app/components/season/figure-form.ts";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { countWords, listWords } from "#app/lib/words.ts";
import { getSeason } from "#app/services/season-figures.server.ts";
import { saveDraft } from "#app/services/season-figures/draft.server.ts";
import { figureHistory } from "#app/services/season-figures/history.server.ts";
import type { Route } from "./+types/figures";

export async function loader({ context, params, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const { figure, basis, otherSeasons } = await getSeason(actor, seasonStartYear);
  const history = figure ? await figureHistory(figure.id) : null;
  const returnedVersion = history?.notes.at(-1)?.version;
  const typed: FigureAmounts | null = figure && {
    ...figure.amounts,
    wettedSaltLb: figure.extras.wettedSaltLb,
  };
  const fromLog: FigureAmounts = { ...basis.draft, wettedSaltLb: figure?.extras.wettedSaltLb ?? null };
  const last = otherSeasons.find((other) => other.seasonStartYear < seasonStartYear);
  return {
    seasonStartYear,
    userId: actor.userId,
    state: figure?.state ?? null,
    version: figure?.version ?? null,
    typed: typed && figureFormValues(typed),
    fromLog: figureFormValues(fromLog),
    last: last && {
      label: seasonLabel(last.seasonStartYear),
      values: figureFormValues({ ...last.amounts, wettedSaltLb: last.extras.wettedSaltLb }),
    },
    isTaken: url.searchParams.get("take") === "log",
    stormCount: basis.draft.eventCount,
    fromPiles: basis.draft.fromPiles,
    withoutPrice: basis.draft.withoutPrice,
    notes:
      figure?.state === "returned" ? (history?.notes.filter(({ version }) => version === returnedVersion) ?? []) : [],
  };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const values = formTexts(await readForm(request));
  const reading = readFigureForm(values);
  if (!reading.ok) return data({ errors: reading.errors, refusal: null, values }, { status: 400 });
  const version = values.version ? idParam(values.version, "version of these figures") : null;
  const saved = await saveDraft(actor, seasonStartYear, { version, ...reading });
  if (!saved.ok) return data({ errors: {}, refusal: saved.refusal, values }, { status: 409 });
  return redirect(`/season/${seasonStartYear}`);
}

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Figures of ${seasonLabel(Number(params.seasonStartYear))} · Commonweigh` },
];

function sameCount(typed: FigureFormValues, fromLog: FigureFormValues) {
  return figureFormFields.filter(({ name }) => fromLog[name] !== "" && typed[name] !== fromLog[name]).length;
}

function sentence({ seasonStartYear, typed, fromLog, stormCount }: Route.ComponentProps["loaderData"]) {
  const label = seasonLabel(seasonStartYear);
  if (typed === null) {
    return stormCount === 0
      ? `Type the figures of ${label}, or let them follow from storms and stock.`
      : `Storms and stock have the figures of ${label} ready to be taken over.`;
  }
  const different = sameCount(typed, fromLog);
  if (stormCount === 0)
    return `The figures of ${label} were typed or uploaded; there is no storm log to hold them against.`;
  return different === 0
    ? `The figures of ${label} agree with storms and stock.`
    : `${countWords(different, "figure", "figures")} of ${label} ${different === 1 ? "differs" : "differ"} from storms and stock.`.replace(
        /^./,
        (sign) => sign.toUpperCase(),
      );
}

export default function Figures({ loaderData, actionData }: Route.ComponentProps) {
  const { seasonStartYear, userId, state, version, typed, fromLog, last, isTaken, notes, withoutPrice } = loaderData;
  const isOpen = state !== "sent" && state !== "accepted";
  const errors: Record<string, string> = actionData?.errors ?? {};
  const sentBack: Record<string, string> | undefined = actionData?.values;
  const shown: Record<string, string> = sentBack ?? (isTaken ? { ...typed, ...nonBlank(fromLog) } : (typed ?? {}));
  const figures = `/season/${seasonStartYear}/figures`;
  return (
    <Page>
      <Answer>{sentence(loaderData)}</Answer>
      <Method>
        Used is what left the piles where both ends were measured
        {loaderData.fromPiles.length > 0 && ` (${listWords(loaderData.fromPiles.map((name) => name.toLowerCase()))})`},
        and otherwise what the storm log says.
        {withoutPrice.length > 0 &&
          ` The cost is not known: ${listWords(withoutPrice)} ${withoutPrice.length === 1 ? "has" : "have"} no price.`}
      </Method>
      <SeasonPages seasonStartYear={seasonStartYear} />
      {!isOpen && (
        <Notice title={`${seasonLabel(seasonStartYear)} has been sent in.`}>
          Its figures stand as they were sent.
        </Notice>
      )}
      {isTaken && actionData === undefined && (
        <Notice title="Taken over from storms and stock.">Nothing is stored until you save.</Notice>
      )}
      {actionData?.refusal != null && <Notice tone="problem" title={actionData.refusal} />}
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      {/* The key makes the fields anew when they are filled from elsewhere. */}
      <KeptForm key={`${version ?? 0} ${isTaken}`} formKey="figures" ownerId={userId} method="post" action={figures}>
        <input type="hidden" name="version" value={version ?? ""} />
        <div
          aria-hidden="true"
          className="hidden gap-x-8 pb-1 text-table font-semibold sm:grid sm:grid-cols-[minmax(0,20rem)_9rem_9rem]"
        >
          <span>as reported</span>
          <span className="text-right">storms and stock</span>
          <span className="text-right">{last?.label ?? "season before"}</span>
        </div>
        <div className="border-t-2 border-line">
          {figureFormFields.map(({ name, label, ...rest }) => {
            const unit = "unit" in rest ? rest.unit : undefined;
            const note = notes.find(({ field }) => field === name)?.note;
            return (
              <div
                key={name}
                className="grid items-start gap-x-8 gap-y-1 border-b border-rule py-3 sm:grid-cols-[minmax(0,20rem)_9rem_9rem]"
              >
                <NumberField
                  name={name}
                  label={label}
                  {...(unit === undefined ? {} : { unit })}
                  isOptional={"isOptional" in rest}
                  defaultValue={shown[name] ?? ""}
                  error={errors[name]}
                  disabled={!isOpen}
                  {...(note === undefined ? {} : { hint: `The coordinator asks: ${note}` })}
                />
                <Beside head="storms and stock" value={fromLog[name]} isOther={differs(typed?.[name], fromLog[name])} />
                <Beside head={last?.label ?? "season before"} value={last?.values[name] ?? ""} isOther={false} />
              </div>
            );
          })}
        </div>
        {isOpen && (
          <div className="mt-5 flex flex-wrap items-center gap-x-6 gap-y-2">
            <Button>Save the figures</Button>
            <Link
              to={`${figures}?take=log`}
              preventScrollReset
              className="inline-flex min-h-target items-center rounded-field border-[1.5px] border-spruce px-5 font-semibold text-spruce no-underline hover:bg-spruce-wash"
            >
              Fill from storms and stock
            </Link>
            <TextLink to="/uploads?kind=season-figures" weight="bold">
              Upload them
            </TextLink>
          </div>
        )}
      </KeptForm>
    </Page>
  );
}

function nonBlank(values: Record<string, string>) {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== ""));
}

function differs(typed: string | undefined, other: string) {
  return typed !== undefined && other !== "" && typed !== other;
}

/** A figure beside the field, to compare with. */
function Beside({ head, value, isOther }: { head: string; value: string; isOther: boolean }) {
  return (
    <p className="text-table sm:text-right">
      <span className="text-gravel sm:sr-only">{head}</span>{" "}
      <span
        className={`tabular-nums sm:mt-7 sm:flex sm:min-h-target sm:items-center sm:justify-end ${isOther ? "font-bold text-rust" : ""}`}
      >
        {value === "" ? "–" : Number(value).toLocaleString("en-US")}
        {isOther && <span className="sr-only"> differs</span>}
      </span>
    </p>
  );
}
