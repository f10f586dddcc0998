import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { DrinkKind, Neck } from '../../lib/core/types';

export class Batch extends Model<InferAttributes<Batch>, InferCreationAttributes<Batch>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare name: string;
  declare kind: DrinkKind;
  declare drinkColour: string;
  declare vesselKind: 'demijohn' | 'carboy' | 'flask';
  declare tag: CreationOptional<number | null>;
  declare place: CreationOptional<string | null>;
  declare volumeL: number;
  declare vesselL: number;
  declare neck: Neck;
  declare pitchedAt: CreationOptional<Date | null>;
  declare originalGravity: CreationOptional<number | null>;
  declare yeast: CreationOptional<string | null>;
  declare attenuationMinPercent: CreationOptional<number | null>;
  declare attenuationMaxPercent: CreationOptional<number | null>;
  declare alcoholToleranceAbv: CreationOptional<number | null>;
  declare temperatureMinC: CreationOptional<number | null>;
  declare temperatureMaxC: CreationOptional<number | null>;
  declare state: CreationOptional<'working' | 'ended'>;
  declare endedAt: CreationOptional<Date | null>;
  declare mustVersionId: CreationOptional<string | null>;
  /** Part of what the must sheet made that is in this batch, 0 to 1. */
  declare mustShare: CreationOptional<number>;
  /** The import that brought it; undone, it goes. */
  declare importId: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Batch.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        name: DataTypes.TEXT,
        kind: DataTypes.TEXT,
        drinkColour: DataTypes.TEXT,
        vesselKind: DataTypes.TEXT,
        tag: DataTypes.INTEGER,
        place: DataTypes.TEXT,
        volumeL: DataTypes.DOUBLE,
        vesselL: DataTypes.DOUBLE,
        neck: DataTypes.TEXT,
        pitchedAt: DataTypes.DATE,
        originalGravity: DataTypes.DOUBLE,
        yeast: DataTypes.TEXT,
        attenuationMinPercent: DataTypes.DOUBLE,
        attenuationMaxPercent: DataTypes.DOUBLE,
        alcoholToleranceAbv: DataTypes.DOUBLE,
        temperatureMinC: DataTypes.DOUBLE,
        temperatureMaxC: DataTypes.DOUBLE,
        state: DataTypes.TEXT,
        endedAt: DataTypes.DATE,
        mustVersionId: DataTypes.UUID,
        mustShare: DataTypes.DOUBLE,
        importId: DataTypes.UUID,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        updatedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'batches' },
    );
  }
}
