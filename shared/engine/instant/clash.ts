import { equationsOf, ownerId } from './equations';
import type { Level, Model } from './model';
import { solveModel } from './solve';

/**
 * The smallest set of joints and knowns found that cannot all hold: each is left out in turn and
 * stays out while the rest still contradict, from either end of the list. No member of the set can
 * be spared, so without any one of them the rest agree.
 */
export const smallestClash = (model: Model, tolerance: number, level: Level): string[] => {
  const all = new Set<string>();
  for (const l of level === 'velocity'
    ? (['velocity'] as const)
    : (['velocity', 'acceleration'] as const))
    for (const owner of equationsOf(model, l).owners) all.add(ownerId(owner));
  const contradicts = (kept: ReadonlySet<string>): boolean => {
    const answer = solveModel(model, tolerance, (id) => !kept.has(id));
    const outcome = level === 'velocity' ? answer.velocity.outcome : answer.acceleration?.outcome;
    return outcome !== undefined && outcome.refused !== null;
  };
  const reduce = (order: readonly string[]): string[] => {
    const kept = new Set(order);
    for (const id of order) {
      kept.delete(id);
      if (!contradicts(kept)) kept.add(id);
    }
    return order.filter((id) => kept.has(id));
  };
  const ids = [...all];
  const forward = reduce(ids);
  const backward = reduce([...ids].reverse()).reverse();
  const place = (id: string): number => ids.indexOf(id);
  return (backward.length < forward.length ? backward : forward).sort(
    (a, b) => place(a) - place(b),
  );
};
