import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Sensor extends Model<InferAttributes<Sensor>, InferCreationAttributes<Sensor>> {
  declare id: CreationOptional<number>;
  declare cellarId: string;
  declare identifier: string;
  declare secretHash: Buffer;
  declare name: string;
  declare kind: CreationOptional<'float'>;
  declare intervalS: CreationOptional<number>;
  declare disabledAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Sensor.init(
      {
        id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
        cellarId: DataTypes.UUID,
        identifier: DataTypes.TEXT,
        secretHash: DataTypes.BLOB,
        name: DataTypes.TEXT,
        kind: DataTypes.TEXT,
        intervalS: DataTypes.INTEGER,
        disabledAt: DataTypes.DATE,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'sensors' },
    );
  }
}
