import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Whose figures stand behind a group: for comparing groups with each other, on the server alone. */
export class EditionMember extends Model<InferAttributes<EditionMember>, InferCreationAttributes<EditionMember>> {
  declare editionId: number;
  declare indicator: string;
  declare groupKey: string;
  declare contributorIds: unknown;
  declare figures: unknown;
  declare isPublished: boolean;
}

EditionMember.init(
  {
    editionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    indicator: { type: DataTypes.STRING(40), primaryKey: true },
    groupKey: { type: DataTypes.STRING(60), primaryKey: true },
    contributorIds: { type: DataTypes.JSON, allowNull: false },
    figures: { type: DataTypes.JSON, allowNull: false },
    isPublished: { type: DataTypes.BOOLEAN, allowNull: false },
  },
  { sequelize: db, tableName: "edition_member" },
);
