import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** What became of bottles. */
export class Opening extends Model<InferAttributes<Opening>, InferCreationAttributes<Opening>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare lotId: string;
  declare lotBottleId: string;
  declare placeId: CreationOptional<string | null>;
  declare kind: 'opened' | 'given' | 'broken' | 'gushed';
  declare count: number;
  declare at: Date;
  declare givenTo: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  declare personId: CreationOptional<string | null>;
  declare clientId: CreationOptional<string | null>;
  declare removedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    Opening.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        lotId: DataTypes.UUID,
        lotBottleId: DataTypes.UUID,
        placeId: DataTypes.UUID,
        kind: DataTypes.TEXT,
        count: DataTypes.INTEGER,
        at: DataTypes.DATE,
        givenTo: DataTypes.TEXT,
        note: DataTypes.TEXT,
        personId: DataTypes.UUID,
        clientId: DataTypes.UUID,
        removedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'openings' },
    );
  }
}
