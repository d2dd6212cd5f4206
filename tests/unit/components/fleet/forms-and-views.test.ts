import { expect, test } from "vitest";
import { readBandForm } from "#app/components/fleet/band-form.ts";
import { readView, showTrucks } from "#app/components/fleet/register-view.ts";
import { readRateView, shownRate, viewAddress } from "#app/components/fleet/shown-units.ts";
import { typedInches, typedNumber } from "#app/lib/typed-figures.ts";

function formOf(fields: Record<string, string>) {
  const form = new FormData();
  for (const [name, value] of Object.entries(fields)) form.set(name, value);
  return form;
}

test("a band left empty is no band, one typed is read, and what was typed comes back", () => {
  const { bands, errors, typed } = readBandForm(formOf({ "salt-low": "240", "salt-high": "1,290.5" }));
  expect(errors).toEqual({});
  expect(bands).toEqual({
    salt: { lowLbPerLaneMile: 240, highLbPerLaneMile: 1290.5 },
    mix: null,
    sand: null,
    brine: null,
  });
  expect(typed["salt-high"]).toBe("1,290.5");
});

test.each([
  [{ "salt-low": "300", "salt-high": "250" }, "salt-high"],
  [{ "salt-low": "250", "salt-high": "250" }, "salt-high"],
  [{ "salt-low": "0", "salt-high": "250" }, "salt-low"],
  [{ "salt-low": "-5", "salt-high": "250" }, "salt-low"],
  [{ "salt-low": "250" }, "salt-high"],
  [{ "salt-low": "two", "salt-high": "250" }, "salt-low"],
  [{ "salt-low": "250", "salt-high": "99999" }, "salt-high"],
  [{ "salt-low": "250,5", "salt-high": "300" }, "salt-low"],
  [{ "salt-low": "12345678901234567890", "salt-high": "300" }, "salt-low"],
])("a band of %j is refused beside %s", (fields, field) => {
  const { bands, errors } = readBandForm(formOf(fields));
  expect(Object.keys(errors)).toEqual([field]);
  expect(bands.salt).toBeNull();
});

test("numbers are read as typed, with a sentence for each way to be wrong", () => {
  const speed = typedNumber({ what: "working speed, mph", min: 3, max: 60 });
  const said = (text: string) => {
    const read = speed.safeParse(text);
    return read.success ? read.data : read.error.issues[0]?.message;
  };
  expect(said("25")).toBe(25);
  expect(said("0")).toBe("The working speed, mph must lie between 3 and 60.");
  expect(said("fast")).toContain("plain number");
  expect(said("2,5")).toContain("point for decimals");
  expect(said("")).toBe("Give the working speed, mph.");
  const gate = typedInches({ what: "gate", min: 0.25, max: 24 });
  expect(gate.parse("4 1/2")).toBe(4.5);
  expect(gate.safeParse("4 9/8").success).toBe(false);
});

test("the rates' address names only what differs from the usual", () => {
  const view = readRateView(new URLSearchParams("step=10&basis=mile&units=si"));
  expect(view).toEqual({ units: "si", basis: "mile", stepMph: 10 });
  expect(readRateView(new URLSearchParams("step=7&basis=x"))).toEqual({ units: "us", basis: "lane", stepMph: 5 });
  expect(viewAddress("/x", view, { units: "us", basis: "lane", stepMph: 5 })).toBe("/x");
  expect(viewAddress("/x", view, { basis: "lane" })).toBe("/x?step=10&units=si");
  // 1 lb per lane mile is 0.45359237 kg on 1.609344 km. Source: international yard and pound agreement, 1959.
  expect(shownRate(300, "si")).toBeCloseTo((300 * 0.45359237) / 1.609344, 12);
  expect(shownRate(300, "us")).toBe(300);
});

const inDate = { state: "in-date", reason: null, dueSince: null } as const;
const overdue = { state: "overdue", reason: "new-season", dueSince: "2026-07-01" } as const;

function truck(
  unitNumber: string,
  given: { due?: typeof inDate | typeof overdue; rate?: number; isInService?: boolean },
) {
  const { due = inDate, rate = 300, isInService = true } = given;
  return {
    unitNumber,
    body: `${unitNumber}-yard body`,
    spreaderKind: "conveyor" as const,
    isInService,
    materials: [
      {
        materialName: "Salt",
        materialKind: "salt",
        due,
        inForce: { testedOn: `2026-10-${unitNumber.padStart(2, "0")}`, working: { lbPerLaneMile: rate } },
      },
    ],
  };
}

const trucks = [truck("4", { rate: 350 }), truck("7", { due: overdue, rate: 290 }), truck("9", { isInService: false })];
const shown = (search: string) =>
  showTrucks(trucks, readView(new URLSearchParams(search))).map((each) => each.unitNumber);

test("the register shows what is asked for, in the order asked for", () => {
  expect(shown("")).toEqual(["4", "7"]);
  expect(shown("state=all")).toEqual(["4", "7", "9"]);
  expect(shown("state=due")).toEqual(["7"]);
  expect(shown("state=in-date")).toEqual(["4"]);
  expect(shown("sort=due")).toEqual(["7", "4"]);
  expect(shown("sort=lays")).toEqual(["4", "7"]);
  expect(shown("state=all&sort=weighed")).toEqual(["4", "7", "9"]);
  expect(shown("q=7-yard")).toEqual(["7"]);
  expect(shown("q=OVERDUE")).toEqual(["7"]);
  expect(shown("sort=nonsense&state=nonsense")).toEqual(["4", "7"]);
});
