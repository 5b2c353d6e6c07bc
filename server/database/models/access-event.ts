import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** One event of the access log. `canonical` is the exact text that was hashed; the columns repeat it for queries. */
export class AccessEventRecord extends Model<
  InferAttributes<AccessEventRecord>,
  InferCreationAttributes<AccessEventRecord>
> {
  declare sequence: number;
  declare caseId: string | null;
  declare actorId: string | null;
  declare action: string;
  declare canonical: string;
  declare hash: string;
}

export const initAccessEvent = (sequelize: Sequelize) =>
  AccessEventRecord.init(
    {
      sequence: { type: DataTypes.BIGINT, primaryKey: true },
      caseId: { type: DataTypes.CHAR(36), allowNull: true },
      actorId: { type: DataTypes.CHAR(36), allowNull: true },
      action: { type: DataTypes.STRING(60), allowNull: false },
      canonical: { type: DataTypes.TEXT('medium'), allowNull: false },
      hash: { type: DataTypes.CHAR(64), allowNull: false },
    },
    { sequelize, tableName: 'access_events', modelName: 'accessEvent' },
  );
