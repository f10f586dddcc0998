import { DataTypes, Model, type CreationOptional, type InferAttributes, type InferCreationAttributes, type Sequelize } from 'sequelize';

/** A job on the rounds. */
export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<string>;
  declare cellarId: string;
  declare batchId: CreationOptional<string | null>;
  declare lotId: CreationOptional<string | null>;
  declare finingId: CreationOptional<string | null>;
  declare kind: string;
  declare title: string;
  declare note: CreationOptional<string | null>;
  declare source: 'call' | 'schedule' | 'timer' | 'person';
  declare dedupeKey: CreationOptional<string | null>;
  declare dueAt: Date;
  declare exact: CreationOptional<boolean>;
  declare repeatDays: CreationOptional<number | null>;
  /** The job that this one is the next turn of. */
  declare repeats: CreationOptional<string | null>;
  declare takenBy: CreationOptional<string | null>;
  declare takenAt: CreationOptional<Date | null>;
  declare snoozedUntil: CreationOptional<Date | null>;
  declare doneAt: CreationOptional<Date | null>;
  declare doneBy: CreationOptional<string | null>;
  declare droppedAt: CreationOptional<Date | null>;
  /** When the program last saw the reason for it. */
  declare seenAt: CreationOptional<Date | null>;
  /** When the program saw the reason gone. */
  declare overAt: CreationOptional<Date | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;

  static register(sequelize: Sequelize) {
    Job.init(
      {
        id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
        cellarId: DataTypes.UUID,
        batchId: DataTypes.UUID,
        lotId: DataTypes.UUID,
        finingId: DataTypes.UUID,
        kind: DataTypes.TEXT,
        title: DataTypes.TEXT,
        note: DataTypes.TEXT,
        source: DataTypes.TEXT,
        dedupeKey: DataTypes.TEXT,
        dueAt: DataTypes.DATE,
        exact: DataTypes.BOOLEAN,
        repeatDays: DataTypes.INTEGER,
        repeats: DataTypes.UUID,
        takenBy: DataTypes.UUID,
        takenAt: DataTypes.DATE,
        snoozedUntil: DataTypes.DATE,
        doneAt: DataTypes.DATE,
        doneBy: DataTypes.UUID,
        droppedAt: DataTypes.DATE,
        seenAt: DataTypes.DATE,
        overAt: DataTypes.DATE,
        createdBy: DataTypes.UUID,
        createdAt: DataTypes.DATE,
      },
      { sequelize, tableName: 'jobs' },
    );
  }
}
