import { describe, expect, it } from '@jest/globals';
import { figureOf, findingsOf } from '../../../../test/web/records';
import { changedFields, draftOf, mergeDrafts, showField } from './draft';

const base = draftOf(findingsOf());
const mine = {
  ...base,
  dependsOn: 'Grip, and where trace T3 begins.',
  answers: base.answers.map((answer) => ({ ...answer, text: `${answer.text} Mine.` })),
};
const theirs = {
  ...base,
  dependsOn: 'The grip alone.',
  against: 'The road dried.',
  figures: [figureOf(), figureOf({ point: 'LR' })],
};

describe('two edits of the findings', () => {
  it('what changed is told field by field', () => {
    expect(changedFields(base, mine)).toEqual(['answer-1', 'answer-2', 'dependsOn']);
    expect(changedFields(base, theirs)).toEqual(['figures', 'dependsOn', 'against']);
    expect(changedFields(base, base)).toEqual([]);
  });

  it('what one alone changed is kept; what both changed is as chosen', () => {
    const kept = mergeDrafts(base, mine, theirs, ['dependsOn']);
    expect(kept.dependsOn).toBe(mine.dependsOn);
    expect(kept.against).toBe('The road dried.');
    expect(kept.figures).toHaveLength(2);
    expect(kept.answers[0]?.text).toBe('About 71 km/h. Mine.');
    expect(mergeDrafts(base, mine, theirs, []).dependsOn).toBe('The grip alone.');
  });

  it('a question that was added meanwhile stays', () => {
    const added = { questionNumber: 3, question: 'Who braked first?', text: '' };
    const more = { ...theirs, answers: [...theirs.answers, added] };
    expect(mergeDrafts(base, mine, more, []).answers.at(-1)).toEqual(added);
  });

  it('figures read as text in the unit of the case', () => {
    expect(showField(base, 'figures', 'km/h')).toBe(
      'Speed of centre of gravity, car, first mark: 71 km/h (67 to 75)',
    );
    expect(showField(base, 'against', 'km/h')).toBe('–');
  });
});
