import { markKinds, type MarkKind, type SurveyMapping } from '#shared/contracts/survey';
import type { Scene } from './scene';

/** How the sample's survey file is read. */
export function mappingOf(scene: Scene): SurveyMapping {
  const { columns, codes, delimiter, lengthUnit, sigmaUnit } = scene.survey;
  const kinds = Object.entries(codes).map(([code, meaning]) => [code, kindOf(meaning)] as const);
  return {
    delimiter,
    decimal: '.',
    unit: lengthUnit,
    sigmaUnit,
    label: columns.id,
    x: columns.x,
    y: columns.y,
    height: columns.height,
    sigmaX: columns.sigmaX,
    sigmaY: columns.sigmaY,
    sigma: null,
    code: columns.code,
    trace: columns.string,
    order: columns.sequence,
    note: columns.remark,
    kinds: Object.fromEntries(kinds),
  };
}

/** The mark kind that a code of the sample stands for, from its plain meaning. */
function kindOf(meaning: string): MarkKind {
  if (meaning.includes('at rest')) return 'point of rest';
  if (meaning.startsWith('road line')) return 'road edge';
  if (meaning.startsWith('rolling print')) return 'tyre mark';
  return markKinds.find((kind) => meaning.startsWith(kind)) ?? 'other';
}
