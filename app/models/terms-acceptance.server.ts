import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** That a person accepted the dataset's terms. */
export class TermsAcceptance extends Model<InferAttributes<TermsAcceptance>, InferCreationAttributes<TermsAcceptance>> {
  declare userId: number;
  declare termsVersion: string;
  declare acceptedAt: Date;
}

TermsAcceptance.init(
  {
    userId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    termsVersion: { type: DataTypes.STRING(20), primaryKey: true },
    acceptedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "terms_acceptance" },
);
