/** The colours of the drawing, as the theme in force has them. */
export interface PlanColours {
  readonly sheet: string;
  readonly ink: string;
  readonly muted: string;
  readonly line: string;
  readonly ground: string;
  readonly spruce: string;
  readonly chalk: string;
  readonly plum: string;
  readonly ochre: string;
}

const names = [
  'sheet',
  'ink',
  'muted',
  'line',
  'ground',
  'spruce',
  'chalk',
  'plum',
  'ochre',
] as const satisfies readonly (keyof PlanColours)[];

/** Reads the custom properties where the plan stands: they differ by theme and in print. */
export function coloursAt(element: Element): PlanColours {
  const style = getComputedStyle(element);
  return Object.fromEntries(
    names.map((name) => [name, style.getPropertyValue(`--${name}`).trim() || '#000000']),
  ) as unknown as PlanColours;
}
