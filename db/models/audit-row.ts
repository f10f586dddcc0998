import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class AuditRow extends Model<InferAttributes<AuditRow>, InferCreationAttributes<AuditRow>> {
  declare id: CreationOptional<number>;
  declare cellarId: CreationOptional<string | null>;
  declare personId: CreationOptional<string | null>;
  declare at: CreationOptional<Date>;
  declare action: string;
  declare subject: string;
  declare address: CreationOptional<string | null>;
  declare means: CreationOptional<string | null>;
  declare detail: CreationOptional<Record<string, unknown>>;

  static register(sequelize: Sequelize) {
    AuditRow.init(
      {
        id: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
        cellarId: DataTypes.UUID,
        personId: DataTypes.UUID,
        at: DataTypes.DATE,
        action: DataTypes.TEXT,
        subject: DataTypes.TEXT,
        address: DataTypes.TEXT,
        means: DataTypes.TEXT,
        detail: DataTypes.JSONB,
      },
      { sequelize, tableName: 'audit' },
    );
  }
}
