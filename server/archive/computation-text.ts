import { motionSolution, type MotionSolution } from '#shared/engine/documents/motion-solution';

/** The motion that a recorded computation found; null for one of another kind. */
export function motionOf(text: string): MotionSolution | null {
  const { result } = JSON.parse(text) as { result: unknown };
  if (typeof result !== 'object' || result === null) return null;
  const parts: unknown[] = [result, ...(Object.values(result) as unknown[])];
  const found = parts.find(
    (part) => (part as { format?: unknown } | null)?.format === 'centrode.motion-solution/1',
  );
  return found === undefined ? null : motionSolution.parse(found);
}
