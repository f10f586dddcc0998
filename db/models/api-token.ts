import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { Role } from '../../lib/core/roles';

/** A key for a program of the person’s own; only its hash is kept. */
export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<string>;
  declare personId: string;
  declare cellarId: string;
  declare role: Role;
  declare name: string;
  declare tokenHash: Buffer;
  declare lastFour: string;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: CreationOptional<Date | null>;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    ApiToken.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        personId: DataTypes.UUID,
        cellarId: DataTypes.UUID,
        role: DataTypes.TEXT,
        name: DataTypes.TEXT,
        tokenHash: DataTypes.BLOB,
        lastFour: DataTypes.TEXT,
        createdAt: DataTypes.DATE,
        expiresAt: DataTypes.DATE,
        lastUsedAt: DataTypes.DATE,
        revokedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'api_tokens' },
    );
  }
}
