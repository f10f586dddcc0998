import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class ProbeAssignment extends Model<InferAttributes<ProbeAssignment>, InferCreationAttributes<ProbeAssignment>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare sensorId: number;
  declare batchId: string;
  declare fromAt: Date;
  declare toAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    ProbeAssignment.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        sensorId: DataTypes.INTEGER,
        batchId: DataTypes.UUID,
        fromAt: DataTypes.DATE,
        toAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'probe_assignments' },
    );
  }
}
