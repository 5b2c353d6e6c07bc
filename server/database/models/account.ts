import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { AccountRole } from '#shared/contracts/accounts';

export class AccountRecord extends Model<
  InferAttributes<AccountRecord>,
  InferCreationAttributes<AccountRecord>
> {
  declare id: string;
  declare email: string;
  declare name: string;
  declare role: AccountRole;
  declare passwordHash: string;
  declare active: boolean;
  declare createdAt: Date;
}

export const initAccount = (sequelize: Sequelize) =>
  AccountRecord.init(
    {
      id: { type: DataTypes.CHAR(36), primaryKey: true },
      email: { type: DataTypes.STRING(320), allowNull: false },
      name: { type: DataTypes.STRING(120), allowNull: false },
      role: { type: DataTypes.STRING(20), allowNull: false },
      passwordHash: { type: DataTypes.STRING(200), allowNull: false },
      active: { type: DataTypes.BOOLEAN, allowNull: false },
      createdAt: { type: DataTypes.DATE(6), allowNull: false },
    },
    { sequelize, tableName: 'accounts', modelName: 'account' },
  );
