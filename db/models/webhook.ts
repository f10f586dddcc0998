import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Webhook extends Model<InferAttributes<Webhook>, InferCreationAttributes<Webhook>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare url: string;
  declare events: string[];
  declare secret: Buffer;
  declare note: CreationOptional<string | null>;
  declare disabledAt: CreationOptional<Date | null>;
  /** Since when no delivery arrives. */
  declare failingSince: CreationOptional<Date | null>;
  /** Switched off because none arrived for long. */
  declare givenUpAt: CreationOptional<Date | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Webhook.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        url: DataTypes.TEXT,
        events: DataTypes.ARRAY(DataTypes.TEXT),
        secret: DataTypes.BLOB,
        note: DataTypes.TEXT,
        disabledAt: DataTypes.DATE,
        failingSince: DataTypes.DATE,
        givenUpAt: DataTypes.DATE,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'webhooks' },
    );
  }
}
