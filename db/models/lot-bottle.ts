import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { BottleKind, Closure } from '../../lib/core/bottling/bottles';

/** Bottles of one size and kind in a lot. */
export class LotBottle extends Model<InferAttributes<LotBottle>, InferCreationAttributes<LotBottle>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare lotId: string;
  declare position: number;
  declare kind: BottleKind;
  declare closure: Closure;
  declare sizeMl: number;
  /** Null: glass that must stay still. */
  declare ratingBar: CreationOptional<number | null>;
  declare ratingConfirmed: boolean;
  declare count: number;
  declare pressure: unknown;

  static register(sequelize: Sequelize) {
    LotBottle.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        lotId: DataTypes.UUID,
        position: DataTypes.INTEGER,
        kind: DataTypes.TEXT,
        closure: DataTypes.TEXT,
        sizeMl: DataTypes.INTEGER,
        ratingBar: DataTypes.DOUBLE,
        ratingConfirmed: DataTypes.BOOLEAN,
        count: DataTypes.INTEGER,
        pressure: DataTypes.JSONB,
      },
      { sequelize, tableName: 'lot_bottles' },
    );
  }
}
