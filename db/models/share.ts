import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** A public, read-only link to one batch. */
export class Share extends Model<InferAttributes<Share>, InferCreationAttributes<Share>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare batchId: string;
  declare tokenHash: Buffer;
  declare expiresAt: Date;
  declare revokedAt: CreationOptional<Date | null>;
  declare showPeople: CreationOptional<boolean>;
  declare takesTastings: CreationOptional<boolean>;
  declare lookedAt: CreationOptional<number>;
  declare lastLookedAt: CreationOptional<Date | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Share.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        batchId: DataTypes.UUID,
        tokenHash: DataTypes.BLOB,
        expiresAt: DataTypes.DATE,
        revokedAt: DataTypes.DATE,
        showPeople: DataTypes.BOOLEAN,
        takesTastings: DataTypes.BOOLEAN,
        lookedAt: DataTypes.INTEGER,
        lastLookedAt: DataTypes.DATE,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'shares' },
    );
  }
}
