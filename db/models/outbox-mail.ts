import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class OutboxMail extends Model<InferAttributes<OutboxMail>, InferCreationAttributes<OutboxMail>> {
  declare id: CreationOptional<number>;
  declare cellarId: CreationOptional<string | null>;
  declare alertId: CreationOptional<string | null>;
  declare personId: CreationOptional<string | null>;
  declare means: CreationOptional<'mail'>;
  declare dedupeKey: string;
  declare payload: Record<string, unknown>;
  declare createdAt: CreationOptional<Date>;
  declare nextAttemptAt: CreationOptional<Date>;
  declare leasedUntil: CreationOptional<Date | null>;
  declare attempts: CreationOptional<number>;
  declare refusals: CreationOptional<number>;
  declare sentAt: CreationOptional<Date | null>;
  declare failedAt: CreationOptional<Date | null>;
  declare lastError: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    OutboxMail.init(
      {
        id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
        cellarId: DataTypes.UUID,
        alertId: DataTypes.UUID,
        personId: DataTypes.UUID,
        means: DataTypes.TEXT,
        dedupeKey: DataTypes.TEXT,
        payload: DataTypes.JSONB,
        createdAt: DataTypes.DATE,
        nextAttemptAt: DataTypes.DATE,
        leasedUntil: DataTypes.DATE,
        attempts: DataTypes.INTEGER,
        refusals: DataTypes.INTEGER,
        sentAt: DataTypes.DATE,
        failedAt: DataTypes.DATE,
        lastError: DataTypes.TEXT,
      },
      { sequelize, tableName: 'outbox' },
    );
  }
}
