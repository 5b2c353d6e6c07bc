import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { exhibitKinds } from '#shared/contracts/exhibits';

export class ExhibitRecord extends Model<
  InferAttributes<ExhibitRecord>,
  InferCreationAttributes<ExhibitRecord>
> {
  declare id: string;
  declare caseId: string;
  declare ordinal: number;
  declare number: string;
  declare kind: (typeof exhibitKinds)[number];
  declare description: string;
  declare source: string;
  declare collectedBy: string;
  declare collectedAt: Date | null;
  declare collectedPlace: string;
  declare conditionOnReceipt: string;
  declare packaging: string;
  declare sealOnReceipt: string;
  declare sensitive: boolean;
  declare parentNumber: string | null;
  declare registeredAt: Date;
  declare registeredBy: string;
  declare version: CreationOptional<number>;
  /** From here on: where the item is now, as the ledger's events have left it. */
  declare holderId: string | null;
  declare heldSince: Date | null;
  declare location: string;
  declare seal: string;
  declare pendingSequence: CreationOptional<number | null>;
  declare pendingToId: CreationOptional<string | null>;
}

export class ExhibitFileRecord extends Model<
  InferAttributes<ExhibitFileRecord>,
  InferCreationAttributes<ExhibitFileRecord>
> {
  declare id: string;
  declare caseId: string;
  declare exhibitId: string;
  declare name: string;
  declare mediaType: string;
  declare size: number;
  declare sha256: string;
  declare sha512: string;
  declare statedSha256: string | null;
  declare takenInAt: Date;
  /** The ledger's event that took it in. */
  declare eventSequence: number;
  declare width: number | null;
  declare height: number | null;
  declare latitude: number | null;
  declare longitude: number | null;
  /** What the picture's metadata says, as JSON. */
  declare metadata: string | null;
}

export class DerivativeRecord extends Model<
  InferAttributes<DerivativeRecord>,
  InferCreationAttributes<DerivativeRecord>
> {
  declare fileId: string;
  declare kind: 'thumbnail' | 'thumbnail-blurred' | 'screen';
  declare mediaType: string;
  declare width: number;
  declare height: number;
  declare size: number;
  declare sha256: string;
  declare recipe: string;
}

const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });
const optionalUuid = () => ({ type: DataTypes.CHAR(36), allowNull: true });
const hash = () => ({ type: DataTypes.CHAR(64), allowNull: false });
const line = (most: number) => ({ type: DataTypes.STRING(most), allowNull: false });
const whole = () => ({ type: DataTypes.INTEGER, allowNull: false });
const time = () => ({ type: DataTypes.DATE(6), allowNull: false });

export function initExhibits(sequelize: Sequelize): void {
  ExhibitRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      ordinal: whole(),
      number: line(40),
      kind: line(24),
      description: line(1000),
      source: line(1000),
      collectedBy: line(160),
      collectedAt: { type: DataTypes.DATE(6), allowNull: true },
      collectedPlace: line(400),
      conditionOnReceipt: line(1000),
      packaging: line(400),
      sealOnReceipt: line(80),
      sensitive: { type: DataTypes.BOOLEAN, allowNull: false },
      parentNumber: { type: DataTypes.STRING(40), allowNull: true },
      registeredAt: time(),
      registeredBy: uuid(),
      version: { ...whole(), defaultValue: 1 },
      holderId: optionalUuid(),
      heldSince: { type: DataTypes.DATE(6), allowNull: true },
      location: line(400),
      seal: line(80),
      pendingSequence: { type: DataTypes.INTEGER, allowNull: true },
      pendingToId: optionalUuid(),
    },
    { sequelize, tableName: 'exhibits', modelName: 'exhibit' },
  );
  ExhibitFileRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      exhibitId: uuid(),
      name: line(255),
      mediaType: line(127),
      size: { type: DataTypes.BIGINT, allowNull: false },
      sha256: hash(),
      sha512: { type: DataTypes.CHAR(128), allowNull: false },
      statedSha256: { type: DataTypes.CHAR(64), allowNull: true },
      takenInAt: time(),
      eventSequence: whole(),
      width: { type: DataTypes.INTEGER, allowNull: true },
      height: { type: DataTypes.INTEGER, allowNull: true },
      latitude: { type: DataTypes.DOUBLE, allowNull: true },
      longitude: { type: DataTypes.DOUBLE, allowNull: true },
      metadata: { type: DataTypes.TEXT, allowNull: true },
    },
    { sequelize, tableName: 'exhibit_files', modelName: 'exhibitFile' },
  );
  DerivativeRecord.init(
    {
      fileId: { ...uuid(), primaryKey: true },
      kind: { ...line(24), primaryKey: true },
      mediaType: line(127),
      width: whole(),
      height: whole(),
      size: { type: DataTypes.BIGINT, allowNull: false },
      sha256: hash(),
      recipe: line(400),
    },
    { sequelize, tableName: 'derivatives', modelName: 'derivative' },
  );
}
