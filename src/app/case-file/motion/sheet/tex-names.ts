import type { StationAnswer } from '#shared/engine/documents/station';

/**
 * The engine names bodies by their full names and directions by the ids of marks; in an equation a
 * short name reads better: the body's key (none where there is but one body), the trace's name.
 */
export function shortNames(answer: StationAnswer): (tex: string) => string {
  const bodies = answer.problem?.bodies ?? [];
  const pairs = [
    ...answer.directions.map(
      (one) => [upright(`${one.mark}:${one.body}.${one.point}`), upright(one.trace)] as const,
    ),
    ...bodies.flatMap((body) => {
      const long = upright(body.label ?? body.id);
      // Of a single body's turning the index says nothing.
      return bodies.length === 1
        ? ([
            [`\\omega_{${long}}`, '\\omega'],
            [`\\alpha_{${long}}`, '\\alpha'],
            [long, upright(body.id)],
          ] as const)
        : ([[long, upright(body.id)]] as const);
    }),
  ];
  return (tex) => pairs.reduce((text, [from, to]) => text.replaceAll(from, to), tex);
}

const special = /[\\{}$&#^_%~]/g;

/** A name as the engine sets it: single letters in italics, the rest upright. */
function upright(name: string): string {
  const clean = name.replace(special, (sign) => (sign === '_' ? '\\_' : ' '));
  return /^[A-Za-z]$/.test(clean) ? clean : `\\text{${clean}}`;
}
