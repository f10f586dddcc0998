import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class SensorLimit extends Model<InferAttributes<SensorLimit>, InferCreationAttributes<SensorLimit>> {
  declare cellarId: string;
  declare lowBatteryDays: CreationOptional<number>;
  declare emptyBatteryV: CreationOptional<number>;
  declare weakSignalDbm: CreationOptional<number>;
  declare missedPercent: CreationOptional<number>;
  declare clockOffsetS: CreationOptional<number>;

  static register(sequelize: Sequelize) {
    SensorLimit.init(
      {
        cellarId: { type: DataTypes.UUID, primaryKey: true },
        lowBatteryDays: DataTypes.INTEGER,
        emptyBatteryV: DataTypes.DOUBLE,
        weakSignalDbm: DataTypes.INTEGER,
        missedPercent: DataTypes.INTEGER,
        clockOffsetS: DataTypes.INTEGER,
      },
      { sequelize, tableName: 'sensor_limits' },
    );
  }
}
