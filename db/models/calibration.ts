import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
export class CalibrationRow extends Model<InferAttributes<CalibrationRow>, InferCreationAttributes<CalibrationRow>> {
  declare id: CreationOptional<number>;
  declare cellarId: string;
  declare sensorId: number;
  declare version: number;
  declare appliesFrom: Date;
  declare coefficients: CreationOptional<number[] | null>;
  declare lowDeg: CreationOptional<number | null>;
  declare highDeg: CreationOptional<number | null>;
  declare offsetSg: CreationOptional<number>;
  declare correctsTemperature: CreationOptional<boolean>;
  declare sigma: CreationOptional<number | null>;
  declare points: CreationOptional<unknown[]>;
  declare note: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;
  declare removedBy: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    CalibrationRow.init(
      {
        id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
        cellarId: DataTypes.UUID,
        sensorId: DataTypes.INTEGER,
        version: DataTypes.INTEGER,
        appliesFrom: DataTypes.DATE,
        coefficients: DataTypes.ARRAY(DataTypes.DOUBLE),
        lowDeg: DataTypes.DOUBLE,
        highDeg: DataTypes.DOUBLE,
        offsetSg: DataTypes.DOUBLE,
        correctsTemperature: DataTypes.BOOLEAN,
        sigma: DataTypes.DOUBLE,
        points: DataTypes.JSONB,
        note: DataTypes.TEXT,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
        removedBy: DataTypes.UUID,
      },
      { sequelize, tableName: 'calibrations' },
    );
  }
}
