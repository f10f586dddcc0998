import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';
import type { Call, CallName } from '../../lib/core/types';

export class Alert extends Model<InferAttributes<Alert>, InferCreationAttributes<Alert>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare batchId: string;
  declare call: CallName;
  declare kind: CreationOptional<string | null>;
  declare level: 'act' | 'check' | 'know';
  declare state: 'open' | 'acknowledged' | 'resolved';
  declare since: Date;
  declare openedAt: Date;
  declare acknowledgedAt: CreationOptional<Date | null>;
  declare acknowledgedBy: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  declare lookAgainAt: CreationOptional<Date | null>;
  declare resolvedAt: CreationOptional<Date | null>;
  declare resolvedBy: CreationOptional<string | null>;
  declare evidence: Call;

  static register(sequelize: Sequelize) {
    Alert.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        batchId: DataTypes.UUID,
        call: DataTypes.TEXT,
        kind: DataTypes.TEXT,
        level: DataTypes.TEXT,
        state: DataTypes.TEXT,
        since: DataTypes.DATE,
        openedAt: DataTypes.DATE,
        acknowledgedAt: DataTypes.DATE,
        acknowledgedBy: DataTypes.UUID,
        note: DataTypes.TEXT,
        lookAgainAt: DataTypes.DATE,
        resolvedAt: DataTypes.DATE,
        resolvedBy: DataTypes.UUID,
        evidence: DataTypes.JSONB,
      },
      { sequelize, tableName: 'alerts' },
    );
  }
}
