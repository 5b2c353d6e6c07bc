import type { Mark, MarkKind } from '#shared/contracts/survey';
import { escapeMarkup } from './escape';
import { tracesOf } from './survey-files';

export interface PlanInput {
  readonly marks: readonly Mark[];
  readonly title: string;
  readonly caption: readonly string[];
  /** Bearing of the scene's +x axis, rad clockwise from north; null: no north arrow. */
  readonly xAxisBearing: number | null;
}

/** The sheet, mm: A3 lying, with a strip for title, legend and scale at its foot. */
const sheet = { width: 420, height: 297, margin: 12, foot: 34 };
const ratios = [10, 20, 50, 100, 200, 250, 500, 1000, 2000, 2500, 5000, 10_000, 20_000, 50_000];
/** Above this many marks only those that are not on a trace are named, so that names can be read. */
const mostNames = 250;

const ink = '#1B2733';
const muted = '#56636E';
const chalk = '#B9501F';
const line = '#DAD6CA';

const mm = (value: number) => value.toFixed(2);

interface Frame {
  readonly ratio: number;
  /** Scene metres to sheet millimetres. */
  place(at: readonly [number, number]): [number, number];
}

function frameOf(marks: readonly Mark[]): Frame {
  const xs = marks.map((mark) => mark.at[0]);
  const ys = marks.map((mark) => mark.at[1]);
  const least = (values: number[]) => values.reduce((a, b) => Math.min(a, b), Infinity);
  const most = (values: number[]) => values.reduce((a, b) => Math.max(a, b), -Infinity);
  const [x0, x1, y0, y1] = marks.length
    ? [least(xs), most(xs), least(ys), most(ys)]
    : [0, 10, 0, 10];
  const room = {
    width: sheet.width - 2 * sheet.margin - 20,
    height: sheet.height - 2 * sheet.margin - sheet.foot - 16,
  };
  const needed = Math.max(((x1 - x0) * 1000) / room.width, ((y1 - y0) * 1000) / room.height);
  const ratio = ratios.find((each) => each >= needed) ?? Math.ceil(needed / 10_000) * 10_000;
  const centre = [sheet.width / 2, (sheet.height - sheet.foot) / 2];
  return {
    ratio,
    place: ([x, y]) => [
      centre[0] + ((x - (x0 + x1) / 2) * 1000) / ratio,
      centre[1] - ((y - (y0 + y1) / 2) * 1000) / ratio,
    ],
  };
}

type Shape = (x: number, y: number) => string;
const path =
  (draw: string, filled = false): Shape =>
  (x, y) =>
    `<path d="${draw}" transform="translate(${mm(x)} ${mm(y)})"${filled ? ` fill="${chalk}"` : ''}/>`;

/** The symbol tells the kind; the colour is the same for all. */
const shapes: Readonly<Record<MarkKind, Shape>> = {
  'tyre mark': path('M-1.3 0H1.3M0-1.3V1.3'),
  'skid mark': path('M-1.3-.5H1.3M-1.3.5H1.3'),
  'yaw mark': path('M-1.3 .8Q0-1.6 1.3 .8'),
  scrub: path('M-1.3 .7L-.4-.7L.4 .7L1.3-.7'),
  gouge: path('M-1.1-.9H1.1L0 1.2Z', true),
  scrape: path('M-1.2 1L0-1M0 1L1.2-1'),
  'witness mark': path('M0-1.3L1.3 0L0 1.3L-1.3 0Z'),
  debris: path('M-1-1H1V1H-1Z'),
  fluid: path('M0-1.4Q1.5 .6 0 1.2Q-1.5 .6 0-1.4Z'),
  'point of rest': path('M-1.2-1.2H1.2V1.2H-1.2ZM-1.2-1.2L1.2 1.2M-1.2 1.2L1.2-1.2'),
  'road edge': path('M0-.6V.6'),
  'line marking': path('M-.6 0H.6'),
  'control point': path('M0-1.5L1.4 1H-1.4ZM0-.3V.3'),
  other: path('M-.9-.9L.9 .9M-.9 .9L.9-.9'),
};

