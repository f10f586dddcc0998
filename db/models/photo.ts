import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Photo extends Model<InferAttributes<Photo>, InferCreationAttributes<Photo>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare entryId: CreationOptional<string | null>;
  declare lotId: CreationOptional<string | null>;
  declare tastingId: CreationOptional<string | null>;
  declare bytes: number;
  declare width: number;
  declare height: number;
  declare caption: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    Photo.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        entryId: DataTypes.UUID,
        lotId: DataTypes.UUID,
        tastingId: DataTypes.UUID,
        bytes: DataTypes.INTEGER,
        width: DataTypes.INTEGER,
        height: DataTypes.INTEGER,
        caption: DataTypes.TEXT,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'photos' },
    );
  }
}
