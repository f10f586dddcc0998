import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Cellar extends Model<InferAttributes<Cellar>, InferCreationAttributes<Cellar>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare timeZone: CreationOptional<string>;
  /** ISO 4217; null: costs are figures alone. */
  declare currency: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Cellar.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        name: DataTypes.TEXT,
        timeZone: DataTypes.TEXT,
        currency: DataTypes.TEXT,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'cellars' },
    );
  }
}
