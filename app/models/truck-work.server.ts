import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type WorkPart = "gate" | "hydraulics" | "feed" | "controller";

/** Work on a truck after which it has to be weighed again. */
export class TruckWork extends Model<InferAttributes<TruckWork>, InferCreationAttributes<TruckWork>> {
  declare id: CreationOptional<number>;
  declare clientRef: string;
  declare townId: number;
  declare truckId: number;
  declare doneOn: string; // local date, YYYY-MM-DD
  declare part: WorkPart;
  declare note: CreationOptional<string>;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
}

TruckWork.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    truckId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    doneOn: { type: DataTypes.DATEONLY, allowNull: false },
    part: { type: DataTypes.STRING(12), allowNull: false },
    note: DataTypes.STRING(300),
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "truck_work" },
);
