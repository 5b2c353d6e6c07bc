import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** A release, frozen: `snapshot` is the canonical text that the ledger names by `snapshotHash`. */
export class ReleaseRecord extends Model<
  InferAttributes<ReleaseRecord>,
  InferCreationAttributes<ReleaseRecord>
> {
  declare id: string;
  declare caseId: string;
  declare number: number;
  declare partyId: string;
  declare releasedAt: Date;
  declare releasedBy: string;
  declare snapshot: string;
  declare snapshotHash: string;
  /** Sequence of the event "released" in the custody ledger of the case. */
  declare ledgerSequence: number;
}

export class ReleaseWithdrawalRecord extends Model<
  InferAttributes<ReleaseWithdrawalRecord>,
  InferCreationAttributes<ReleaseWithdrawalRecord>
> {
  declare releaseId: string;
  declare withdrawnAt: Date;
  declare withdrawnBy: string;
  declare reason: string;
}

export class ReleaseOpeningRecord extends Model<
  InferAttributes<ReleaseOpeningRecord>,
  InferCreationAttributes<ReleaseOpeningRecord>
> {
  declare id: string;
  declare releaseId: string;
  declare accountId: string;
  declare openedAt: Date;
  declare what: 'summary' | 'archive';
}

export class ReleaseArchiveRecord extends Model<
  InferAttributes<ReleaseArchiveRecord>,
  InferCreationAttributes<ReleaseArchiveRecord>
> {
  declare releaseId: string;
  declare state: 'building' | 'ready' | 'failed';
  declare size: number | null;
  declare sha256: string | null;
  declare message: string;
}

const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });
const moment = () => ({ type: DataTypes.DATE(6), allowNull: false });

export function initReleases(sequelize: Sequelize): void {
  ReleaseRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      number: { type: DataTypes.INTEGER, allowNull: false },
      partyId: uuid(),
      releasedAt: moment(),
      releasedBy: uuid(),
      snapshot: { type: DataTypes.TEXT('long'), allowNull: false },
      snapshotHash: { type: DataTypes.CHAR(64), allowNull: false },
      ledgerSequence: { type: DataTypes.INTEGER, allowNull: false },
    },
    { sequelize, tableName: 'releases', modelName: 'release' },
  );
  ReleaseWithdrawalRecord.init(
    {
      releaseId: { ...uuid(), primaryKey: true },
      withdrawnAt: moment(),
      withdrawnBy: uuid(),
      reason: { type: DataTypes.STRING(1000), allowNull: false },
    },
    { sequelize, tableName: 'release_withdrawals', modelName: 'releaseWithdrawal' },
  );
  ReleaseOpeningRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      releaseId: uuid(),
      accountId: uuid(),
      openedAt: moment(),
      what: { type: DataTypes.STRING(12), allowNull: false },
    },
    { sequelize, tableName: 'release_openings', modelName: 'releaseOpening' },
  );
  ReleaseArchiveRecord.init(
    {
      releaseId: { ...uuid(), primaryKey: true },
      state: { type: DataTypes.STRING(12), allowNull: false },
      size: { type: DataTypes.BIGINT, allowNull: true },
      sha256: { type: DataTypes.CHAR(64), allowNull: true },
      message: { type: DataTypes.STRING(1000), allowNull: false, defaultValue: '' },
    },
    { sequelize, tableName: 'release_archives', modelName: 'releaseArchive' },
  );
}
