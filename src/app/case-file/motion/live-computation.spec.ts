import { describe, expect, it } from '@jest/globals';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import type { StationMark } from '#shared/engine/documents/station';
import { newStation } from './document-edits';
import { answerLive } from './live-computation';
import type { LiveData, LiveReply, StationRequest } from './live-messages';

const exact: [number, number] = [0, 0];
const id = (n: number) => `0199d1a0-0000-7000-8000-00000000000${n}`;
const mark = (n: number, x: number, y: number): StationMark => ({
  id: id(n),
  label: `M${n}`,
  at: [x, y],
  covariance: [
    [1e-4, 0],
    [0, 1e-4],
  ],
  trace: null,
  order: null,
});
const assign = (n: number, point: string) => ({
  markId: id(n),
  body: 'bar',
  point,
  position: true,
  direction: false,
});

/** A bar of 2 m; at S1 it lies along x, at S2 along y. Its end A moves at 4 m/s along +y, ω is 3 rad/s. */
const document: ReconstructionDocument = {
  format: 'centrode.reconstruction/1',
  bodies: [
    {
      id: 'bar',
      name: 'bar',
      points: [
        { id: 'A', name: 'end A', at: exact, sigma: exact },
        { id: 'B', name: 'end B', at: [2, 0], sigma: exact },
      ],
      outline: [],
    },
  ],
  joints: [],
  stations: [
    {
      ...newStation('S1', 'first'),
      marks: [assign(1, 'A'), assign(2, 'B')],
      knowns: [
        {
          quantity: 'velocity',
          id: 'K1',
          at: { body: 'bar', point: 'A' },
          magnitude: { value: 4, sigma: 0.1 },
          direction: { value: Math.PI / 2, sigma: 0.01 },
          line: false,
          basis: '',
        },
        {
          quantity: 'angular-velocity',
          id: 'K2',
          body: 'bar',
          value: { value: 3, sigma: 0.1 },
          basis: '',
        },
      ],
    },
    { ...newStation('S2', 'second'), marks: [assign(3, 'A'), assign(4, 'B')] },
  ],
};
const marks = [mark(1, 0, 0), mark(2, 2, 0), mark(3, 5, 5), mark(4, 5, 7)];
const request: StationRequest = {
  kind: 'station',
  document,
  marks,
  stationId: 'S1',
  point: { body: 'bar', point: 'B' },
  against: null,
  normal: null,
};

function dataOf(reply: LiveReply): LiveData {
  if (!reply.ok) throw new Error(reply.fault.message);
  return reply.data;
}

describe('a live answer', () => {
  it('holds the speed of the asked point, 4 + 3 · 2 = 10 m/s, and its derivation', () => {
    const data = dataOf(answerLive(request));
    expect(data.answer.solution?.branches[0].points['bar.B'].speed).toBeCloseTo(10, 6);
    expect(data.workings).toHaveLength(1);
    expect(data.workings[0].asked).toEqual({ body: 'bar', point: 'B' });
  });

  it('holds where the bodies stood at the other stations', () => {
    const { others } = dataOf(answerLive(request));
    expect(Object.keys(others)).toEqual(['S2']);
    expect(others['S2']['bar'].x).toBeCloseTo(5, 6);
    expect(others['S2']['bar'].heading).toBeCloseTo(Math.PI / 2, 6);
  });

  it('holds the motion of one end against the other: no closing on a rigid bar', () => {
    const { relative } = dataOf(answerLive({ ...request, against: { body: 'bar', point: 'A' } }));
    expect(relative?.[0]?.closing).toBeCloseTo(0, 9);
    // B runs ahead of A by ω r = 6 m/s across the line between them.
    expect(Math.abs(relative?.[0]?.sliding ?? 0)).toBeCloseTo(6, 6);
  });

  it('goes on when a point is set against itself, which has no direction', () => {
    const data = dataOf(answerLive({ ...request, against: { body: 'bar', point: 'B' } }));
    expect(data.relative).toEqual([null]);
    expect(data.answer.solution).not.toBeNull();
  });

  it('says what is missing as a value, with the field', () => {
    const reply = answerLive({ ...request, marks: marks.slice(1) });
    expect(reply).toMatchObject({
      ok: false,
      fault: { code: 'unknown-reference', field: `station.marks.${id(1)}` },
    });
  });

  it('tells a recorded answer from what the marks say now', () => {
    const { answer } = dataOf(answerLive(request));
    const problem = {
      format: 'centrode.station-problem/1' as const,
      bodies: document.bodies,
      joints: document.joints,
      station: document.stations[0],
      marks: marks.slice(0, 2),
    };
    const ask = (now: StationMark[]) =>
      dataOf(
        answerLive({
          kind: 'recorded',
          problem,
          answer,
          now: { document, marks: now },
          point: { body: 'bar', point: 'B' },
          against: null,
          normal: null,
        }),
      );
    expect(ask(marks).now?.sameInput).toBe(true);
    expect(ask([marks[0], mark(2, 2, 0.1)]).now?.sameInput).toBe(false);
    expect(ask(marks).workings).toHaveLength(1);
  });
});
