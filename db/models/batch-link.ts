import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** Drink that went from one batch into another. */
export class BatchLink extends Model<InferAttributes<BatchLink>, InferCreationAttributes<BatchLink>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare fromBatch: string;
  declare toBatch: string;
  declare kind: 'split' | 'blend' | 'top_up';
  declare litres: number;
  declare at: Date;
  declare personId: CreationOptional<string | null>;

  static register(sequelize: Sequelize) {
    BatchLink.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        fromBatch: DataTypes.UUID,
        toBatch: DataTypes.UUID,
        kind: DataTypes.TEXT,
        litres: DataTypes.DOUBLE,
        at: DataTypes.DATE,
        personId: DataTypes.UUID,
      },
      { sequelize, tableName: 'batch_links' },
    );
  }
}
