import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** The answer to an act that must be done once, written in the act's own transaction. */
export class IdempotencyKey extends Model<
  InferAttributes<IdempotencyKey>,
  InferCreationAttributes<IdempotencyKey>
> {
  declare accountId: string;
  declare key: string;
  declare digest: string;
  declare status: number;
  declare answer: string;
}

export const initIdempotencyKey = (sequelize: Sequelize) =>
  IdempotencyKey.init(
    {
      accountId: { type: DataTypes.CHAR(36), primaryKey: true },
      key: { type: DataTypes.STRING(80), primaryKey: true, field: 'idempotency_key' },
      digest: { type: DataTypes.CHAR(64), allowNull: false },
      status: { type: DataTypes.INTEGER, allowNull: false },
      answer: { type: DataTypes.TEXT('long'), allowNull: false },
    },
    { sequelize, tableName: 'idempotency_keys', modelName: 'idempotencyKey' },
  );
