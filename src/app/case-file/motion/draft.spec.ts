import { beforeEach, describe, expect, it } from '@jest/globals';
import type { Reconstruction } from '#shared/contracts/motion';
import { addStation, emptyDocument, newStation } from './document-edits';
import { Draft } from './draft';

const saved: Reconstruction = {
  id: '0199d1a0-0000-7000-8000-000000000001',
  name: 'A',
  assumption: '',
  document: emptyDocument,
  version: 3,
  changedAt: '2026-11-20T08:00:00.000Z',
  changedBy: 'E. Varo',
};

describe('the draft on the table', () => {
  let draft: Draft;
  beforeEach(() => {
    draft = new Draft();
    draft.open(saved);
  });

  it('is unchanged when it is opened, and again after everything is undone', () => {
    expect(draft.changed()).toBe(false);
    draft.edit(addStation(newStation('S1', 'first mark')));
    expect(draft.changed()).toBe(true);
    draft.undo();
    expect(draft.changed()).toBe(false);
    draft.redo();
    expect(draft.document()?.stations).toHaveLength(1);
  });

  it('takes what is typed into one field as one step', () => {
    for (const name of ['A1', 'A12', 'A123']) draft.change({ name }, 'name');
    draft.change({ assumption: 'x' }, 'assumption');
    draft.undo();
    expect(draft.content()).toMatchObject({ name: 'A123', assumption: '' });
    draft.undo();
    expect(draft.content()?.name).toBe('A');
    expect(draft.canUndo()).toBe(false);
  });

  it('forgets what was undone when something else is changed', () => {
    draft.change({ name: 'B' });
    draft.undo();
    draft.change({ name: 'C' });
    expect(draft.canRedo()).toBe(false);
  });

  it('stands on the version that was saved', () => {
    draft.change({ name: 'B' });
    draft.take({ ...saved, name: 'B', version: 4 });
    expect(draft.changed()).toBe(false);
    expect(draft.base()?.version).toBe(4);
  });

  it('names the field that its schema refuses', () => {
    draft.edit(addStation(newStation('S1', ' ')));
    expect([...draft.faults()]).toEqual([['stations.0.name', 'must not be empty']]);
  });
});
