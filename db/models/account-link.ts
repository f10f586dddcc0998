import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** What a mailed link may do, once. */
export class AccountLink extends Model<InferAttributes<AccountLink>, InferCreationAttributes<AccountLink>> {
  declare id: CreationOptional<string>;
  declare kind: 'sign-in' | 'password' | 'mail-old' | 'mail-new';
  declare personId: CreationOptional<string | null>;
  declare tokenHash: Buffer;
  declare newEmail: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    AccountLink.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        kind: DataTypes.TEXT,
        personId: DataTypes.UUID,
        tokenHash: DataTypes.BLOB,
        newEmail: DataTypes.TEXT,
        createdAt: DataTypes.DATE,
        expiresAt: DataTypes.DATE,
        usedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'account_links' },
    );
  }
}
