import { Calibration } from "./calibration.server.ts";
import { CalibrationCatch } from "./calibration-catch.server.ts";
import { CalibrationCount } from "./calibration-count.server.ts";
import { Edition } from "./edition.server.ts";
import { Material } from "./material.server.ts";
import { SeasonFigure } from "./season-figure.server.ts";
import { Town } from "./town.server.ts";
import { Workshop } from "./workshop.server.ts";

/** What may be read together with what. */
export const figureTown = SeasonFigure.belongsTo(Town, { as: "town", foreignKey: "townId" });
export const calibrationMaterial = Calibration.belongsTo(Material, { as: "material", foreignKey: "materialId" });
export const calibrationCounts = Calibration.hasMany(CalibrationCount, { as: "counts", foreignKey: "calibrationId" });
export const calibrationCatches = Calibration.hasMany(CalibrationCatch, { as: "catches", foreignKey: "calibrationId" });
export const workshopEdition = Workshop.belongsTo(Edition, { as: "edition", foreignKey: "editionId" });
