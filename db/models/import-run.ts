import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class ImportRun extends Model<InferAttributes<ImportRun>, InferCreationAttributes<ImportRun>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare kind: 'readings' | 'batches' | 'archive';
  declare fileName: string;
  declare counts: Record<string, number>;
  declare sensorId: CreationOptional<number | null>;
  declare batchId: CreationOptional<string | null>;
  /** Ids of what no batch takes along, by table. */
  declare made: CreationOptional<object>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare undoneAt: CreationOptional<Date | null>;
  declare undoneBy: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    ImportRun.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        kind: DataTypes.TEXT,
        fileName: DataTypes.TEXT,
        counts: DataTypes.JSONB,
        sensorId: DataTypes.INTEGER,
        batchId: DataTypes.UUID,
        made: DataTypes.JSONB,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
        undoneAt: DataTypes.DATE,
        undoneBy: DataTypes.UUID,
      },
      { sequelize, tableName: 'imports' },
    );
  }
}
