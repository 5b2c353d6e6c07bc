import type { Figure, Findings } from '#shared/contracts/findings';
import { type SpeedUnit, figureText, rangeText, valueText } from '../../ui/figure/figure-text';
import { keyOf } from './candidates';

/** What a person edits of the findings. */
export interface Draft {
  readonly answers: readonly { questionNumber: number; question: string; text: string }[];
  readonly figures: readonly Figure[];
  readonly dependsOn: string;
  readonly against: string;
}

/** A part that is kept or given up as a whole when two people changed it. */
export type DraftField = `answer-${number}` | 'figures' | 'dependsOn' | 'against';

export const draftOf = ({ answers, figures, dependsOn, against }: Findings): Draft => ({
  answers,
  figures,
  dependsOn,
  against,
});

export function fieldsOf(draft: Draft): { key: DraftField; label: string }[] {
  return [
    ...draft.answers.map(({ questionNumber }) => ({
      key: `answer-${questionNumber}` as const,
      label: `Answer to question ${questionNumber}`,
    })),
    { key: 'figures', label: 'Key figures' },
    { key: 'dependsOn', label: 'What these depend on most' },
    { key: 'against', label: 'Strongest points against' },
  ];
}

/** Fields of `b` that differ from `a`. */
export function changedFields(a: Draft, b: Draft): DraftField[] {
  return fieldsOf(b)
    .map(({ key }) => key)
    .filter((key) => contentOf(a, key) !== contentOf(b, key));
}

/**
 * What both changed differently is decided by `keep`; what one alone changed is that one's.
 * Questions are theirs: they may have been added meanwhile.
 */
export function mergeDrafts(
  base: Draft,
  mine: Draft,
  theirs: Draft,
  keep: readonly DraftField[],
): Draft {
  const changedByMe = changedFields(base, mine);
  const changedByThem = changedFields(base, theirs);
  const isMine = (key: DraftField) =>
    changedByMe.includes(key) && (!changedByThem.includes(key) || keep.includes(key));
  return {
    answers: theirs.answers.map((answer) =>
      isMine(`answer-${answer.questionNumber}`)
        ? { ...answer, text: answerIn(mine, answer.questionNumber) }
        : answer,
    ),
    figures: isMine('figures') ? mine.figures : theirs.figures,
    dependsOn: isMine('dependsOn') ? mine.dependsOn : theirs.dependsOn,
    against: isMine('against') ? mine.against : theirs.against,
  };
}

/** A field as text, to be read beside the other version. */
export function showField(draft: Draft, key: DraftField, speedUnit: SpeedUnit): string {
  if (key !== 'figures') return contentOf(draft, key) || '–';
  if (draft.figures.length === 0) return '–';
  return draft.figures
    .map((figure) => {
      const { first } = figureText(figure, speedUnit);
      return `${figure.title} of ${figure.pointName}, ${figure.stationName}: ${valueText(first)} (${rangeText(first)})`;
    })
    .join('\n');
}

function contentOf(draft: Draft, key: DraftField): string {
  switch (key) {
    case 'figures':
      return draft.figures.map(keyOf).join('\n');
    case 'dependsOn':
    case 'against':
      return draft[key];
    default:
      return answerIn(draft, Number(key.slice('answer-'.length)));
  }
}

const answerIn = (draft: Draft, number: number): string =>
  draft.answers.find((answer) => answer.questionNumber === number)?.text ?? '';