function scaleBar(frame: Frame, x: number, y: number): string {
  const steps = [0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100, 200, 500, 1000];
  const length = steps.findLast((each) => (each * 1000) / frame.ratio <= 80) ?? steps[0];
  const width = (length * 1000) / frame.ratio;
  return (
    `<path d="M${mm(x)} ${mm(y - 2)}V${mm(y)}H${mm(x + width)}V${mm(y - 2)}M${mm(x + width / 2)} ${mm(y - 1.4)}V${mm(y)}" fill="none" stroke="${ink}"/>` +
    `<text x="${mm(x)}" y="${mm(y + 4)}">0</text>` +
    `<text x="${mm(x + width)}" y="${mm(y + 4)}" text-anchor="middle">${length} m</text>` +
    `<text x="${mm(x)}" y="${mm(y + 9)}" fill="${muted}">Scale 1:${frame.ratio} on A3, not to be measured on a screen</text>`
  );
}

function northArrow(bearing: number, x: number, y: number): string {
  // North lies at the angle `bearing` from +x, counter-clockwise; the sheet's y runs downwards.
  const turn = 90 - (bearing * 180) / Math.PI;
  return (
    `<g transform="translate(${mm(x)} ${mm(y)})">` +
    `<path d="M0 7V-7M-2-3L0-7L2-3" fill="none" stroke="${ink}" transform="rotate(${turn.toFixed(3)})"/>` +
    `<text x="11" y="1.5" text-anchor="middle">North</text></g>`
  );
}

function legend(kinds: readonly MarkKind[], x: number, y: number): string {
  return kinds
    .map((kind, i) => {
      const [left, top] = [x + 30 * Math.floor(i / 4), y + 5.5 * (i % 4)];
      return (
        `<g fill="none" stroke="${chalk}">${shapes[kind](left, top)}</g>` +
        `<text x="${mm(left + 3.5)}" y="${mm(top + 1.1)}">${kind}</text>`
      );
    })
    .join('');
}

/** Scale plan of the marks on an A3 sheet: symbols, traces, north, scale bar and legend. */
export function planSvg(input: PlanInput): string {
  const frame = frameOf(input.marks);
  const symbols = input.marks.map((mark) => shapes[mark.kind](...frame.place(mark.at))).join('');
  const traces = [...tracesOf(input.marks).values()]
    .map((trace) => trace.map((mark) => frame.place(mark.at).map(mm).join(' ')).join('L'))
    .map((points) => `<path d="M${points}" stroke-width=".5" stroke-opacity=".55"/>`)
    .join('');
  const names = input.marks
    .filter((mark) => input.marks.length <= mostNames || mark.trace === null)
    .map((mark) => {
      const [x, y] = frame.place(mark.at);
      return `<text x="${mm(x + 1.9)}" y="${mm(y - 1.2)}">${escapeMarkup(mark.label)}</text>`;
    })
    .join('');
  const kinds = [...new Set(input.marks.map((mark) => mark.kind))].sort();
  const foot = sheet.height - sheet.margin - sheet.foot;
  const right = sheet.width - sheet.margin;
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${sheet.width}mm" height="${sheet.height}mm" ` +
    `viewBox="0 0 ${sheet.width} ${sheet.height}" role="img" font-family="'Atkinson Hyperlegible Next',sans-serif" font-size="3" fill="${ink}">` +
    `<title>${escapeMarkup(input.title)}</title>` +
    `<rect width="100%" height="100%" fill="#FFFFFF"/>` +
    `<path d="M${sheet.margin} ${foot}H${right}" stroke="${line}" stroke-width=".3"/>` +
    `<g fill="none" stroke="${chalk}" stroke-width=".35">${traces}${symbols}</g>` +
    `<g font-size="2.6">${names}</g>` +
    `<text x="${sheet.margin}" y="${foot + 8}" font-size="5" font-weight="700" font-family="Merriweather,serif">${escapeMarkup(input.title)}</text>` +
    input.caption
      .map((text, i) => ({ y: foot + 13 + 4.5 * i, text: escapeMarkup(text) }))
      .map(({ y, text }) => `<text x="${sheet.margin}" y="${y}" fill="${muted}">${text}</text>`)
      .join('') +
    `<g stroke-width=".4">${scaleBar(frame, sheet.margin, foot + 24)}` +
    (input.xAxisBearing === null
      ? ''
      : northArrow(input.xAxisBearing, sheet.width / 2, foot + 18)) +
    `${legend(kinds, sheet.width / 2 + 30, foot + 7)}</g></svg>\n`
  );
}
