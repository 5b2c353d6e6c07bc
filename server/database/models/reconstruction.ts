import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** One alternative: `document` is a `centrode.reconstruction/1` as JSON text. */
export class ReconstructionRecord extends Model<
  InferAttributes<ReconstructionRecord>,
  InferCreationAttributes<ReconstructionRecord>
> {
  declare id: string;
  declare caseId: string;
  declare name: string;
  declare assumption: string;
  declare document: string;
  declare version: number;
  declare changedBy: string;
  declare changedAt: Date;
}

const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });

export const initReconstruction = (sequelize: Sequelize) =>
  ReconstructionRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      name: { type: DataTypes.STRING(120), allowNull: false },
      assumption: { type: DataTypes.STRING(1000), allowNull: false },
      document: { type: DataTypes.TEXT('long'), allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false },
      changedBy: uuid(),
      changedAt: { type: DataTypes.DATE(6), allowNull: false },
    },
    { sequelize, tableName: 'reconstructions', modelName: 'reconstruction' },
  );
