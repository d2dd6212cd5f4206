import type { NetworkActor, PersonActor } from "#app/context.ts";
import { type IndicatorKey, isIndicatorKey } from "#app/domain/peers/indicators.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { workshopEdition } from "#app/models/associations.server.ts";
import { Board } from "#app/models/board.server.ts";
import { Edition } from "#app/models/edition.server.ts";
import { Workshop } from "#app/models/workshop.server.ts";
import { recordAudit } from "./audit.server.ts";
import { listWallCells, type WallCell } from "./editions.server.ts";

export type WorkshopLine = {
  id: number;
  title: string;
  heldOn: string;
  seasonStartYear: number;
  editionNumber: number;
  boardCount: number;
};

/** The network's workshops, the latest first. Titles and days only: members may see them too. */
export async function listWorkshops(_actor: PersonActor): Promise<WorkshopLine[]> {
  const workshops = await Workshop.findAll({
    include: [workshopEdition],
    order: [
      ["heldOn", "DESC"],
      ["id", "DESC"],
    ],
    limit: 100,
  });
  const workshopId = workshops.map(({ id }) => id);
  const counts = await Board.count({ where: { workshopId }, group: ["workshopId"] });
  const countOf = new Map(counts.map(({ workshopId: id, count }) => [id, count]));
  return workshops.map((workshop) => ({
    id: workshop.id,
    title: workshop.title,
    heldOn: workshop.heldOn,
    seasonStartYear: workshop.edition?.seasonStartYear ?? 0,
    editionNumber: workshop.edition?.number ?? 0,
    boardCount: countOf.get(workshop.id) ?? 0,
  }));
}

export type NewWorkshop = { clientRef: string; title: string; heldOn: string; editionId: number };

/**
 * Prepare a workshop around an edition. The same form sent twice makes one.
 *
 * @returns its id
 * @throws 404 when there is no such edition
 */
export async function createWorkshop(actor: NetworkActor, input: NewWorkshop): Promise<number> {
  try {
    return await inTransaction(async (transaction) => {
      if (!(await Edition.findByPk(input.editionId, { transaction }))) throw notFound("edition");
      const { clientRef, title, heldOn, editionId } = input;
      const workshop = await Workshop.create(
        { clientRef, title, heldOn, editionId, createdById: actor.userId, createdAt: now() },
        { transaction },
      );
      await recordAudit(actor, { action: "workshop.create", entity: "workshop", entityId: workshop.id }, transaction);
      return workshop.id;
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
    const known = await Workshop.findOne({ where: { clientRef: input.clientRef }, rejectOnEmpty: true });
    return known.id;
  }
}

export type BoardView = {
  position: number;
  indicator: IndicatorKey;
  groupKey: string;
  question: string;
  cell: WallCell;
};
export type WorkshopView = {
  id: number;
  title: string;
  heldOn: string;
  seasonStartYear: number;
  editionNumber: number;
  boards: BoardView[];
  /** What a board can show: each indicator and group of the edition. */
  choices: { indicator: IndicatorKey; groupKey: string; groupLabel: string; isShown: boolean }[];
};

/** @throws 404 when there is no such workshop */
export async function getWorkshop(_actor: NetworkActor, workshopId: number): Promise<WorkshopView> {
  const workshop = await Workshop.findByPk(workshopId, { include: [workshopEdition] });
  if (!workshop?.edition) throw notFound("workshop");
  const [boards, cells] = await Promise.all([
    Board.findAll({ where: { workshopId }, order: [["position", "ASC"]] }),
    listWallCells(workshop.editionId),
  ]);
  return {
    id: workshop.id,
    title: workshop.title,
    heldOn: workshop.heldOn,
    seasonStartYear: workshop.edition.seasonStartYear,
    editionNumber: workshop.edition.number,
    boards: boards.flatMap(({ position, indicator, groupKey, question }) => {
      const found = cells.find((cell) => cell.indicator === indicator && cell.groupKey === groupKey);
      return found && isIndicatorKey(indicator) ? [{ position, indicator, groupKey, question, cell: found.cell }] : [];
    }),
    choices: cells.map(({ indicator, groupKey, cell }) => ({
      indicator,
      groupKey,
      groupLabel: cell.groupLabel,
      isShown: cell.state === "shown",
    })),
  };
}

export type NewBoard = { clientRef: string; indicator: string; groupKey: string; question: string };

/**
 * Put a board at the end of a workshop. The same form sent twice adds one.
 *
 * @throws 404 when there is no such workshop, or its edition has no such indicator or group
 */
export async function addBoard(actor: NetworkActor, workshopId: number, input: NewBoard): Promise<void> {
  try {
    await inTransaction(async (transaction) => {
      const workshop = await Workshop.findByPk(workshopId, { lock: transaction.LOCK.UPDATE, transaction });
      if (!workshop) throw notFound("workshop");
      const cells = await listWallCells(workshop.editionId);
      const { clientRef, indicator, groupKey, question } = input;
      if (!cells.some((cell) => cell.indicator === indicator && cell.groupKey === groupKey))
        throw notFound("peer group");
      const last = await Board.max<number | null, Board>("position", { where: { workshopId }, transaction });
      const position = (last ?? 0) + 1;
      const board = await Board.create(
        { clientRef, workshopId, position, indicator, groupKey, question },
        { transaction },
      );
      await recordAudit(
        actor,
        { action: "board.add", entity: "board", entityId: board.id, detail: { workshopId } },
        transaction,
      );
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
  }
}
