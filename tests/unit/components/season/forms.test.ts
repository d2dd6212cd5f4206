import { expect, test } from "vitest";
import { readSeasonDates } from "#app/components/network/season-form.ts";
import { readVerdict } from "#app/components/network/verdict-form.ts";
import { figureFormValues, readFigureForm } from "#app/components/season/figure-form.ts";
import { readMaterialChange, readNewMaterial } from "#app/components/season/material-form.ts";
import { readStockForm } from "#app/components/season/stock-form.ts";

const figures = {
  laneMiles: "118",
  eventCount: "26",
  saltLb: "604.0",
  mixLb: "147.9",
  mixSaltShare: "20",
  sandLb: "0",
  brineGal: "",
  wettedSaltLb: "",
  materialCostCents: "48,490",
};

test("typed figures become storage units and come back as the same texts", () => {
  const reading = readFigureForm(figures);
  expect(reading).toEqual({
    ok: true,
    wettedSaltLb: null,
    amounts: {
      laneMiles: 118,
      eventCount: 26,
      saltLb: 1_208_000,
      mixLb: 295_800,
      mixSaltShare: 0.2,
      sandLb: 0,
      brineGal: null,
      materialCostCents: 4_849_000,
    },
  });
  if (!reading.ok) return;
  expect(figureFormValues({ ...reading.amounts, wettedSaltLb: null })).toEqual({
    ...figures,
    saltLb: "604",
    materialCostCents: "48490",
  });
});

test.each([
  [{ laneMiles: "" }, ["laneMiles"]],
  [{ laneMiles: "0" }, ["laneMiles"]],
  [{ eventCount: "2.5" }, ["eventCount"]],
  [{ saltLb: "6,04" }, ["saltLb"]],
  [{ saltLb: "-1", sandLb: "many" }, ["saltLb", "sandLb"]],
  [{ mixSaltShare: "" }, ["mixSaltShare"]],
  [{ mixSaltShare: "101" }, ["mixSaltShare"]],
  [{ wettedSaltLb: "900" }, ["wettedSaltLb"]],
  [{ materialCostCents: "1e9" }, ["materialCostCents"]],
])("figures with %j are refused at %j", (change, fields) => {
  const reading = readFigureForm({ ...figures, ...change });
  expect(reading.ok ? [] : Object.keys(reading.errors).sort()).toEqual(fields);
});

test("without mix no salt share is asked for, and none is kept", () => {
  const reading = readFigureForm({ ...figures, mixLb: "0", mixSaltShare: "20" });
  expect(reading.ok && reading.amounts.mixSaltShare).toBeNull();
});

const stock = {
  clientRef: "0b1f2a34-5c6d-4e7f-8a9b-0c1d2e3f4a5b",
  materialId: "7",
  kind: "delivery",
  day: "2025-11-20",
  typedQuantity: "25.5",
  typedUnit: "ton",
  priceUsd: "1,850.25",
  supplier: " Tarn Minerals ",
};

test("a delivery keeps its unit, price and supplier; a measured pile in cubic yards keeps its density", () => {
  expect(readStockForm(stock, 2025)).toMatchObject({
    ok: true,
    entry: {
      typedQuantity: 25.5,
      typedUnit: "ton",
      lbPerCubicYard: null,
      priceCents: 185_025,
      supplier: "Tarn Minerals",
    },
  });
  expect(
    readStockForm({ ...stock, kind: "closing", typedUnit: "cubic-yard", lbPerCubicYard: "2160", priceUsd: "x" }, 2025),
  ).toMatchObject({ ok: true, entry: { lbPerCubicYard: 2160, priceCents: null } });
});

