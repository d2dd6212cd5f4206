import { randomInt } from "node:crypto";
import type { Transaction } from "sequelize";
import { z } from "zod";
import type { NetworkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { defaultPolicy, publicPolicy } from "#app/domain/disclosure/policy.ts";
import { buildEdition, engineVersion } from "#app/domain/peers/edition.ts";
import type { WithheldReason } from "#app/domain/peers/cell.ts";
import { type IndicatorKey, isIndicatorKey } from "#app/domain/peers/indicators.ts";
import { editionLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { sha256 } from "#app/lib/secrets.server.ts";
import { Edition } from "#app/models/edition.server.ts";
import { EditionCell } from "#app/models/edition-cell.server.ts";
import { EditionMember } from "#app/models/edition-member.server.ts";
import { EditionPlace } from "#app/models/edition-place.server.ts";
import { EditionRow } from "#app/models/edition-row.server.ts";
import { Season } from "#app/models/season.server.ts";
import { recordAudit } from "./audit.server.ts";
import { queueJob } from "./jobs.server.ts";
import { allDirectors } from "./mail-recipients.server.ts";
import { queueMail } from "./outbox.server.ts";
import { readPeerFigures } from "./peer-figures.server.ts";

const Ids = z.array(z.number().int());
const Figures = z.array(z.number());

async function readEarlierEditionIds(seasonStartYear: number, transaction: Transaction) {
  const editions = await Edition.findAll({ attributes: ["id"], where: { seasonStartYear }, transaction });
  return editions.map((edition) => edition.id);
}

/** Its calibrations may stem from the season before, so neighbouring seasons share most of its figures. */
const lastingIndicator: IndicatorKey = "rate-at-working-setting";

/**
 * The groups that a new group must not be subtracted from: all that earlier editions of the season have shown, and, of
 * the figures that outlast a season, those of the seasons next to it.
 */
async function readRegistry(seasonStartYear: number, transaction: Transaction) {
  const editions = await Edition.findAll({
    attributes: ["id", "seasonStartYear"],
    where: { seasonStartYear: [seasonStartYear - 1, seasonStartYear, seasonStartYear + 1] },
    transaction,
  });
  const seasonOf = new Map(editions.map((edition) => [edition.id, edition.seasonStartYear]));
  const members = await EditionMember.findAll({
    where: { editionId: [...seasonOf.keys()], isPublished: true },
    transaction,
  });
  return members.flatMap(({ editionId, indicator, groupKey, contributorIds, figures }) => {
    const isCompared = seasonOf.get(editionId) === seasonStartYear || indicator === lastingIndicator;
    return isCompared && isIndicatorKey(indicator)
      ? [{ indicator, groupKey, contributorIds: Ids.parse(contributorIds), figures: Figures.parse(figures) }]
      : [];
  });
}

async function computeEdition(seasonStartYear: number, transaction: Transaction) {
  const towns = await readPeerFigures(seasonStartYear, transaction);
  const earlierIds = await readEarlierEditionIds(seasonStartYear, transaction);
  const registry = await readRegistry(seasonStartYear, transaction);
  const hasEarlierRows = (await EditionRow.count({ where: { editionId: earlierIds }, transaction })) > 0;
  const random = () => randomInt(2 ** 32) / 2 ** 32;
  const policy = defaultPolicy;
  return { towns, built: buildEdition({ seasonStartYear, towns, registry, hasEarlierRows, policy, random }) };
}

export type EditionPreview = {
  seasonStartYear: number;
  nextNumber: number;
  townCount: number;
  /** What members would not be shown, and why. */
  withheld: { indicator: IndicatorKey; groupLabel: string; reason: WithheldReason }[];
  shownCount: number;
  rows: { state: "published"; count: number } | { state: "withheld"; reason: string };
};

/** What an edition of the season would hold if it were published now. Nothing is stored. */
export async function previewEdition(_actor: NetworkActor, seasonStartYear: number): Promise<EditionPreview> {
  return inTransaction(async (transaction) => {
    const { built } = await computeEdition(seasonStartYear, transaction);
    const last = await Edition.max<number | null, Edition>("number", { where: { seasonStartYear }, transaction });
    const cells = built.cells.filter((cell) => cell.audience === "member");
    return {
      seasonStartYear,
      nextNumber: (last ?? 0) + 1,
      townCount: built.townCount,
      withheld: cells.flatMap(({ indicator, groupLabel, cell }) =>
        cell.state === "withheld" ? [{ indicator, groupLabel, reason: cell.reason }] : [],
      ),
      shownCount: cells.filter(({ cell }) => cell.state === "shown").length,
      rows:
        built.rows.state === "published"
          ? { state: "published", count: built.rows.rows.length }
          : { state: "withheld", reason: built.rows.reason },
    };
  });
}

/**
 * Ask for an edition to be computed and published. It is done by the queue; asking twice asks once, and asking again
 * after it failed has it tried again.
 *
 * @param number - the number the coordinator was shown
 * @returns `{ ok: false }` when another edition was published meanwhile
 * @throws 404 when the network has not opened that season
 */
export async function requestEdition(actor: NetworkActor, seasonStartYear: number, number: number) {
  const request = async (transaction: Transaction) => {
    if (!(await Season.findByPk(seasonStartYear, { transaction }))) throw notFound("season");
    const last = await Edition.max<number | null, Edition>("number", { where: { seasonStartYear }, transaction });
    if (number !== (last ?? 0) + 1) return { ok: false, reason: "published-meanwhile" } as const;
    const payload = { seasonStartYear, number, requestedById: actor.userId, isAnnounced: true };
    const dedupeKey = `publish-edition:${seasonStartYear}:${number}`;
    const isNew = await queueJob(
      { kind: "publish-edition", payload, dedupeKey, createdById: actor.userId },
      transaction,
    );
    if (isNew) {
      await recordAudit(
        actor,
        { action: "edition.request", entity: "edition", entityId: null, detail: payload },
        transaction,
      );
    }
    return { ok: true } as const;
  };
  try {
    return await inTransaction(request);
  } catch (error) {
    // The same button was pressed twice in one moment: the other press has asked.
    if (!isDuplicate(error)) throw error;
    return { ok: true } as const;
  }
}

const Payload = z.object({
  seasonStartYear: z.number().int(),
  number: z.number().int(),
  requestedById: z.number().int().nullable().default(null),
  isAnnounced: z.boolean().default(false),
});

type Built = Awaited<ReturnType<typeof computeEdition>>["built"];

async function storeParts(editionId: number, built: Built, transaction: Transaction) {
  await EditionCell.bulkCreate(
    built.cells.map(({ audience, indicator, groupKey, groupLabel, cell }) => ({
      editionId,
      audience,
      indicator,
      groupKey,
      cell: { groupLabel, ...cell },
    })),
    { transaction },
  );
  await EditionMember.bulkCreate(
    built.members.map((member) => ({ editionId, ...member })),
    { transaction },
  );
  await EditionPlace.bulkCreate(
    built.places.map((place) => ({ editionId, ...place })),
    { transaction },
  );
  if (built.rows.state === "published") {
    await EditionRow.bulkCreate(
      built.rows.rows.map((content, index) => ({ editionId, position: index + 1, content })),
      { transaction },
    );
  }
}

/** The queue's handler: compute, freeze and announce one edition, in one transaction. Safe to run twice. */
export async function publishQueuedEdition(payload: unknown, requestId: string): Promise<void> {
  const { seasonStartYear, number, requestedById, isAnnounced } = Payload.parse(payload);
  await inTransaction(async (transaction) => {
    if ((await Edition.count({ where: { seasonStartYear, number }, transaction })) > 0) return;
    const { towns, built } = await computeEdition(seasonStartYear, transaction);
    const edition = await Edition.create(
      {
        seasonStartYear,
        number,
        publishedAt: now(),
        publishedById: requestedById,
        engineVersion,
        townCount: built.townCount,
        policy: publicPolicy(defaultPolicy),
        inputSha256: sha256(JSON.stringify(towns)),
        contentSha256: sha256(JSON.stringify([built.cells, built.rows])),
      },
      { transaction },
    );
    await storeParts(edition.id, built, transaction);
    await recordAudit(
      { kind: "worker", role: "worker", requestId },
      {
        action: "edition.publish",
        entity: "edition",
        entityId: edition.id,
        detail: { seasonStartYear, number, requestedById, contentSha256: edition.contentSha256 },
      },
      transaction,
    );
    if (!isAnnounced) return;
    for (const { userId, ...to } of await allDirectors(transaction)) {
      const address = `${env.publicOrigin}/peers?edition=${edition.id}`;
      const out = editionLetter({ ...to, season: seasonLabel(seasonStartYear), number, address });
      await queueMail(`edition:${edition.id}:${userId}`, out, transaction);
    }
  });
}
