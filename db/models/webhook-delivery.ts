import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class WebhookDelivery extends Model<InferAttributes<WebhookDelivery>, InferCreationAttributes<WebhookDelivery>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare webhookId: string;
  declare event: string;
  declare payload: object;
  declare createdAt: CreationOptional<Date>;
  declare nextAttemptAt: CreationOptional<Date>;
  declare leasedUntil: CreationOptional<Date | null>;
  declare attempts: CreationOptional<number>;
  declare deliveredAt: CreationOptional<Date | null>;
  declare failedAt: CreationOptional<Date | null>;
  declare lastStatus: CreationOptional<number | null>;
  declare lastError: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    WebhookDelivery.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        webhookId: DataTypes.UUID,
        event: DataTypes.TEXT,
        payload: DataTypes.JSONB,
        createdAt: DataTypes.DATE,
        nextAttemptAt: DataTypes.DATE,
        leasedUntil: DataTypes.DATE,
        attempts: DataTypes.INTEGER,
        deliveredAt: DataTypes.DATE,
        failedAt: DataTypes.DATE,
        lastStatus: DataTypes.INTEGER,
        lastError: DataTypes.TEXT,
      },
      { sequelize, tableName: 'webhook_deliveries' },
    );
  }
}
