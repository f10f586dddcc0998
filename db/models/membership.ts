import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { Role } from '../../lib/core/roles';

export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare cellarId: string;
  declare personId: string;
  declare role: Role;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Membership.init(
      {
        cellarId: { type: DataTypes.UUID, primaryKey: true },
        personId: { type: DataTypes.UUID, primaryKey: true },
        role: DataTypes.TEXT,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'memberships' },
    );
  }
}
