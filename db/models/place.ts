import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Place extends Model<InferAttributes<Place>, InferCreationAttributes<Place>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare name: string;
  declare capacity: CreationOptional<number | null>;
  declare temperatureC: CreationOptional<number | null>;
  declare createdAt: CreationOptional<Date>;
  declare removedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    Place.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        name: DataTypes.TEXT,
        capacity: DataTypes.INTEGER,
        temperatureC: DataTypes.DOUBLE,
        createdAt: DataTypes.DATE,
        removedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'places' },
    );
  }
}
