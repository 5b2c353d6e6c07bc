import { describe, expect, it } from '@jest/globals';
import type { MotionSolution, Suggestion } from '#shared/engine/documents/motion-solution';
import { lacksOf, verdictOf } from './verdict-words';

const level = (over: Partial<MotionSolution['levels']['velocity']> = {}) => ({
  status: 'determined' as const,
  unknowns: 3,
  equations: 3,
  rank: 3,
  redundancy: 0,
  chiSquared: 0,
  pValue: null,
  condition: 2,
  ...over,
});

const solution = (over: Partial<MotionSolution>): MotionSolution => ({
  format: 'centrode.motion-solution/1',
  status: 'determined',
  levels: { velocity: level(), acceleration: null },
  branches: [],
  redundancy: 0,
  chiSquared: 0,
  pValue: null,
  residuals: [],
  suspects: [],
  free: [],
  helps: [],
  suggestions: [],
  clash: [],
  condition: 2,
  warnings: [],
  ...over,
});

const names = {
  body: (id: string) => `the ${id}`,
  point: ({ body, point }: { body: string; point: string }) => `${point} of the ${body}`,
};

describe('the verdict in words', () => {
  it('says that nothing checks a determined motion', () => {
    const verdict = verdictOf(solution({}));
    expect(verdict.title).toBe('Determined.');
    expect(verdict.says[0]).toContain('3 unknowns, 3 equations. Nothing checks the knowns');
  });

  it('gives χ², p and the suspects of an over-determined one', () => {
    const over = {
      status: 'over-determined' as const,
      levels: { velocity: level({ status: 'over-determined', equations: 6 }), acceleration: null },
      redundancy: 3,
      chiSquared: 2.1,
      pValue: 0.552,
    };
    const calm = verdictOf(solution(over));
    expect(calm.says.join(' ')).toBe(
      '3 unknowns, 6 equations, redundancy 3; χ² 2.1, p 0.55. No suspect known.',
    );
    expect(calm.standing).toBe('sound');
    const suspect = verdictOf(solution({ ...over, suspects: ['K2'] }));
    expect(suspect.standing).toBe('broken');
    expect(suspect.names).toEqual(['K2']);
  });

  it('names what clashes', () => {
    const verdict = verdictOf(solution({ status: 'contradictory', clash: ['J1', 'K1'] }));
    expect(verdict.names).toEqual(['J1', 'K1']);
    expect(verdict.standing).toBe('broken');
  });

  it('calls a dead centre by its name', () => {
    expect(verdictOf(solution({ status: 'singular' })).says[0]).toContain('dead centre');
  });

  it('says what is free at which level, and which further known would settle it', () => {
    const turning: Suggestion = { quantity: 'angular-velocity', body: 'trailer' };
    const direction: Suggestion = {
      quantity: 'velocity',
      at: { body: 'trailer', point: 'axle' },
      part: 'direction',
    };
    const later: Suggestion = { quantity: 'angular-acceleration', body: 'trailer' };
    const [velocity, acceleration] = lacksOf(
      solution({
        status: 'under-determined',
        free: [
          { motion: 'the trailer may turn about K', level: 'velocity', bodies: {} },
          { motion: 'accelerations only: the trailer may turn', level: 'acceleration', bodies: {} },
        ],
        suggestions: [direction, turning, later],
      }),
      names,
    );
    expect(velocity).toEqual({
      level: 'velocity',
      free: ['The trailer may turn about K.'],
      helps: ['the direction of the velocity of axle of the trailer', 'how fast the trailer turns'],
    });
    expect(acceleration.free).toEqual(['The trailer may turn.']);
    expect(acceleration.helps).toEqual(['how the turning of the trailer changes']);
  });
});