test.each([
  [{ materialId: "" }, "materialId"],
  [{ kind: "theft" }, "kind"],
  [{ day: "2025-06-30" }, "day"],
  [{ day: "11/20" }, "day"],
  [{ typedQuantity: "-1" }, "typedQuantity"],
  [{ typedUnit: "bags" }, "typedUnit"],
  [{ typedUnit: "cubic-yard" }, "lbPerCubicYard"],
  [{ typedUnit: "cubic-yard", lbPerCubicYard: "2.1" }, "lbPerCubicYard"],
  [{ priceUsd: "much" }, "priceUsd"],
  [{ supplier: "x".repeat(81) }, "supplier"],
  [{ clientRef: "again" }, "typedQuantity"],
])("stock with %j is refused at %s", (change, field) => {
  const reading = readStockForm({ ...stock, ...change }, 2025);
  expect(reading.ok ? [] : Object.keys(reading.errors)).toEqual([field]);
});

test("a season is due after it ends, opens before that and closes no sooner", () => {
  const dates = { opensOn: "2026-09-01", figuresDueOn: "2027-08-31", closesOn: "" };
  expect(readSeasonDates(dates, 2026)).toEqual({
    ok: true,
    dates: { opensOn: "2026-09-01", figuresDueOn: "2027-08-31", closesOn: null },
  });
  const wrong = (change: Record<string, string>) => {
    const reading = readSeasonDates({ ...dates, ...change }, 2026);
    return reading.ok ? [] : Object.keys(reading.errors);
  };
  expect(wrong({ figuresDueOn: "2027-06-30" })).toEqual(["figuresDueOn"]);
  expect(wrong({ opensOn: "2027-08-31" })).toEqual(["opensOn"]);
  expect(wrong({ closesOn: "2027-08-30" })).toEqual(["closesOn"]);
  expect(wrong({ closesOn: "soon" })).toEqual(["closesOn"]);
});

test("a season goes back with a question or a note, is accepted against the checks with a reason, and is asked about in a sentence", () => {
  expect(readVerdict({ verdict: "return", note: "", "note-saltLb": "604 or 60.4?" }, true)).toEqual({
    ok: true,
    verdict: { verdict: "return", question: "", notes: [{ field: "saltLb", note: "604 or 60.4?" }] },
  });
  expect(readVerdict({ verdict: "return", note: "why" }, true).ok).toBe(false);
  expect(readVerdict({ verdict: "return", note: "Please look again.", "note-sandLb": "x".repeat(501) }, true).ok).toBe(
    false,
  );
  expect(readVerdict({ verdict: "accept" }, true).ok).toBe(false);
  expect(readVerdict({ verdict: "accept" }, false)).toEqual({ ok: true, verdict: { verdict: "accept", reason: null } });
  expect(readVerdict({ verdict: "accept", reason: "The yard burnt down." }, true).ok).toBe(true);
  expect(readVerdict({ verdict: "ask", ask: "why" }, true).ok).toBe(false);
  expect(readVerdict({ verdict: "ask", ask: "Is the north yard in it?" }, true).ok).toBe(true);
});

test("a material takes a name, a kind and a salt share; a season's price may be taken away", () => {
  expect(readNewMaterial({ name: " Rich  mix ", kind: "mix", saltPercent: "25" })).toEqual({
    ok: true,
    material: { name: "Rich mix", kind: "mix", saltShare: 0.25 },
  });
  expect(readNewMaterial({ name: "", kind: "gold", saltPercent: "250" })).toMatchObject({
    ok: false,
    errors: {
      name: expect.any(String) as string,
      kind: expect.any(String) as string,
      saltPercent: expect.any(String) as string,
    },
  });
  expect(readMaterialChange({ saltPercent: "100", usdPerTon: "73.234" }, 4)).toEqual({
    ok: true,
    change: { saltShare: 1, centsPerTon: 7323 },
  });
  expect(readMaterialChange({ saltPercent: "100", usdPerTon: "" }, 4)).toMatchObject({ change: { centsPerTon: null } });
  expect(readMaterialChange({ saltPercent: "100", usdPerTon: "-1" }, 4)).toMatchObject({
    ok: false,
    errors: { "price-4": expect.any(String) as string },
  });
});
