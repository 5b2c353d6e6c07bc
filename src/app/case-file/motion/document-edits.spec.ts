import { describe, expect, it } from '@jest/globals';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { reconstructionDocument } from '#shared/engine/documents/reconstruction';
import * as edits from './document-edits';

const exact: [number, number] = [0, 0];
const mark = '0199d1a0-0000-7000-8000-000000000001';

/** A car and a trailer on a hitch, with a known and a mark of each. */
const document: ReconstructionDocument = {
  format: 'centrode.reconstruction/1',
  bodies: [
    {
      id: 'car',
      name: 'car',
      points: [
        { id: 'G', name: 'centre of gravity', at: exact, sigma: exact },
        { id: 'H', name: 'hitch', at: [-2, 0], sigma: exact },
      ],
      outline: [],
    },
    {
      id: 'trailer',
      name: 'trailer',
      points: [{ id: 'H', name: 'hitch', at: exact, sigma: exact }],
      outline: [],
    },
  ],
  joints: [
    { kind: 'pin', id: 'J1', a: { body: 'car', point: 'H' }, b: { body: 'trailer', point: 'H' } },
    { kind: 'wheel', id: 'J2', a: { body: 'car', point: 'G' }, steer: 0, steerRate: 0 },
  ],
  stations: [
    {
      ...edits.newStation('S1', 'first mark'),
      marks: [{ markId: mark, body: 'trailer', point: 'H', position: true, direction: false }],
      joints: { off: ['J1'] },
      knowns: [
        {
          quantity: 'velocity',
          id: 'K1',
          at: { body: 'car', point: 'H' },
          magnitude: { value: 10, sigma: 1 },
          direction: null,
          line: false,
          basis: '',
        },
        {
          quantity: 'angular-velocity',
          id: 'K2',
          body: 'trailer',
          value: { value: 0, sigma: 0 },
          basis: '',
        },
      ],
    },
    edits.newStation('S2', 'point of rest'),
  ],
};

describe('changes of a reconstruction', () => {
  it('a removed body takes its joints, marks and knowns with it', () => {
    const after = edits.removeBody('trailer')(document);
    expect(after.bodies.map((body) => body.id)).toEqual(['car']);
    expect(after.joints.map((joint) => joint.id)).toEqual(['J2']);
    expect(after.stations[0].marks).toEqual([]);
    expect(after.stations[0].knowns.map((known) => known.id)).toEqual(['K1']);
  });

  it('a point that gets another short name keeps everything that speaks of it', () => {
    const after = edits.renamePoint('car', 'H', 'hitch')(document);
    expect(after.joints[0]).toMatchObject({
      a: { body: 'car', point: 'hitch' },
      b: { body: 'trailer', point: 'H' },
    });
    expect(after.stations[0].knowns[0]).toMatchObject({ at: { body: 'car', point: 'hitch' } });
    expect(after.stations[0].marks[0].point).toBe('H');
    expect(reconstructionDocument.safeParse(after).success).toBe(true);
  });

  it('a removed point takes what speaks of it, and nothing of its namesake', () => {
    const after = edits.removePoint('car', 'H')(document);
    expect(after.joints.map((joint) => joint.id)).toEqual(['J2']);
    expect(after.stations[0].knowns.map((known) => known.id)).toEqual(['K2']);
    expect(after.stations[0].marks).toHaveLength(1);
  });

  it('a removed joint is no longer taken off at a station', () => {
    expect(edits.removeJoint('J1')(document).stations[0].joints.off).toEqual([]);
  });

  it('stations change places and stay within the list', () => {
    const ids = (doc: ReconstructionDocument) => doc.stations.map((station) => station.id);
    expect(ids(edits.moveStation('S1', 1)(document))).toEqual(['S2', 'S1']);
    expect(ids(edits.moveStation('S1', -1)(document))).toEqual(['S1', 'S2']);
  });

  it('a mark that is assigned again replaces what it said', () => {
    const again = { markId: mark, body: 'car', point: 'G', position: false, direction: true };
    const after = edits.assignMark('S1', again)(document);
    expect(after.stations[0].marks).toEqual([again]);
    expect(edits.releaseMark('S1', mark)(after).stations[0].marks).toEqual([]);
  });

  it('keys are free, and follow the rule of the document', () => {
    expect(edits.freeKey('Left front', ['Leftfront'], 'body')).toBe('Leftfront2');
    expect(edits.freeKey('3 ü', [], 'body')).toBe('body');
    expect(edits.numberedKey('S', ['S1', 'S3'])).toBe('S2');
  });

  it('no change touches the document that it was made from', () => {
    const before = JSON.stringify(document);
    edits.removeBody('car')(document);
    edits.putKnown('S1', { ...document.stations[0].knowns[0], id: 'K9' })(document);
    expect(JSON.stringify(document)).toBe(before);
  });
});
