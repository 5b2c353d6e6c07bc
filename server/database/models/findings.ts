import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** The findings of a case: `document` is JSON of the answers and figures as they were saved. */
export class FindingsRecord extends Model<
  InferAttributes<FindingsRecord>,
  InferCreationAttributes<FindingsRecord>
> {
  declare caseId: string;
  declare document: string;
  declare version: number;
  declare changedBy: string;
  declare changedAt: Date;
}

export const initFindings = (sequelize: Sequelize) =>
  FindingsRecord.init(
    {
      caseId: { type: DataTypes.CHAR(36), primaryKey: true },
      document: { type: DataTypes.TEXT('long'), allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false },
      changedBy: { type: DataTypes.CHAR(36), allowNull: false },
      changedAt: { type: DataTypes.DATE(6), allowNull: false },
    },
    { sequelize, tableName: 'findings', modelName: 'findings' },
  );
