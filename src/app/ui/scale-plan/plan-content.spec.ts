import { describe, expect, it } from '@jest/globals';
import { type PlanMark, tracesOf } from './plan-content';
import { extentOf } from './plan-extent';

const mark = (id: string, over: Partial<PlanMark> = {}): PlanMark => ({
  id,
  label: id,
  kind: 'tyre mark',
  at: [0, 0],
  covariance: null,
  trace: null,
  order: null,
  ...over,
});

describe('what the plan shows', () => {
  it('joins the marks of a trace in their order', () => {
    const traces = tracesOf([
      mark('a', { trace: 'T1', order: 2, at: [2, 0] }),
      mark('b', { trace: 'T2', at: [9, 9] }),
      mark('c', { trace: 'T1', order: 1, at: [1, 0] }),
      mark('d'),
      mark('between', { trace: 'T1', at: [5, 5] }),
      mark('edge', { trace: 'E', kind: 'road edge' }),
      mark('e', { trace: 'T2', at: [8, 8] }),
    ]);
    expect(traces).toEqual([
      {
        id: 'T1',
        label: 'T1',
        path: [
          [1, 0],
          [2, 0],
        ],
        ground: false,
      },
      {
        id: 'T2',
        label: 'T2',
        path: [
          [9, 9],
          [8, 8],
        ],
        ground: false,
      },
      { id: 'E', label: 'E', path: [[0, 0]], ground: true },
    ]);
  });

  it('fits everything but an instantaneous centre that is far away', () => {
    const centre = (x: number) => ({ id: 'c', label: '', at: [x, 0] as const, of: null });
    const shown = {
      marks: [mark('a', { at: [0, 0] }), mark('b', { at: [10, 5] })],
      bodies: [{ id: 'car', label: 'car', outline: [[-1, 2]] as const, points: [], ghost: false }],
      guides: [],
      joints: [],
    };
    expect(extentOf({ ...shown, centres: [centre(15)] })).toEqual([-1, 0, 15, 5]);
    expect(extentOf({ ...shown, centres: [centre(4000)] })).toEqual([-1, 0, 10, 5]);
    expect(extentOf({ marks: [], bodies: [], guides: [], joints: [], centres: [] })).toBeNull();
  });
});
