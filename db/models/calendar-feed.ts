import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class CalendarFeed extends Model<InferAttributes<CalendarFeed>, InferCreationAttributes<CalendarFeed>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare personId: string;
  declare tokenHash: Buffer;
  declare createdAt: CreationOptional<Date>;
  declare lastReadAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    CalendarFeed.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        personId: DataTypes.UUID,
        tokenHash: DataTypes.BLOB,
        createdAt: DataTypes.DATE,
        lastReadAt: DataTypes.DATE,
        revokedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'calendar_feeds' },
    );
  }
}
