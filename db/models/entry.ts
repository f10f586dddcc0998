import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { Neck } from '../../lib/core/types';

export class Entry extends Model<InferAttributes<Entry>, InferCreationAttributes<Entry>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare batchId: string;
  declare kind: string;
  declare at: Date;
  declare text: CreationOptional<string | null>;
  declare gravity: CreationOptional<number | null>;
  declare gravityRead: CreationOptional<number | null>;
  declare temperatureC: CreationOptional<number | null>;
  declare calibratedAtC: CreationOptional<number | null>;
  declare neck: CreationOptional<Neck | null>;
  declare volumeL: CreationOptional<number | null>;
  declare sugarG: CreationOptional<number | null>;
  declare fruitG: CreationOptional<number | null>;
  /** What else was measured or went in, in the wire's names. */
  declare detail: CreationOptional<Record<string, unknown> | null>;
  declare revisedAt: CreationOptional<Date | null>;
  declare personId: CreationOptional<string | null>;
  declare clientId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;
  declare removedBy: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    Entry.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        batchId: DataTypes.UUID,
        kind: DataTypes.TEXT,
        at: DataTypes.DATE,
        text: DataTypes.TEXT,
        gravity: DataTypes.DOUBLE,
        gravityRead: DataTypes.DOUBLE,
        temperatureC: DataTypes.DOUBLE,
        calibratedAtC: DataTypes.DOUBLE,
        neck: DataTypes.TEXT,
        volumeL: DataTypes.DOUBLE,
        sugarG: DataTypes.DOUBLE,
        fruitG: DataTypes.DOUBLE,
        detail: DataTypes.JSONB,
        revisedAt: DataTypes.DATE,
        personId: DataTypes.UUID,
        clientId: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
        removedBy: DataTypes.UUID,
      },
      { sequelize, tableName: 'entries' },
    );
  }
}
