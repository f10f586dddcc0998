import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { GravityUnit, TemperatureUnit, VolumeUnit } from '../../lib/core/units/chosen';

export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare email: string;
  declare passwordHash: CreationOptional<string | null>;
  declare timeZone: CreationOptional<string>;
  declare locale: CreationOptional<string>;
  declare gravityUnit: CreationOptional<GravityUnit>;
  declare temperatureUnit: CreationOptional<TemperatureUnit>;
  declare volumeUnit: CreationOptional<VolumeUnit>;
  declare totpSealed: CreationOptional<Buffer | null>;
  declare totpConfirmedAt: CreationOptional<Date | null>;
  declare totpLastStep: CreationOptional<number | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Person.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        name: DataTypes.TEXT,
        email: DataTypes.TEXT,
        passwordHash: DataTypes.TEXT,
        timeZone: DataTypes.TEXT,
        locale: DataTypes.TEXT,
        gravityUnit: DataTypes.TEXT,
        temperatureUnit: DataTypes.TEXT,
        volumeUnit: DataTypes.TEXT,
        totpSealed: DataTypes.BLOB,
        totpConfirmedAt: DataTypes.DATE,
        totpLastStep: DataTypes.BIGINT,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'people' },
    );
  }
}
