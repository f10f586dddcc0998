import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

export class SignIn extends Model<InferAttributes<SignIn>, InferCreationAttributes<SignIn>> {
  declare id: CreationOptional<string>;
  declare personId: string;
  declare userAgent: CreationOptional<string>;
  declare createdAt: CreationOptional<Date>;
  declare lastSeenAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare idleS: CreationOptional<number>;
  declare endedAt: CreationOptional<Date | null>;

  static register(sequelize: Sequelize) {
    SignIn.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        personId: DataTypes.UUID,
        userAgent: DataTypes.TEXT,
        createdAt: DataTypes.DATE,
        lastSeenAt: DataTypes.DATE,
        expiresAt: DataTypes.DATE,
        idleS: DataTypes.INTEGER,
        endedAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'sign_ins' },
    );
  }
}
