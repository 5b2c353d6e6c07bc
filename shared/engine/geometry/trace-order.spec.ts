import { describe, expect, it } from '@jest/globals';
import { alongTrace } from './trace-order';

const point = (name: string, x: number, y: number, order: number | null) => ({
  name,
  at: [x, y] as const,
  order,
});
const line = [0, 1, 2, 3].map((i) => point(`p${i}`, i, 0.1 * i * i, i));

describe('the order along a trace', () => {
  it('is the survey order, whatever order the rows came in', () => {
    expect(alongTrace([...line].reverse()).map((p) => p.name)).toEqual(['p0', 'p1', 'p2', 'p3']);
  });

  it('puts an unnumbered point into the piece that it lies on', () => {
    const apart = point('gap', 1.5, 0.22, null);
    expect(alongTrace([apart, ...line]).map((p) => p.name)).toEqual([
      'p0',
      'p1',
      'gap',
      'p2',
      'p3',
    ]);
  });

  it('puts the begin of the mark before its first numbered point, and its end after the last', () => {
    const begin = point('begin', -0.4, 0.01, null);
    const end = point('end', 3.4, 1.15, null);
    expect(alongTrace([end, begin, ...line]).map((p) => p.name)).toEqual([
      'begin',
      'p0',
      'p1',
      'p2',
      'p3',
      'end',
    ]);
  });

  it('keeps points as they came when none is numbered', () => {
    const loose = line.map((p) => ({ ...p, order: null }));
    expect(alongTrace(loose)).toEqual(loose);
  });
});
