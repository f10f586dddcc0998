import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { Role } from '../../lib/core/roles';

/** Lets whoever holds its mail into a cellar, once. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare email: string;
  declare role: Role;
  declare tokenHash: Buffer;
  declare invitedBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare acceptedBy: CreationOptional<string | null>;
  declare revokedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    Invitation.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        email: DataTypes.TEXT,
        role: DataTypes.TEXT,
        tokenHash: DataTypes.BLOB,
        invitedBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        expiresAt: DataTypes.DATE,
        acceptedAt: DataTypes.DATE,
        acceptedBy: DataTypes.UUID,
        revokedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'invitations' },
    );
  }
}
