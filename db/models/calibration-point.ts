import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class CalibrationPointRow extends Model<InferAttributes<CalibrationPointRow>, InferCreationAttributes<CalibrationPointRow>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare sensorId: number;
  declare at: Date;
  declare inclination: number;
  declare gravity: number;
  declare temperature: number;
  declare source: 'water' | 'sugar' | 'hydrometer';
  declare sugarGPerL: CreationOptional<number | null>;
  declare entryId: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    CalibrationPointRow.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        sensorId: DataTypes.INTEGER,
        at: DataTypes.DATE,
        inclination: DataTypes.DOUBLE,
        gravity: DataTypes.DOUBLE,
        temperature: DataTypes.DOUBLE,
        source: DataTypes.TEXT,
        sugarGPerL: DataTypes.DOUBLE,
        entryId: DataTypes.UUID,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'calibration_points' },
    );
  }
}
