import type { PlanPoint } from '../plan-content';

/** What is drawn on in one frame: a canvas in pixels of the page, and where the scene lies on it. */
export interface Sheet {
  readonly context: CanvasRenderingContext2D;
  readonly width: number;
  readonly height: number;
  /** Scene point in the middle of the sheet. */
  readonly centre: PlanPoint;
  /** Metres per pixel. */
  readonly resolution: number;
}

/** Pixels of a scene point; y runs down on a sheet and up in a scene. */
export function onSheet(sheet: Sheet, [x, y]: PlanPoint): [number, number] {
  return [
    sheet.width / 2 + (x - sheet.centre[0]) / sheet.resolution,
    sheet.height / 2 - (y - sheet.centre[1]) / sheet.resolution,
  ];
}

export function strokePath(sheet: Sheet, path: readonly PlanPoint[], closed = false): void {
  const { context } = sheet;
  context.beginPath();
  path.forEach((point, index) => {
    const [x, y] = onSheet(sheet, point);
    if (index === 0) context.moveTo(x, y);
    else context.lineTo(x, y);
  });
  if (closed) context.closePath();
  context.stroke();
}
