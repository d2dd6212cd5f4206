import type { Transaction } from "sequelize";
import { type FigureState, SeasonFigure } from "#app/models/season-figure.server.ts";

/** How far every town is with every season, without what its figures say. */
export async function figureStates(): Promise<{ seasonStartYear: number; state: FigureState }[]> {
  const figures = await SeasonFigure.findAll({ attributes: ["seasonStartYear", "state"], raw: true });
  return figures.map(({ seasonStartYear, state }) => ({ seasonStartYear, state }));
}

/** The towns that have sent a season in, or had it accepted: nobody waits for them. */
export async function townsDoneWith(seasonStartYear: number, transaction: Transaction): Promise<number[]> {
  const figures = await SeasonFigure.findAll({
    attributes: ["townId"],
    where: { seasonStartYear, state: ["sent", "accepted"] },
    raw: true,
    transaction,
  });
  return figures.map(({ townId }) => townId);
}
