import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** What an entry said before a correction. */
export class EntryRevision extends Model<InferAttributes<EntryRevision>, InferCreationAttributes<EntryRevision>> {
  declare id: CreationOptional<number>;
  declare cellarId: string;
  declare entryId: string;
  declare at: Date;
  declare personId: CreationOptional<string | null>;
  declare before: unknown;

  static register(sequelize: Sequelize) {
    EntryRevision.init(
      {
        id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
        cellarId: DataTypes.UUID,
        entryId: DataTypes.UUID,
        at: DataTypes.DATE,
        personId: DataTypes.UUID,
        before: DataTypes.JSONB,
      },
      { sequelize, tableName: 'entry_revisions' },
    );
  }
}
