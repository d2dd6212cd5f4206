import { renderToStaticMarkup } from "react-dom/server";
import { MemoryRouter } from "react-router";
import { expect, test } from "vitest";
import { TopBar } from "#app/components/layout/top-bar.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { GroupSwitch } from "#app/components/ui/group-switch.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";

const areas = ["Today", "Fleet", "Season", "Peers", "Workshops", "Dataset"].map((label) => ({
  label,
  to: `/${label.toLowerCase()}`,
}));

function bar(path: string, notForSharing = false) {
  return renderToStaticMarkup(
    <MemoryRouter initialEntries={[path]}>
      <TopBar areas={areas} place="Quillbrook" period="2025–26" person="Maren Oake" notForSharing={notForSharing} />
    </MemoryRouter>,
  );
}

test("the area one is in is marked, in the bar and at the thumb, on its deeper pages too", () => {
  expect(bar("/fleet/12").match(/<a[^>]*aria-current="page"[^>]*href="\/fleet"/g)).toHaveLength(2);
});

test("an area behind More marks More", () => {
  expect(bar("/dataset")).toMatch(/<summary aria-current="page"[^>]*>More</);
  expect(bar("/today")).not.toMatch(/<summary aria-current/);
});

test("the warning stands only on pages that ask for it", () => {
  expect(bar("/today", true)).toContain("Not for sharing, not for the projector.");
  expect(bar("/today")).not.toContain("Not for sharing");
});

test("a hidden group is words with its reason, not a link", () => {
  const markup = renderToStaticMarkup(
    <MemoryRouter>
      <GroupSwitch
        label="Compare with"
        menu={{ action: "/peers", name: "group", fields: {} }}
        choices={[
          { key: "all", label: "The whole region", townCountWords: "36", to: "?group=all", isCurrent: true },
          { key: "hill", label: "Hill roads", to: "?group=hill", hiddenReason: "too few towns" },
        ]}
      />
    </MemoryRouter>,
  );
  expect(markup).toContain('aria-current="true"');
  expect(markup).toContain("hidden to protect members: too few towns");
  expect(markup).not.toContain("group=hill");
  expect(markup).toContain('<option value="hill" disabled="">Hill roads: hidden, too few towns</option>');
});

test("a button that cannot act yet does not submit and points at the reason", () => {
  const markup = renderToStaticMarkup(<Button notYet={{ reasonId: "why" }}>Accept all 214</Button>);
  expect(markup).toContain('type="button"');
  expect(markup).toContain('aria-disabled="true"');
  expect(markup).toContain('aria-describedby="why"');
  expect(renderToStaticMarkup(<Button>Accept all 214</Button>)).toContain('type="submit"');
});

test("a timetable puts the unit in the head, names its rows, and shows a dash for what is not known", () => {
  const markup = renderToStaticMarkup(
    <Timetable
      caption="Salt in the fleet"
      columns={[
        { key: "truck", label: "truck" },
        { key: "rate", label: "lays", unit: "lb per lane mile", isNumeric: true },
      ]}
      rows={[{ key: "9", cells: { truck: "9", rate: null } }]}
    />,
  );
  expect(markup).toMatch(/<th scope="col"[^>]*text-right[^>]*>lays, lb per lane mile<\/th>/);
  expect(markup).toMatch(/<th scope="row"[^>]*>9<\/th>/);
  expect(markup).toMatch(/<td data-label="lays, lb per lane mile"[^>]*><div[^>]*>–<\/div><\/td>/);
});
