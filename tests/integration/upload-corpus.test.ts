import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import type { CorpusCase, Outcome } from "#tests/support/corpus/case.ts";
import { dateCases, meaningCases, numberCases } from "#tests/support/corpus/cells.ts";
import { encodingCases, lineCases, shapeCases } from "#tests/support/corpus/texts.ts";
import { workbookCases } from "#tests/support/corpus/workbooks.ts";
import { aMaterial, aPerson, aSeason, aTown, aTruck, signIn, type Town } from "#tests/support/factories.ts";
import { countOf } from "#tests/support/rows.ts";
import { problemsIn, sendFile, settled, uploadIdOf, wordsOf } from "#tests/support/upload-files.ts";

/*
 * Files as they come: each has the outcome that is written beside it, whatever is in it. Never an answer of 500, never
 * anything stored before it is accepted, and the same verdict when the same file comes again.
 */

let app: TestApp;

beforeAll(async () => {
  app = await startApp();
  for (const year of [2023, 2024]) await aSeason(app, year);
  await aTruck(app, await aTown(app), { unitNumber: "77" });
});

afterAll(async () => expect(await app.close()).toEqual([]));

async function aSender() {
  const town = await aTown(app);
  await aTruck(app, town, { unitNumber: "12" });
  const salt = await aMaterial(app, town);
  return { town, salt, cookie: await signIn(app, await aPerson(app, { role: "recorder", town })) };
}

async function verdict(cookie: string, town: Town, { content, fileName = "log.csv" }: CorpusCase) {
  const started = performance.now();
  const answer = await sendFile(app, cookie, { content, kind: "storms", fileName });
  expect(answer.status, wordsOf(answer).slice(0, 300)).toBe(302);
  const uploadId = uploadIdOf(answer);
  const upload = await settled(app, uploadId);
  const seconds = (performance.now() - started) / 1000;
  expect(await countOf(app, `storm WHERE town_id = ${town.id}`)).toBe(0);
  expect(await countOf(app, `audit_entry WHERE action = 'upload.receive' AND entity_id = ${uploadId}`)).toBeGreaterThan(
    0,
  );
  return { uploadId, upload, seconds };
}

async function expectOutcome(uploadId: number, salt: number, cookie: string, outcome: Outcome) {
  const problems = await problemsIn(app, uploadId);
  const path = outcome.state === "matching" ? "/columns" : "";
  const page = await app.ask(`/uploads/${uploadId}${path}`, { cookie });
  expect(page.status).toBe(200);
  if (outcome.state !== "checked") {
    expect(wordsOf(page)).toContain(outcome.words ?? "");
    return;
  }
  const list = await app.ask(`/uploads/${uploadId}/problems`, { cookie });
  expect(list.status).toBe(200);
  for (const { message, value } of problems) {
    expect(message).toMatch(/^[A-Z0-9“].{10,}[.?]$/s);
    expect((value ?? "").length).toBeLessThanOrEqual(40);
  }
  for (const [place, { row, field, code, value }] of (outcome.problems ?? []).entries()) {
    const found = problems[place];
    expect(found).toMatchObject({
      row,
      code,
      ...(field === undefined ? {} : { field: field.replace("salt", String(salt)) }),
      ...(value === undefined ? {} : { value: value === "" ? null : value }),
    });
    // What is wrong is told on the page, where it stands and in its words.
    expect(wordsOf(page)).toContain(found?.message ?? "");
  }
  if (outcome.problems?.length === 0) expect(problems).toEqual([]);
}

const cases = [
  ...encodingCases,
  ...lineCases,
  ...shapeCases,
  ...numberCases,
  ...dateCases,
  ...meaningCases,
  ...workbookCases,
];

test("the corpus holds over a hundred files, each by a name of its own", () => {
  expect(new Set(cases.map(({ name }) => name)).size).toBe(cases.length);
  expect(cases.length).toBeGreaterThan(100);
});

test.each(cases.map((each) => [each.name, each] as const))("%s", { timeout: 90_000 }, async (_name, each) => {
  const { town, salt, cookie } = await aSender();
  const { uploadId, upload, seconds } = await verdict(cookie, town, each);
  const { outcome } = each;
  const counts =
    outcome.state === "checked"
      ? { rows_ok: outcome.ok, rows_check: outcome.check ?? 0, rows_error: outcome.error ?? 0 }
      : {};
  expect(upload).toMatchObject({ state: outcome.state, ...counts });
  await expectOutcome(uploadId, salt, cookie, outcome);
  const again = await verdict(cookie, town, each);
  expect(again.uploadId).toBe(uploadId);
  expect(again.upload).toEqual(upload);
  if (each.content.length < 100_000) expect(seconds).toBeLessThan(20);
});
