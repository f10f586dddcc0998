import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class CatalogueItem extends Model<InferAttributes<CatalogueItem>, InferCreationAttributes<CatalogueItem>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare sort: 'ingredient' | 'yeast';
  declare body: unknown;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    CatalogueItem.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        sort: DataTypes.TEXT,
        body: DataTypes.JSONB,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'catalogue_items' },
    );
  }
}
