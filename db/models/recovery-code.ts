import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** Opens the account once where the authenticator is lost; only its hash is kept. */
export class RecoveryCode extends Model<InferAttributes<RecoveryCode>, InferCreationAttributes<RecoveryCode>> {
  declare id: CreationOptional<string>;
  declare personId: string;
  declare codeHash: Buffer;
  declare usedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    RecoveryCode.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        personId: DataTypes.UUID,
        codeHash: DataTypes.BLOB,
        usedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'recovery_codes' },
    );
  }
}
