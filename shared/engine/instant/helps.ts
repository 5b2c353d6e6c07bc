import type { Suggestion } from '../documents/motion-solution';
import { pivotedQr } from '../linear/pivoted-qr';
import { fromRows } from '../linear/dense';
import { pointMotion } from './knowns';
import type { Level, Model, State } from './model';
import { rigid } from './starts';

/** More than a person reads. */
const shown = 12;

interface Candidate {
  readonly suggestion: Suggestion;
  /** How many of the free motions it would settle, and how strongly the least of them. */
  readonly settles: number;
  readonly strength: number;
}

/**
 * Which single further known would settle the free motions: all of them if one can, else those
 * that settle most; strongest first.
 */
export const suggestionsFor = (
  model: Model,
  s: State,
  level: Level,
  free: readonly Float64Array[],
): Suggestion[] => {
  if (free.length === 0) return [];
  const candidates = [...angular(model, level, free), ...pointwise(model, s, level, free)].filter(
    (c) => c.settles > 0,
  );
  const most = Math.max(0, ...candidates.map((c) => c.settles));
  return candidates
    .filter((c) => c.settles === most)
    .sort((a, b) => b.strength - a.strength)
    .slice(0, shown)
    .map((c) => c.suggestion);
};

export const inWords = (s: Suggestion): string => {
  if ('body' in s)
    return `${s.quantity === 'angular-velocity' ? 'angular velocity' : 'angular acceleration'} of ${s.body}`;
  const part = s.part === 'components' ? '' : ` ${s.part}`;
  return `${s.quantity}${part} at ${s.at.body}.${s.at.point}`;
};

const angular = (model: Model, level: Level, free: readonly Float64Array[]): Candidate[] =>
  model.bodies.map((b, i) => ({
    suggestion: {
      quantity: level === 'velocity' ? 'angular-velocity' : 'angular-acceleration',
      body: b.id,
    },
    ...settled([free.map((z) => z[3 * i + 2] * b.length)]),
  }));

const pointwise = (
  model: Model,
  s: State,
  level: Level,
  free: readonly Float64Array[],
): Candidate[] =>
  model.bodies.flatMap((b) =>
    [...b.points].flatMap(([point, place]): Candidate[] => {
      const changes = free.map((z) => rigid(s, z, place));
      const [vx, vy] = pointMotion(level, s, place);
      const speed = Math.hypot(vx, vy);
      const at = { body: b.id, point };
      const candidates: Candidate[] = [
        {
          suggestion: { quantity: level, at, part: 'components' },
          ...settled([changes.map((c) => c[0]), changes.map((c) => c[1])]),
        },
      ];
      if (free.length === 1) {
        const [[x, y]] = changes;
        candidates.push({
          suggestion: { quantity: level, at, part: 'magnitude' },
          ...settled([[Math.hypot(x, y)]]),
        });
        // A direction decides only where the motion has a part that is not free.
        if (speed > 1e-9)
          candidates.push({
            suggestion: { quantity: level, at, part: 'direction' },
            ...settled([[(x * vy - y * vx) / speed]]),
          });
      }
      return candidates;
    }),
  );

const settled = (rows: readonly number[][]): { settles: number; strength: number } => {
  const size = Math.max(...rows.flat().map(Math.abs));
  if (size < 1e-6) return { settles: 0, strength: 0 };
  return { settles: pivotedQr(fromRows(rows), 1e-6).rank, strength: size };
};
