import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { MarkKind } from '#shared/contracts/survey';

/** A measured mark: scene coordinates in m, variances in m². */
export class MarkRecord extends Model<
  InferAttributes<MarkRecord>,
  InferCreationAttributes<MarkRecord>
> {
  declare id: string;
  declare caseId: string;
  declare label: string;
  declare kind: MarkKind;
  declare x: number;
  declare y: number;
  declare varX: number;
  declare covXy: number;
  declare varY: number;
  declare height: number | null;
  declare trace: string | null;
  declare place: number | null;
  declare note: string;
  /** Where it came from: a `markSource` as JSON text. */
  declare source: string;
  declare version: CreationOptional<number>;
  declare removedAt: CreationOptional<Date | null>;
}

/** What a mark was before a change; `version` is the one that was changed. */
export class MarkHistoryRecord extends Model<
  InferAttributes<MarkHistoryRecord>,
  InferCreationAttributes<MarkHistoryRecord>
> {
  declare id: string;
  declare markId: string;
  declare caseId: string;
  declare version: number;
  declare beforeChange: string;
  declare reason: string;
  declare changedBy: string;
  declare changedAt: Date;
}

export class SurveyImportRecord extends Model<
  InferAttributes<SurveyImportRecord>,
  InferCreationAttributes<SurveyImportRecord>
> {
  declare id: string;
  declare caseId: string;
  declare fileId: string;
  declare exhibitNumber: string;
  declare fileName: string;
  /** How the file was read: a `surveyMapping` as JSON text. */
  declare mapping: string;
  declare rejected: string;
  declare accepted: number;
  declare importedBy: string;
  declare importedAt: Date;
}

const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });
const text = (most: number) => ({ type: DataTypes.STRING(most), allowNull: false });
const json = () => ({ type: DataTypes.TEXT('long'), allowNull: false });
const double = () => ({ type: DataTypes.DOUBLE, allowNull: false });
const whole = () => ({ type: DataTypes.INTEGER, allowNull: false });
const time = () => ({ type: DataTypes.DATE(6), allowNull: false });

export function initMarks(sequelize: Sequelize): void {
  MarkRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      label: text(40),
      kind: text(24),
      x: double(),
      y: double(),
      varX: double(),
      covXy: double(),
      varY: double(),
      height: { type: DataTypes.DOUBLE, allowNull: true },
      trace: { type: DataTypes.STRING(40), allowNull: true },
      place: { type: DataTypes.INTEGER, allowNull: true },
      note: text(1000),
      source: json(),
      version: { ...whole(), defaultValue: 1 },
      removedAt: { type: DataTypes.DATE(6), allowNull: true },
    },
    { sequelize, tableName: 'marks', modelName: 'mark' },
  );
  MarkHistoryRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      markId: uuid(),
      caseId: uuid(),
      version: whole(),
      beforeChange: json(),
      reason: text(1000),
      changedBy: uuid(),
      changedAt: time(),
    },
    { sequelize, tableName: 'mark_history', modelName: 'markHistory' },
  );
  SurveyImportRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      fileId: uuid(),
      exhibitNumber: text(40),
      fileName: text(400),
      mapping: json(),
      rejected: json(),
      accepted: whole(),
      importedBy: uuid(),
      importedAt: time(),
    },
    { sequelize, tableName: 'survey_imports', modelName: 'surveyImport' },
  );
}
