import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Tasting extends Model<InferAttributes<Tasting>, InferCreationAttributes<Tasting>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare lotId: string;
  declare personId: CreationOptional<string | null>;
  declare shareId: CreationOptional<string | null>;
  declare guestName: CreationOptional<string | null>;
  declare at: Date;
  declare look: CreationOptional<number | null>;
  declare smell: CreationOptional<number | null>;
  declare taste: CreationOptional<number | null>;
  declare balance: CreationOptional<number | null>;
  declare sparkle: CreationOptional<'flat' | 'less' | 'as_planned' | 'more' | 'gushing' | null>;
  declare score: CreationOptional<number | null>;
  declare words: CreationOptional<string | null>;
  declare nextTime: CreationOptional<string | null>;
  declare showName: CreationOptional<boolean>;
  declare clientId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    Tasting.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        lotId: DataTypes.UUID,
        personId: DataTypes.UUID,
        shareId: DataTypes.UUID,
        guestName: DataTypes.TEXT,
        at: DataTypes.DATE,
        look: DataTypes.INTEGER,
        smell: DataTypes.INTEGER,
        taste: DataTypes.INTEGER,
        balance: DataTypes.INTEGER,
        sparkle: DataTypes.TEXT,
        score: DataTypes.DOUBLE,
        words: DataTypes.TEXT,
        nextTime: DataTypes.TEXT,
        showName: DataTypes.BOOLEAN,
        clientId: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'tastings' },
    );
  }
}
