import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { CustodyEventKind } from '#shared/contracts/custody';

/** Where the chain of a case stands; the row that every append locks. */
export class CustodyChainRecord extends Model<
  InferAttributes<CustodyChainRecord>,
  InferCreationAttributes<CustodyChainRecord>
> {
  declare caseId: string;
  declare sequence: number;
  declare hash: string;
  declare lastOrdinal: number;
}

/** One event of the ledger. `canonical` is the exact text that was hashed; the columns repeat it. */
export class CustodyEventRecord extends Model<
  InferAttributes<CustodyEventRecord>,
  InferCreationAttributes<CustodyEventRecord>
> {
  declare caseId: string;
  declare sequence: number;
  declare exhibit: string | null;
  declare kind: CustodyEventKind;
  declare recordedAt: string;
  declare previousHash: string;
  declare canonical: string;
  declare hash: string;
}

export class CustodyHeadRecord extends Model<
  InferAttributes<CustodyHeadRecord>,
  InferCreationAttributes<CustodyHeadRecord>
> {
  declare caseId: string;
  declare sequence: number;
  declare hash: string;
  declare signedAt: string;
  declare keyId: string;
  declare signature: string;
}

const key = () => ({ type: DataTypes.CHAR(36), allowNull: false, primaryKey: true });
const hash = () => ({ type: DataTypes.CHAR(64), allowNull: false });
const whole = () => ({ type: DataTypes.INTEGER, allowNull: false });
const moment = () => ({ type: DataTypes.CHAR(27), allowNull: false });

export function initCustody(sequelize: Sequelize): void {
  CustodyChainRecord.init(
    { caseId: key(), sequence: whole(), hash: hash(), lastOrdinal: whole() },
    { sequelize, tableName: 'custody_chains', modelName: 'custodyChain' },
  );
  CustodyEventRecord.init(
    {
      caseId: key(),
      sequence: { ...whole(), primaryKey: true },
      exhibit: { type: DataTypes.STRING(40), allowNull: true },
      kind: { type: DataTypes.STRING(24), allowNull: false },
      recordedAt: moment(),
      previousHash: { ...hash(), field: 'previous' },
      canonical: { type: DataTypes.TEXT('medium'), allowNull: false },
      hash: hash(),
    },
    { sequelize, tableName: 'custody_events', modelName: 'custodyEvent' },
  );
  CustodyHeadRecord.init(
    {
      caseId: key(),
      sequence: { ...whole(), primaryKey: true },
      hash: hash(),
      signedAt: moment(),
      keyId: { type: DataTypes.CHAR(16), allowNull: false },
      signature: { type: DataTypes.CHAR(128), allowNull: false },
    },
    { sequelize, tableName: 'custody_heads', modelName: 'custodyHead' },
  );
}
