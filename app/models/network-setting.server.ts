import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** One number that the network has set; without a row, the program's own default holds. */
export class NetworkSetting extends Model<InferAttributes<NetworkSetting>, InferCreationAttributes<NetworkSetting>> {
  declare name: string;
  declare value: number;
}

NetworkSetting.init(
  {
    name: { type: DataTypes.STRING(40), allowNull: false, primaryKey: true },
    value: { type: DataTypes.DOUBLE, allowNull: false },
  },
  { sequelize: db, tableName: "network_setting" },
);
