import { Op, type Transaction } from "sequelize";
import type { NetworkActor, TownActor } from "#app/context.ts";
import { type Band, commonPracticeBands, type MaterialKind, materialKinds } from "#app/domain/calibration/band.ts";
import { defaultTolerancePercent } from "#app/domain/calibration/verification.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { NetworkSetting } from "#app/models/network-setting.server.ts";
import { StoredBand } from "#app/models/stored-band.server.ts";
import { Town } from "#app/models/town.server.ts";
import { recordAudit } from "./audit.server.ts";

/** Who set the band that holds. */
export type BandOrigin = "town" | "network" | "common-practice";
/** The band in force for one kind of material, with whoever set it; null where nobody has, and practice knows none. */
export type BandInForce = (Band & { origin: BandOrigin }) | null;
export type TownBands = Record<MaterialKind, BandInForce>;

const toleranceName = "ground-speed-tolerance-percent";

function practice(kind: MaterialKind): BandInForce {
  const band = commonPracticeBands[kind];
  return band === undefined ? null : { ...band, origin: "common-practice" };
}

function resolve(rows: readonly StoredBand[], townId: number | null): TownBands {
  const of = (kind: MaterialKind): BandInForce => {
    const own = rows.find((row) => row.materialKind === kind && row.townId !== null && row.townId === townId);
    const row = own ?? rows.find((each) => each.materialKind === kind && each.townId === null);
    if (!row) return practice(kind);
    const { lowLbPerLaneMile, highLbPerLaneMile } = row;
    return { lowLbPerLaneMile, highLbPerLaneMile, origin: own ? "town" : "network" };
  };
  return { salt: of("salt"), mix: of("mix"), sand: of("sand"), brine: of("brine") };
}

/**
 * The bands that hold in a town: its own, else the network's, else common practice.
 *
 * @returns one entry for each kind of material, lb per lane mile
 */
export async function bandsOfTown(actor: TownActor): Promise<TownBands> {
  const rows = await StoredBand.findAll({ where: { townId: { [Op.or]: [actor.townId, null] } }, order: ["id"] });
  return resolve(rows, actor.townId);
}

/** The bands that hold where a town has none of its own. */
export async function bandsOfNetwork(): Promise<TownBands> {
  return resolve(await StoredBand.findAll({ where: { townId: null } }), null);
}

/** The bands of common practice alone: what holds where nobody has set one. */
export function practiceBands(): TownBands {
  return resolve([], null);
}

/** How far a ground-speed controller may miss what it was told: percent, the network's or 5. */
export async function tolerancePercent(): Promise<number> {
  const setting = await NetworkSetting.findByPk(toleranceName);
  return setting?.value ?? defaultTolerancePercent;
}

/** What a form of bands says: for each kind a band, or null to fall back on what is next in line. */
export type BandChoices = Record<MaterialKind, Band | null>;

async function store(
  actor: TownActor | NetworkActor,
  townId: number | null,
  choices: BandChoices,
  transaction: Transaction,
) {
  const rows = await StoredBand.findAll({ where: { townId }, lock: transaction.LOCK.UPDATE, transaction });
  for (const kind of materialKinds) {
    const before = rows.find((row) => row.materialKind === kind);
    const wanted = choices[kind];
    const from = before && { lowLbPerLaneMile: before.lowLbPerLaneMile, highLbPerLaneMile: before.highLbPerLaneMile };
    if (!wanted && !before) continue;
    if (
      from &&
      from.lowLbPerLaneMile === wanted?.lowLbPerLaneMile &&
      from.highLbPerLaneMile === wanted.highLbPerLaneMile
    ) {
      continue;
    }
    if (!wanted) await before?.destroy({ transaction });
    else if (before) await before.update(wanted, { transaction });
    else await StoredBand.create({ townId, materialKind: kind, ...wanted }, { transaction });
    const detail = { materialKind: kind, before: from ?? null, after: wanted };
    await recordAudit(actor, { action: "band.set", entity: "band", entityId: null, detail }, transaction);
  }
}

/** Set the town's own bands. A null takes the town's own away, so that the network's holds again. */
export async function setTownBands(actor: TownActor, choices: BandChoices): Promise<void> {
  await inTransaction(async (transaction) => {
    // Two people at once take turns, so that the second finds the rows of the first.
    await Town.findByPk(actor.townId, { attributes: ["id"], lock: transaction.LOCK.UPDATE, transaction });
    await store(actor, actor.townId, choices, transaction);
  });
}

/** Set the network's bands and the tolerance of ground-speed control. @param percent - above 0, at most 50 */
export async function setNetworkBands(actor: NetworkActor, choices: BandChoices, percent: number): Promise<void> {
  await inTransaction(async (transaction) => {
    const before = await NetworkSetting.findByPk(toleranceName, { transaction });
    // Writing this row first makes two coordinators at once take turns: a unique key lets a null town through twice.
    await NetworkSetting.upsert({ name: toleranceName, value: percent }, { transaction });
    await store(actor, null, choices, transaction);
    const from = before?.value ?? defaultTolerancePercent;
    if (from === percent) return;
    const detail = { before: from, after: percent };
    await recordAudit(
      actor,
      { action: "tolerance.set", entity: "network_setting", entityId: null, detail },
      transaction,
    );
  });
}
