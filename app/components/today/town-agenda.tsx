import { FleetTable, type FleetLine } from "#app/components/fleet/fleet-table.tsx";
import { Answer } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Agenda, type AgendaItem } from "#app/components/ui/agenda.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { MarginSection, WithMargin } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { seasonLabel } from "#app/domain/dates.ts";
import { formatDay, formatShortDay } from "#app/lib/format.ts";
import { countWords, listWords, sentenceStart } from "#app/lib/words.ts";

type Props = {
  isDirector: boolean;
  today: string;
  season: {
    seasonStartYear: number;
    figuresDueOn: string;
    figure: { state: "draft" | "sent" | "returned" | "accepted"; reviewNote: string | null } | null;
  } | null;
  readyCount: number;
  fleet: readonly FleetLine[];
  due: readonly { truckId: number; unitNumber: string; materialName: string; isOverdue: boolean }[];
  edition: { id: number; seasonStartYear: number; number: number; publishedAt: string } | null;
};

type Step = Omit<AgendaItem, "action"> & { button: string; sentence: string };

function seasonStep({ season, isDirector, today }: Props): Step | null {
  if (!season) return null;
  const label = seasonLabel(season.seasonStartYear);
  const to = `/season/${season.seasonStartYear}`;
  const isLate = season.figuresDueOn < today;
  const due = isLate ? `they were due ${formatDay(season.figuresDueOn)}` : `due ${formatDay(season.figuresDueOn)}`;
  const when = isLate ? "Now" : `By ${formatShortDay(season.figuresDueOn)}`;
  const key = "season";
  switch (season.figure?.state) {
    case undefined:
      return {
        key,
        when,
        whenDetail: "10 minutes",
        title: `Put in the figures of ${label}`,
        to: "/uploads?kind=season-figures",
        button: "Upload the figures",
        children: `One row of a spreadsheet is enough; ${due}.`,
        sentence: `The figures of ${label} are missing.`,
      };
    case "returned":
      return {
        key,
        when: "Now",
        whenDetail: "10 minutes",
        title: `Answer the coordinator about ${label}`,
        to,
        button: "Open the season",
        children: season.figure?.reviewNote ?? "",
        sentence: `The coordinator has a question about ${label}.`,
      };
    case "draft":
      return {
        key,
        when,
        whenDetail: "5 minutes",
        title: isDirector ? `Look over ${label} and send it in` : `${label} waits for the director`,
        to,
        button: isDirector ? "Look it over" : "Open the season",
        children: isDirector
          ? `The figures are in; ${due}.`
          : "The figures are in. The director looks them over and sends them.",
        sentence: isDirector ? `${label} is ready for you to send in.` : `${label} is in and waits for the director.`,
      };
    default:
      return null;
  }
}

function fleetSteps({ due, readyCount, isDirector }: Props): Step[] {
  const steps: Step[] = [];
  if (readyCount > 0 && isDirector) {
    steps.push({
      key: "approve",
      when: "Now",
      whenDetail: "5 minutes",
      to: "/fleet",
      button: "Look at them",
      title: `Approve ${countWords(readyCount, "calibration", "calibrations")}`,
      children: "They have been weighed and wait for you. What you approve is what counts for the truck.",
      sentence: `${sentenceStart(countWords(readyCount, "calibration waits", "calibrations wait"))} for you.`,
    });
  }
  const units = [...new Set(due.map((line) => line.unitNumber))];
  if (units.length > 0) {
    const overdue = new Set(due.filter((line) => line.isOverdue).map((line) => line.unitNumber)).size;
    const late = `${sentenceStart(countWords(overdue, "is", "are"))} overdue: the season opened on 1 November. `;
    const materials = [...new Set(due.map((line) => line.materialName.toLowerCase()))];
    steps.push({
      key: "due",
      when: overdue > 0 ? "Now" : "This week",
      whenDetail: "20 minutes each",
      to: "/fleet/due",
      button: "See what is due",
      title: `Calibrate ${units.length === 1 ? "truck" : "trucks"} ${listWords(units)} for ${listWords(materials)}`,
      children: `${overdue > 0 ? late : ""}Each truck is weighed once before the season, and again after work on gate, hydraulics, feed or controller.`,
      sentence: `${sentenceStart(countWords(units.length, "truck is", "trucks are"))} due for calibration.`,
    });
  }
  return steps;
}

function editionStep({ edition }: Props): Step | null {
  if (!edition) return null;
  const label = `${seasonLabel(edition.seasonStartYear)}, edition ${edition.number}`;
  return {
    key: "edition",
    when: "When you like",
    whenDetail: `since ${formatShortDay(edition.publishedAt.slice(0, 10))}`,
    to: "/peers",
    title: `Read where you stand in ${label}`,
    button: "Open Peers",
    children: "Your own place among towns like yours. Nobody else sees it.",
    sentence: `Edition ${edition.number} of ${seasonLabel(edition.seasonStartYear)} shows where you stand.`,
  };
}

/** What waits for a town, in the order to do it. */
export function TownAgenda(props: Props) {
  const steps = [seasonStep(props), ...fleetSteps(props), editionStep(props)].filter((step) => step !== null);
  const answer = steps
    .slice(0, 2)
    .map((step) => step.sentence)
    .join(" ");
  return (
    <Page>
      <Answer>{answer === "" ? "Nothing waits for you." : answer}</Answer>
      <WithMargin
        margin={
          <>
            <MarginSection title={formatDay(props.today)}>
              <p className="mt-1">
                <TextLink to="/fleet">All trucks</TextLink>, <TextLink to="/uploads">all uploads</TextLink>
              </p>
            </MarginSection>
            {props.fleet.length > 0 && (
              <MarginSection title="Salt in the fleet, lb per lane mile">
                <FleetTable lines={props.fleet} />
              </MarginSection>
            )}
          </>
        }
      >
        {steps.length === 0 ? (
          <EmptyState title="The road is clear">
            Trucks that fall due, seasons to send in and new editions stand here in the order to do them.
          </EmptyState>
        ) : (
          <Agenda
            items={steps.map(({ button, sentence: _sentence, ...step }, position) => ({
              ...step,
              ...(position === 0 && step.to !== undefined
                ? { action: <ButtonLink to={step.to}>{button}</ButtonLink> }
                : {}),
            }))}
          />
        )}
      </WithMargin>
    </Page>
  );
}
