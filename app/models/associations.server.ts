import { Calibration } from "./calibration.server.ts";
import { CalibrationCatch } from "./calibration-catch.server.ts";
import { CalibrationCount } from "./calibration-count.server.ts";
import { Edition } from "./edition.server.ts";
import { Material } from "./material.server.ts";
import { SeasonFigure } from "./season-figure.server.ts";
import { Session } from "./session.server.ts";
import { Town } from "./town.server.ts";
import { Truck } from "./truck.server.ts";
import { UserAccount } from "./user-account.server.ts";
import { Workshop } from "./workshop.server.ts";

/** How a session's owner, and the owner's town, are read in one query. */
export const sessionOwner = Session.belongsTo(UserAccount, { as: "user", foreignKey: "userId" });
export const userTown = UserAccount.belongsTo(Town, { as: "town", foreignKey: "townId" });
export const figureTown = SeasonFigure.belongsTo(Town, { as: "town", foreignKey: "townId" });
export const calibrationTruck = Calibration.belongsTo(Truck, { as: "truck", foreignKey: "truckId" });
export const calibrationMaterial = Calibration.belongsTo(Material, { as: "material", foreignKey: "materialId" });
export const calibrationCounts = Calibration.hasMany(CalibrationCount, { as: "counts", foreignKey: "calibrationId" });
export const calibrationCatches = Calibration.hasMany(CalibrationCatch, { as: "catches", foreignKey: "calibrationId" });
export const workshopEdition = Workshop.belongsTo(Edition, { as: "edition", foreignKey: "editionId" });
