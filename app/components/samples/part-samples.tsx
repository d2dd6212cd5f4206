import { Heading } from "#app/components/layout/answer.tsx";
import { NotForSharing } from "#app/components/layout/not-for-sharing.tsx";
import { Agenda, type AgendaItem } from "#app/components/ui/agenda.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { GroupSwitch } from "#app/components/ui/group-switch.tsx";
import { Kinds } from "#app/components/ui/kinds.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { Queue } from "#app/components/ui/queue.tsx";
import { MarginSection, SideBySide, WithMargin } from "#app/components/ui/side-by-side.tsx";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";

const agenda: readonly AgendaItem[] = [
  {
    key: "catch",
    when: "Now",
    whenDetail: "5 minutes",
    title: "Weigh one more catch on Truck 12",
    children: "Dell Farrow closed the gate to 1 11/16 in on Friday. The counts still stand; only the catch is missing.",
    action: <ButtonLink to="#now">Weigh the catch</ButtonLink>,
  },
  {
    key: "due",
    when: "This week",
    whenDetail: "20 minutes each",
    title: "Calibrate Trucks 4, 9 and 15 for salt",
    to: "#due",
    children: "Due before 1 November. Truck 9 had its feed motor changed on 2 September.",
  },
  {
    key: "edition",
    when: "When you like",
    whenDetail: "new since 28 Sept",
    title: "Read where you stand in 2025–26, edition 1",
    to: "#edition",
    children: "Your salt trucks lay 88 lb per lane mile more than the band at 25 mph.",
  },
];

const trucks = [
  { key: "4", truck: "4", rate: <Over isWordHidden>402</Over>, weighed: "due" },
  { key: "9", truck: "9", rate: null, weighed: "due" },
  { key: "11", truck: "11", rate: <InBand isWordHidden>286</InBand>, weighed: "5 Oct" },
  { key: "18", truck: "18", rate: <Under isWordHidden>231</Under>, weighed: "7 Oct" },
];

/** Every part that is neither a field nor a strip, in each of its states. */
export function PartSamples() {
  return (
    <>
      <Heading>Buttons</Heading>
      <div className="flex flex-wrap items-center gap-4">
        <Button type="button">Weigh the catch</Button>
        <Button type="button" variant="quiet">
          Read all 7 as pounds
        </Button>
        <Button type="button" busy="Reading row 96 of 214" />
        <Button type="button" notYet={{ reasonId: "not-yet" }}>
          Accept all 214
        </Button>
        <span id="not-yet" className="text-gravel">
          17 rows are still to be settled.
        </span>
        <TextLink to="#closer" weight="bold">
          Look closer
        </TextLink>
      </div>

      <Heading>States</Heading>
      <p className="flex flex-wrap gap-6">
        <Under>19 under the band</Under> <InBand>in the band</InBand> <Over>88 above the band</Over>
      </p>

      <Heading>Today, and a margin</Heading>
      <WithMargin
        margin={
          <MarginSection title="Salt in the fleet">
            <Timetable
              caption="Salt in the fleet by truck"
              isCaptionHidden
              onPhone="keep"
              columns={[
                { key: "truck", label: "truck" },
                { key: "rate", label: "lays", unit: "lb per lane mile", isNumeric: true },
                { key: "weighed", label: "weighed", isNumeric: true },
              ]}
              rows={trucks.map(({ key, ...cells }) => ({ key, cells }))}
            />
          </MarginSection>
        }
      >
        <Agenda items={agenda} />
      </WithMargin>

      <Heading>Notices</Heading>
      <Notice title="Sent on 17 August">
        The coordinator has it. Nothing changes now unless it comes back to you.
      </Notice>
      <Notice title="214 rows are in the season" tone="good">
        Your file is kept as it came.
      </Notice>
      <Notice title="This file could not be read" tone="problem">
        It has no line of column names. Nothing was stored. Put the names back in and send it again.
      </Notice>
      <NotForSharing />

      <Heading>Groups</Heading>
      <GroupSwitch
        label="Compare with"
        menu={{ action: "/components", name: "group", fields: {} }}
        choices={[
          { key: "all", label: "The whole region", townCountWords: "36", to: "?group=all", isCurrent: true },
          { key: "size", label: "100 to 199 lane miles", townCountWords: "15", to: "?group=size" },
          { key: "hill", label: "Hill roads", to: "?group=hill", hiddenReason: "too few towns" },
        ]}
      />

      <Heading>Kinds, and a timetable</Heading>
      <SideBySide
        side={
          <Kinds
            label="Rows by what they need"
            kinds={[
              { key: "truck", count: 5, label: "truck not known", detail: "9 more settled just now", isCurrent: true },
              { key: "tons", count: 7, label: "tons or pounds?", detail: "heavier than any truck", to: "#tons" },
              { key: "ready", count: 1197, label: "ready", isDone: true },
            ]}
          />
        }
      >
        <Timetable
          caption="Rows that may be in pounds where the column says tons"
          columns={[
            { key: "row", label: "row" },
            { key: "date", label: "date" },
            { key: "truck", label: "truck" },
            { key: "says", label: "file says", unit: "tons", isNumeric: true },
          ]}
          rows={[
            {
              key: "31",
              cells: { row: "31", date: "4 Dec 2025", truck: "Truck 7", says: <Over isWordHidden>9,400</Over> },
            },
            { key: "58", cells: { row: "58", date: "19 Dec 2025", truck: "Truck 14", says: "6.2" }, isOurs: true },
          ]}
        />
      </SideBySide>

      <Heading>Queue</Heading>
      <Queue
        items={[
          {
            key: "fallowmere",
            name: "Fallowmere",
            detail: "sent 17 Aug, 74 lane miles",
            why: "Salt per lane mile is 41.2 tons, about ten times its last three seasons. A decimal point may be missing.",
            to: "#fallowmere",
            open: (
              <p className="text-note text-gravel">Checks met: far outside its own history, far outside all towns.</p>
            ),
          },
          {
            key: "cairnfold",
            name: "Cairnfold",
            detail: "sent 19 Aug, 96 lane miles",
            why: "The salt pile grew: closing stock is 420 tons above opening plus received. A delivery is probably missing.",
            to: "#cairnfold",
          },
        ]}
      />

      <Heading>Nothing here yet</Heading>
      <EmptyState
        title="No storms in 2026–27 yet"
        action={
          <Button type="button" variant="quiet">
            Upload the storm log
          </Button>
        }
      >
        A storm is one stretch of plowing and spreading. Type it in after the trucks are back, or upload the log your
        office keeps.
      </EmptyState>
    </>
  );
}
