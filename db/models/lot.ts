import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { Range } from '../../lib/core/units/range';

export class Lot extends Model<InferAttributes<Lot>, InferCreationAttributes<Lot>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare batchId: string;
  declare code: string;
  declare name: string;
  declare bottledAt: Date;
  declare readyFrom: Date;
  declare volumeL: number;
  declare originalGravity: CreationOptional<number | null>;
  declare finalGravity: CreationOptional<number | null>;
  /** By Balling, priming counted, % vol. */
  declare abv: CreationOptional<Range | null>;
  declare sparkle: 'still' | 'light' | 'sparkling';
  /** The plan, the dose and the pressures as they were judged on the day. */
  declare bench: unknown;
  declare overrideReason: CreationOptional<string | null>;
  declare overrideBy: CreationOptional<string | null>;
  declare overrideAt: CreationOptional<Date | null>;
  declare caution: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  declare nextTime: CreationOptional<string | null>;
  declare nextTimeBy: CreationOptional<string | null>;
  declare nextTimeAt: CreationOptional<Date | null>;
  declare cost: CreationOptional<object>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Lot.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        batchId: DataTypes.UUID,
        code: DataTypes.TEXT,
        name: DataTypes.TEXT,
        bottledAt: DataTypes.DATE,
        readyFrom: DataTypes.DATE,
        volumeL: DataTypes.DOUBLE,
        originalGravity: DataTypes.DOUBLE,
        finalGravity: DataTypes.DOUBLE,
        abv: DataTypes.JSONB,
        sparkle: DataTypes.TEXT,
        bench: DataTypes.JSONB,
        overrideReason: DataTypes.TEXT,
        overrideBy: DataTypes.UUID,
        overrideAt: DataTypes.DATE,
        caution: DataTypes.TEXT,
        note: DataTypes.TEXT,
        nextTime: DataTypes.TEXT,
        nextTimeBy: DataTypes.UUID,
        nextTimeAt: DataTypes.DATE,
        cost: DataTypes.JSONB,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'lots' },
    );
  }
}
