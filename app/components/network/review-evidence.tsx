import { OwnSeasons } from "#app/components/season/own-seasons.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Form } from "react-router";

type Props = {
  figureId: number;
  version: number;
  townName: string;
  seasons: readonly { seasonStartYear: number; tonsPerLaneMile: number }[];
  /** Further findings, after the one that stands above. */
  others: readonly string[];
  draftedQuestion: string;
};

/** The most doubtful season with its evidence and the decision, in the queue itself. */
export function ReviewEvidence({ figureId, version, townName, seasons, others, draftedQuestion }: Props) {
  return (
    <div className="grid gap-x-10 gap-y-5 font-normal md:grid-cols-2">
      <div>
        <OwnSeasons title={`${townName}’s own seasons, tons of salt per lane mile`} seasons={seasons} isDoubtful />
        {others.length > 0 && <p className="mt-2 text-note text-gravel">Also: {others.join(" ")}</p>}
      </div>
      <Form method="post" action={`/network/review/${figureId}`} className="grid content-start gap-3">
        <input type="hidden" name="version" value={version} />
        <TextArea
          name="note"
          label="Question that goes back with it"
          defaultValue={draftedQuestion}
          maxLength={2000}
          rows={3}
        />
        <div className="flex flex-wrap items-center gap-x-5 gap-y-2">
          <Button name="verdict" value="return">
            Send it back
          </Button>
          <TextLink to={`/network/review/${figureId}`} weight="bold" className="inline-flex min-h-target items-center">
            Look closer<span className="sr-only"> at {townName}</span>, ask, or accept it as it is
          </TextLink>
        </div>
      </Form>
    </div>
  );
}
