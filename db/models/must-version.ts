import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** One version of a must sheet; it is never changed. */
export class MustVersion extends Model<InferAttributes<MustVersion>, InferCreationAttributes<MustVersion>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare mustId: string;
  declare version: number;
  /** The sheet as the wire has it. */
  declare body: unknown;
  declare sketch: CreationOptional<object>;
  declare changeNote: CreationOptional<string | null>;
  declare copiedFrom: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    MustVersion.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        mustId: DataTypes.UUID,
        version: DataTypes.INTEGER,
        body: DataTypes.JSONB,
        sketch: DataTypes.JSONB,
        changeNote: DataTypes.TEXT,
        copiedFrom: DataTypes.UUID,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'must_versions' },
    );
  }
}
