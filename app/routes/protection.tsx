import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { visitorContext } from "#app/context.ts";
import { defaultPolicy } from "#app/domain/disclosure/policy.ts";
import type { Route } from "./+types/protection";

export function loader({ context }: Route.LoaderArgs) {
  const { kMin, intervalFrom, quartilesFrom, decilesFrom, minimumDifference, townsPerBin, roundingBaseLb, rowFile } =
    defaultPolicy;
  return {
    isSignedIn: context.get(visitorContext) !== null,
    limits: { kMin, intervalFrom, quartilesFrom, decilesFrom, minimumDifference, townsPerBin, roundingBaseLb, rowFile },
  };
}

export const meta: Route.MetaFunction = () => [{ title: "How towns are protected · Commonweigh" }];

export default function Protection({ loaderData: { limits, isSignedIn } }: Route.ComponentProps) {
  const { kMin, intervalFrom, quartilesFrom, decilesFrom, minimumDifference, townsPerBin, roundingBaseLb, rowFile } =
    limits;
  return (
    <Page hasBottomBar={isSignedIn}>
      <Answer>
        No figure of one town is ever shown to another: a peer group is shown only when at least {kMin.member} towns
        stand in it together.
      </Answer>
      <Method>
        What towns see of each other is an edition: computed once from accepted figures, protected by the rules below,
        frozen, and never changed. A later correction goes into a later edition, or none.
      </Method>
      <Heading>What is shown, and from how many towns</Heading>
      <Timetable
        caption="Fewest towns behind each figure"
        isCaptionHidden
        columns={[
          { key: "what", label: "figure" },
          { key: "screen", label: "to a member", isNumeric: true },
          { key: "wall", label: "on a wall", isNumeric: true },
          { key: "file", label: "in a download", isNumeric: true },
        ]}
        rows={[
          { key: "median", cells: { what: "median", screen: kMin.member, wall: kMin.wall, file: kMin.download } },
          {
            key: "interval",
            cells: { what: "where the median likely lies", screen: intervalFrom, wall: "never", file: "never" },
          },
          {
            key: "quartiles",
            cells: { what: "middle half", screen: quartilesFrom, wall: quartilesFrom, file: quartilesFrom },
          },
          {
            key: "heaps",
            cells: { what: "heaps of dots", screen: quartilesFrom, wall: "bars of about three", file: "never" },
          },
          {
            key: "tenths",
            cells: { what: "lowest and highest tenth", screen: decilesFrom, wall: "never", file: "never" },
          },
          { key: "ends", cells: { what: "smallest and largest", screen: "never", wall: "never", file: "never" } },
        ]}
      />
      <Heading>How</Heading>
      <ul className="max-w-method list-disc space-y-2 pl-5">
        <li>Figures are rounded to {roundingBaseLb} lb, so that none of them can be taken for a town’s own.</li>
        <li>
          Dots are counts in bins of at least {townsPerBin} towns; the outermost bins are open and say nothing of the
          extreme.
        </li>
        <li>
          Two groups that can be compared differ by nobody, or by at least {minimumDifference} towns on each side:
          subtracting one from the other tells nothing of one town. The same holds between editions.
        </li>
        <li>Towns whose figures come from one office count as one.</li>
        <li>On a wall and in a download the number of towns is given as a band.</li>
        <li>
          Single rows are given out only from networks of {rowFile.networkMin} towns and more, averaged over at least{" "}
          {rowFile.k} alike, shuffled, named anew, and once a season.
        </li>
        <li>A hidden figure says why in one of three words, never how close it was.</li>
      </ul>
      <Heading>What this does not do</Heading>
      <p className="max-w-method text-pretty">
        A town’s own figures may be public records in its state, whoever else keeps them. What is promised here is what
        this service does: it shows a town’s figures to that town and to the coordinator who reviews them.
      </p>
    </Page>
  );
}
