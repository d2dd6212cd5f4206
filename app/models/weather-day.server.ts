import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** One day at one station. null = not observed; a trace is no amount, and not missing. */
export class WeatherDay extends Model<InferAttributes<WeatherDay>, InferCreationAttributes<WeatherDay>> {
  declare stationId: number;
  declare day: string;
  declare tmaxF: CreationOptional<number | null>;
  declare tminF: CreationOptional<number | null>;
  declare snowfallIn: CreationOptional<number | null>;
  declare snowDepthIn: CreationOptional<number | null>;
  declare precipIn: CreationOptional<number | null>;
  declare hasTraceSnowfall: CreationOptional<boolean>;
  declare hasTraceDepth: CreationOptional<boolean>;
  declare source: string;
  declare fetchedAt: Date;
}

WeatherDay.init(
  {
    stationId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    day: { type: DataTypes.DATEONLY, primaryKey: true },
    tmaxF: DataTypes.DOUBLE,
    tminF: DataTypes.DOUBLE,
    snowfallIn: DataTypes.DOUBLE,
    snowDepthIn: DataTypes.DOUBLE,
    precipIn: DataTypes.DOUBLE,
    hasTraceSnowfall: DataTypes.BOOLEAN,
    hasTraceDepth: DataTypes.BOOLEAN,
    source: { type: DataTypes.STRING(12), allowNull: false },
    fetchedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "weather_day" },
);
