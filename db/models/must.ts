import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { DrinkKind } from '../../lib/core/types';

/** A must sheet; what it says is in its versions. */
export class Must extends Model<InferAttributes<Must>, InferCreationAttributes<Must>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare name: string;
  declare kind: DrinkKind;
  declare latest: CreationOptional<number>;
  declare changedAt: CreationOptional<Date>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Must.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        name: DataTypes.TEXT,
        kind: DataTypes.TEXT,
        latest: DataTypes.INTEGER,
        changedAt: DataTypes.DATE,
        archivedAt: DataTypes.DATE,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'must_sheets' },
    );
  }
}
