import type { PersonActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { townBand } from "#app/domain/disclosure/rounding.ts";
import { indicatorKeys, indicators } from "#app/domain/peers/indicators.ts";
import { writeCsv } from "#app/lib/csv.server.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { sha256 } from "#app/lib/secrets.server.ts";
import { EditionRow } from "#app/models/edition-row.server.ts";
import { TermsAcceptance } from "#app/models/terms-acceptance.server.ts";
import { z } from "zod";
import { recordAudit } from "./audit.server.ts";
import { type EditionSummary, getEdition, listDownloadCells, listEditions } from "./editions.server.ts";

/** The terms now in force. A new version asks everybody again. */
const termsVersion = "2026-12";

/** Whether the actor accepted the terms now in force. */
export async function hasAcceptedTerms(actor: PersonActor): Promise<boolean> {
  return (await TermsAcceptance.count({ where: { userId: actor.userId, termsVersion } })) > 0;
}

/** Accept the terms now in force. Accepting twice is accepting once. */
export async function acceptTerms(actor: PersonActor): Promise<void> {
  await inTransaction(async (transaction) => {
    const where = { userId: actor.userId, termsVersion };
    const [, isNew] = await TermsAcceptance.findOrCreate({
      where,
      defaults: { ...where, acceptedAt: now() },
      transaction,
    });
    if (!isNew) return;
    const detail = { termsVersion };
    await recordAudit(
      actor,
      { action: "terms.accept", entity: "user_account", entityId: actor.userId, detail },
      transaction,
    );
  });
}

export type DatasetEdition = Omit<EditionSummary, "townCount"> & {
  /** How many contributors, as a band: the dataset's readers are told no exact number. */
  townBand: string;
  files: string[];
};

/** Every edition as the dataset's readers see it, the newest first, with the files there are. */
export async function listDatasetEditions(): Promise<DatasetEdition[]> {
  const [editions, firstRows] = await Promise.all([
    listEditions(),
    EditionRow.findAll({ attributes: ["editionId"], where: { position: 1 } }),
  ]);
  const withRows = new Set(firstRows.map(({ editionId }) => editionId));
  return editions.map(({ townCount, ...edition }) => ({
    ...edition,
    townBand: townBand(townCount),
    files: ["cells.csv", ...(withRows.has(edition.id) ? ["rows.csv"] : []), "datapackage.json"],
  }));
}

const cellFields = [
  { name: "edition", type: "string", description: "Season and number of the edition" },
  { name: "indicator", type: "string", description: "Key of the indicator" },
  { name: "unit", type: "string", description: "Unit of the figures in this row" },
  { name: "group", type: "string", description: "Peer group" },
  { name: "towns_band", type: "string", description: "How many towns report, as a band" },
  { name: "lower_quartile", type: "number", description: "A quarter of the towns lie under this; rounded" },
  { name: "median", type: "number", description: "Half of the towns lie under this; rounded" },
  { name: "upper_quartile", type: "number", description: "Three quarters of the towns lie under this; rounded" },
  {
    name: "hidden",
    type: "string",
    description: "Why the figures are left out, to protect members: few, similar or close",
  },
] as const;

const hiddenCodes = { "too-few": "few", "too-similar": "similar", "too-close": "close" } as const;

const Row = z.object({
  id: z.string(),
  laneMileBand: z.string(),
  values: z.record(z.string(), z.number().nullable()),
});

function editionName({ seasonStartYear, number }: EditionSummary) {
  return `${seasonLabel(seasonStartYear)}, edition ${number}`;
}

/** The protected figures of an edition by indicator and group. @throws 404 when there is no such edition */
async function cellsCsv(edition: EditionSummary): Promise<string> {
  const cells = await listDownloadCells(edition.id);
  const rows = cells.map(({ indicator, groupKey, cell }) => {
    const { unit } = indicators[indicator];
    const head = [editionName(edition), indicator, unit, groupKey];
    return cell.state === "shown"
      ? [...head, cell.townBand, cell.lowerQuartile, cell.median, cell.upperQuartile, ""]
      : [...head, "", null, null, null, hiddenCodes[cell.reason]];
  });
  return writeCsv(
    cellFields.map((field) => field.name),
    rows,
  );
}

async function rowsCsv(edition: EditionSummary): Promise<string> {
  const rows = await EditionRow.findAll({ where: { editionId: edition.id }, order: [["position", "ASC"]] });
  if (rows.length === 0)
    throw notFound("row file", "Rows are given out once a season, and only where none can be told from four others.");
  const heads = ["row", "lane_miles_band", ...indicatorKeys.map((key) => key.replaceAll("-", "_") + "_lb")];
  return writeCsv(
    heads,
    rows.map(({ content }) => {
      const row = Row.parse(content);
      return [row.id, row.laneMileBand, ...indicatorKeys.map((key) => row.values[key] ?? null)];
    }),
  );
}

async function describe(edition: EditionSummary): Promise<string> {
  const cells = await cellsCsv(edition);
  const hidden = { constraints: { enum: ["", ...Object.values(hiddenCodes)] } };
  const hasRows = (await EditionRow.count({ where: { editionId: edition.id } })) > 0;
  const resource = { type: "table", encoding: "utf-8", mediatype: "text/csv", format: "csv" };
  return JSON.stringify(
    {
      $schema: "https://datapackage.org/profiles/2.0/datapackage.json",
      name: `commonweigh-${edition.seasonStartYear}-${edition.number}`,
      title: `Salt on the roads, ${editionName(edition)}: protected figures of the network's towns`,
      version: String(edition.number),
      created: edition.publishedAt,
      resources: [
        {
          ...resource,
          name: "cells",
          path: "cells.csv",
          hash: `sha256:${sha256(cells)}`,
          bytes: Buffer.byteLength(cells),
          schema: {
            missingValues: [""],
            primaryKey: ["indicator", "group"],
            fields: cellFields.map((field) => (field.name === "hidden" ? { ...field, ...hidden } : field)),
          },
        },
        ...(hasRows ? [{ ...resource, name: "rows", path: "rows.csv" }] : []),
      ],
    },
    null,
    2,
  );
}

export type DatasetFile = { fileName: string; contentType: string; body: string };

/**
 * One file of an edition's package: `cells.csv`, `rows.csv` or `datapackage.json`.
 *
 * @throws 404 when there is no such edition or file
 */
export async function getDatasetFile(editionId: number, file: string): Promise<DatasetFile> {
  const edition = await getEdition(editionId);
  const fileName = `commonweigh-${edition.seasonStartYear}-${edition.number}-${file}`;
  switch (file) {
    case "cells.csv":
      return { fileName, contentType: "text/csv; charset=utf-8", body: await cellsCsv(edition) };
    case "rows.csv":
      return { fileName, contentType: "text/csv; charset=utf-8", body: await rowsCsv(edition) };
    case "datapackage.json":
      return { fileName, contentType: "application/json; charset=utf-8", body: await describe(edition) };
    default:
      throw notFound("file");
  }
}
