import { describe, expect, it } from '@jest/globals';
import { differencesOf, settle } from './conflict';
import { emptyDocument, newStation } from './document-edits';
import type { DraftContent } from './draft';

const content = (over: Partial<DraftContent>, stations = [newStation('S1', 'first')]) => ({
  name: 'A',
  assumption: '',
  document: { ...emptyDocument, stations },
  ...over,
});

describe('two people saved over one version', () => {
  const mine = content({ name: 'B' }, [newStation('S1', 'mine'), newStation('S2', 'only mine')]);
  const theirs = content({}, [newStation('S1', 'theirs')]);

  it('names what stands differently, and nothing else', () => {
    expect(differencesOf(mine, theirs).map((one) => one.key)).toEqual([
      'name',
      'stations.S1',
      'stations.S2',
    ]);
    expect(differencesOf(mine, mine)).toEqual([]);
    expect(differencesOf(mine, theirs)[2].theirs).toBe('not there');
  });

  it('keeps of mine what I choose, and theirs of the rest', () => {
    const settled = settle(mine, theirs, ['stations.S2', 'name']);
    expect(settled.name).toBe('B');
    expect(settled.document.stations.map((station) => station.name)).toEqual([
      'theirs',
      'only mine',
    ]);
    expect(settle(mine, theirs, [])).toEqual(theirs);
  });
});
