import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** A recorded computation: `document` is the canonical text whose SHA-256 is `hash`; never changed. */
export class ComputationRecord extends Model<
  InferAttributes<ComputationRecord>,
  InferCreationAttributes<ComputationRecord>
> {
  declare caseId: string;
  declare hash: string;
  declare sequence: number;
  declare kind: string;
  declare reconstructionId: string;
  declare reconstructionName: string;
  declare stationId: string;
  declare stationName: string;
  declare status: string;
  declare document: string;
  declare recordedBy: string;
  declare recordedAt: Date;
}

const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });

export const initComputation = (sequelize: Sequelize) =>
  ComputationRecord.init(
    {
      caseId: { ...uuid(), primaryKey: true },
      hash: { type: DataTypes.CHAR(64), primaryKey: true },
      sequence: { type: DataTypes.INTEGER, allowNull: false },
      kind: { type: DataTypes.STRING(40), allowNull: false },
      reconstructionId: uuid(),
      reconstructionName: { type: DataTypes.STRING(120), allowNull: false },
      stationId: { type: DataTypes.STRING(40), allowNull: false },
      stationName: { type: DataTypes.STRING(80), allowNull: false },
      status: { type: DataTypes.STRING(24), allowNull: false },
      document: { type: DataTypes.TEXT('long'), allowNull: false },
      recordedBy: uuid(),
      recordedAt: { type: DataTypes.DATE(6), allowNull: false },
    },
    { sequelize, tableName: 'computations', modelName: 'computation' },
  );
