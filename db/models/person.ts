import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare email: string;
  declare passwordHash: CreationOptional<string | null>;
  declare timeZone: CreationOptional<string>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Person.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        name: DataTypes.TEXT,
        email: DataTypes.TEXT,
        passwordHash: DataTypes.TEXT,
        timeZone: DataTypes.TEXT,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'people' },
    );
  }
}
