import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { CaseRole, CaseStage } from '#shared/contracts/cases';

export class CaseRecord extends Model<
  InferAttributes<CaseRecord>,
  InferCreationAttributes<CaseRecord>
> {
  declare id: string;
  declare number: string;
  declare title: string;
  declare kind: string;
  declare stage: CaseStage;
  declare commissionedBy: string;
  declare jurisdiction: string;
  declare incidentOn: string | null;
  declare place: string;
  declare circumstances: string;
  declare dueOn: string | null;
  declare speedUnit: 'km/h' | 'mph' | 'm/s';
  declare xAxisBearing: number | null;
  declare openedAt: Date;
  declare version: number;
}

export class PartyRecord extends Model<
  InferAttributes<PartyRecord>,
  InferCreationAttributes<PartyRecord>
> {
  declare id: string;
  declare caseId: string;
  declare name: string;
  declare role: string;
}

export class QuestionRecord extends Model<
  InferAttributes<QuestionRecord>,
  InferCreationAttributes<QuestionRecord>
> {
  declare id: string;
  declare caseId: string;
  declare number: number;
  declare text: string;
}

export class AssignmentRecord extends Model<
  InferAttributes<AssignmentRecord>,
  InferCreationAttributes<AssignmentRecord>
> {
  declare id: string;
  declare caseId: string;
  declare accountId: string;
  declare role: CaseRole;
  declare partyId: string | null;
  declare conflict: boolean;
  declare conflictStatement: string;
  declare overrideReason: string | null;
  declare assignedBy: string;
  declare assignedAt: Date;
  declare endedAt: Date | null;
}

/** A new object each time: Sequelize writes the column's name into what it is given. */
const uuid = () => ({ type: DataTypes.CHAR(36), allowNull: false });

export function initCases(sequelize: Sequelize): void {
  CaseRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      number: { type: DataTypes.STRING(20), allowNull: false },
      title: { type: DataTypes.STRING(160), allowNull: false },
      kind: { type: DataTypes.STRING(40), allowNull: false },
      stage: { type: DataTypes.STRING(24), allowNull: false },
      commissionedBy: { type: DataTypes.STRING(400), allowNull: false, defaultValue: '' },
      jurisdiction: { type: DataTypes.STRING(200), allowNull: false, defaultValue: '' },
      incidentOn: { type: DataTypes.DATEONLY, allowNull: true },
      place: { type: DataTypes.STRING(400), allowNull: false, defaultValue: '' },
      circumstances: { type: DataTypes.TEXT('medium'), allowNull: false, defaultValue: '' },
      dueOn: { type: DataTypes.DATEONLY, allowNull: true },
      speedUnit: { type: DataTypes.STRING(4), allowNull: false, defaultValue: 'km/h' },
      xAxisBearing: { type: DataTypes.DOUBLE, allowNull: true },
      openedAt: { type: DataTypes.DATE(6), allowNull: false },
      version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    },
    { sequelize, tableName: 'cases', modelName: 'case' },
  );
  PartyRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      name: { type: DataTypes.STRING(160), allowNull: false },
      role: { type: DataTypes.STRING(80), allowNull: false },
    },
    { sequelize, tableName: 'parties', modelName: 'party' },
  );
  QuestionRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      number: { type: DataTypes.INTEGER, allowNull: false },
      text: { type: DataTypes.STRING(1000), allowNull: false },
    },
    { sequelize, tableName: 'questions', modelName: 'question' },
  );
  AssignmentRecord.init(
    {
      id: { ...uuid(), primaryKey: true },
      caseId: uuid(),
      accountId: uuid(),
      role: { type: DataTypes.STRING(24), allowNull: false },
      partyId: { type: DataTypes.CHAR(36), allowNull: true },
      conflict: { type: DataTypes.BOOLEAN, allowNull: false },
      conflictStatement: { type: DataTypes.STRING(2000), allowNull: false },
      overrideReason: { type: DataTypes.STRING(2000), allowNull: true },
      assignedBy: uuid(),
      assignedAt: { type: DataTypes.DATE(6), allowNull: false },
      endedAt: { type: DataTypes.DATE(6), allowNull: true },
    },
    { sequelize, tableName: 'assignments', modelName: 'assignment' },
  );
}
