import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** A fining in one or two doses. */
export class FiningRun extends Model<InferAttributes<FiningRun>, InferCreationAttributes<FiningRun>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare batchId: string;
  declare fining: string;
  declare intervalMin: CreationOptional<number | null>;
  declare settleDays: number;
  declare firstAt: Date;
  declare secondAt: CreationOptional<Date | null>;
  declare personId: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    FiningRun.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        batchId: DataTypes.UUID,
        fining: DataTypes.TEXT,
        intervalMin: DataTypes.INTEGER,
        settleDays: DataTypes.DOUBLE,
        firstAt: DataTypes.DATE,
        secondAt: DataTypes.DATE,
        personId: DataTypes.UUID,
      },
      { sequelize, tableName: 'finings' },
    );
  }
}
