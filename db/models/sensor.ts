import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Sensor extends Model<InferAttributes<Sensor>, InferCreationAttributes<Sensor>> {
  declare id: CreationOptional<number>;
  declare cellarId: string;
  declare identifier: string;
  declare secretHash: Buffer;
  declare name: string;
  /** `file`: carries what an import brought, and speaks to nobody. */
  declare kind: CreationOptional<'float' | 'room' | 'foam' | 'file'>;
  declare intervalS: CreationOptional<number>;
  /** Where a room probe hangs. */
  declare place: CreationOptional<string | null>;
  declare disabledAt: CreationOptional<Date | null>;
  /** Removed sensors keep their row: what they measured stays where it counted. */
  declare removedAt: CreationOptional<Date | null>;
  /** Counts the settings that were sent down; 0: none were. */
  declare settingsVersion: CreationOptional<number>;
  declare wantedIntervalS: CreationOptional<number | null>;
  declare settingsAt: CreationOptional<Date | null>;
  /** The settings that the sensor itself said are in force. */
  declare confirmedVersion: CreationOptional<number | null>;
  declare confirmedAt: CreationOptional<Date | null>;
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
        place: DataTypes.TEXT,
        disabledAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
        settingsVersion: DataTypes.INTEGER,
        wantedIntervalS: DataTypes.INTEGER,
        settingsAt: DataTypes.DATE,
        confirmedVersion: DataTypes.INTEGER,
        confirmedAt: DataTypes.DATE,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'sensors' },
    );
  }
}
