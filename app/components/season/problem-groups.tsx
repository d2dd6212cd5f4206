import { Form } from "react-router";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { NameRepair } from "./name-repair.tsx";
import type { ProblemGroupView, RepairProps } from "./problem-view.ts";
import { RowRepair } from "./row-repair.tsx";

const heads: Record<string, (rows: string, isOne: boolean) => string> = {
  "unknown-truck": (rows, isOne) => `${rows} ${isOne ? "names" : "name"} a truck that is not in the fleet list`,
  "unknown-material": (rows, isOne) => `${rows} ${isOne ? "names" : "name"} a material the town does not have`,
  "unknown-kind": (rows, isOne) => `${rows} ${isOne ? "names" : "name"} a kind of storm that is not known here`,
  "tons-or-pounds": (rows) => `${rows} may be in pounds where the column says tons`,
  "season-not-open": (rows, isOne) => `${rows} ${isOne ? "lies" : "lie"} in a season that is not open`,
  "season-sent": (rows, isOne) => `${rows} ${isOne ? "is" : "are"} of a season that has been sent in`,
  "outside-season": (rows, isOne) => `${rows} ${isOne ? "lies" : "lie"} outside the season’s dates`,
  twice: (rows, isOne) => `${rows} ${isOne ? "says" : "say"} what another one says, too`,
  "totals-row": (rows, isOne) => `${rows} ${isOne ? "looks" : "look"} like a total`,
  "other-town": (rows, isOne) => `${rows} ${isOne ? "is" : "are"} of another town`,
  single: (rows) => `${rows} to look at, one by one`,
  "no-material": (rows, isOne) => `${rows} ${isOne ? "gives" : "give"} no material`,
};

const kindLabels: Record<string, string> = {
  "unknown-truck": "truck not known",
  "unknown-material": "material not known",
  "unknown-kind": "kind of storm not known",
  "tons-or-pounds": "tons or pounds?",
  "not-a-date": "not a day",
  "has-zone": "time with a zone",
  "not-a-time": "not a time of day",
  "season-not-open": "season not open",
  "season-sent": "season sent in already",
  "outside-season": "outside the season",
  future: "in the future",
  twice: "the same twice",
  "totals-row": "a row of totals",
  "other-town": "another town",
  "no-material": "no material given",
  "not-a-number": "not a number",
  ambiguous: "number in another style",
  negative: "below zero",
  absurd: "too large to be",
  "very-heavy": "more than trucks carry",
  "very-dense": "very much on a lane mile",
  "very-long": "a very long storm",
  "ends-before": "ends before it begins",
  blank: "left blank",
  "unknown-unit": "unit not known",
  "other-unit": "another sort of unit",
  single: "one by one",
  "long-text": "long text",
  "weather-units": "the file’s units",
  formulas: "formulas",
  "extra-columns": "columns not used",
};

/** A short name of a group, for the list beside them. */
export function kindLabel({ code, columnName }: ProblemGroupView): string {
  return kindLabels[code] ?? `${code.replaceAll("-", " ")}${columnName === null ? "" : `: ${columnName}`}`;
}

/** What a group is about, as its head. */
export function groupTitle({ code, columnName, rowCount, rows }: ProblemGroupView): string {
  if (rows[0]?.sheetRow === 0) return "The file as a whole";
  const words = sentenceStart(countWords(rowCount, "row", "rows"));
  const head = heads[code];
  if (head) return head(words, rowCount === 1);
  return columnName === null ? words : `${words}, column “${columnName}”`;
}

function GroupAnswer({ group, intent, children }: { group: ProblemGroupView; intent: string; children: string }) {
  return (
    <Form method="post" preventScrollReset>
      <input type="hidden" name="code" value={group.code} />
      <input type="hidden" name="field" value={group.field} />
      <Button variant="quiet" size="slim" name="intent" value={intent}>
        {children}
      </Button>
    </Form>
  );
}

/** One sort of problem: what it is, what settles all its rows at once, and the rows one by one. */
export function ProblemGroup(props: RepairProps & { canLeaveOut: boolean; isShowingMany: boolean }) {
  const { uploadId, group, canLeaveOut, isShowingMany } = props;
  const isWholeFile = group.rows[0]?.sheetRow === 0;
  const all = group.rowCount === 1 ? "it" : `all ${group.rowCount.toLocaleString("en-US")}`;
  return (
    <section id={group.key} aria-labelledby={`${group.key}-head`} className="border-t-2 border-line pt-2.5 pb-7">
      <h2 id={`${group.key}-head`} className="text-l leading-snug font-semibold">
        {groupTitle(group)}
      </h2>
      {group.names !== null ? (
        <>
          <p className="mt-0.5 text-gravel">
            Say once what a name means; every row with it follows, now and in your next file.
          </p>
          <NameRepair {...props} />
        </>
      ) : (
        group.message !== null && <p className="mt-0.5 max-w-method text-pretty text-gravel">{group.message}</p>
      )}
      {!isWholeFile && group.names === null && <RowRepair {...props} />}
      {group.names === null && !isWholeFile && group.rowCount > group.rows.length && !isShowingMany && (
        <p className="mt-2">
          <TextLink to={`/uploads/${uploadId}?show=${group.key}#${group.key}`}>
            Show the other {(group.rowCount - group.rows.length).toLocaleString("en-US")}
          </TextLink>
        </p>
      )}
      {isShowingMany && group.rowCount > group.rows.length && (
        <p className="mt-2 text-note text-gravel">
          {(group.rowCount - group.rows.length).toLocaleString("en-US")} more are in the list you can download.
        </p>
      )}
      <div className="mt-3 flex flex-wrap gap-x-3 gap-y-2">
        {group.code === "tons-or-pounds" && (
          <GroupAnswer group={group} intent="as-pounds">{`Read ${all} as pounds`}</GroupAnswer>
        )}
        {group.severity === "check" && group.names === null && group.code !== "single" && (
          <GroupAnswer group={group} intent="stands">
            {isWholeFile
              ? "That is right"
              : group.rowCount === 1
                ? "It is right as it stands"
                : `All ${group.rowCount.toLocaleString("en-US")} are right as they stand`}
          </GroupAnswer>
        )}
        {group.severity === "check" && group.names !== null && (
          <GroupAnswer group={group} intent="stands">
            Count them as “other”
          </GroupAnswer>
        )}
        {!isWholeFile && canLeaveOut && <GroupAnswer group={group} intent="left-out">{`Leave ${all} out`}</GroupAnswer>}
      </div>
    </section>
  );
}
