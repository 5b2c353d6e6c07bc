import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** A contemporaneous note; the database refuses to change or remove it. */
export class NoteRecord extends Model<
  InferAttributes<NoteRecord>,
  InferCreationAttributes<NoteRecord>
> {
  declare id: string;
  declare caseId: string;
  declare number: number;
  declare authorId: string;
  declare recordedAt: Date;
  declare happenedAt: Date | null;
  declare text: string;
  declare correctsNumber: number | null;
}

const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });

export const initNote = (sequelize: Sequelize) =>
  NoteRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      number: { type: DataTypes.INTEGER, allowNull: false },
      authorId: uuid(),
      recordedAt: { type: DataTypes.DATE(6), allowNull: false },
      happenedAt: { type: DataTypes.DATE(6), allowNull: true },
      text: { type: DataTypes.TEXT('medium'), allowNull: false },
      correctsNumber: { type: DataTypes.INTEGER, allowNull: true },
    },
    { sequelize, tableName: 'notes', modelName: 'note' },
  );
