import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** One start of a sign-in: where to go after, and that its state is used once. */
export class SignInAttempt extends Model<InferAttributes<SignInAttempt>, InferCreationAttributes<SignInAttempt>> {
  declare stateHash: string;
  declare returnTo: string;
  declare invitationHash: CreationOptional<string | null>;
  declare createdAt: Date;
  declare usedAt: CreationOptional<Date | null>;
}

SignInAttempt.init(
  {
    stateHash: { type: DataTypes.STRING(64), primaryKey: true },
    returnTo: { type: DataTypes.STRING(512), allowNull: false },
    invitationHash: DataTypes.STRING(64),
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    usedAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "sign_in_attempt" },
);
