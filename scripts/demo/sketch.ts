import { PDFDocument, type PDFFont, type PDFPage, StandardFonts, rgb } from 'pdf-lib';
import type { Vec2 } from './plane-motion';

/** A field sketch or inspection note on one landscape A4 page. */
export interface Sketch {
  title: string;
  subtitle: string;
  author: string;
  /** ISO 8601; also the document's date. */
  date: string;
  /** Bearing of +x clockwise from north, degrees; null draws an "up" arrow for an elevation. */
  bearingOfX: number | null;
  /** Lower left and upper right corner of what is drawn, m. */
  window: readonly [Vec2, Vec2];
  scaleBar: { length: number; label: string };
  lines: {
    points: readonly Vec2[];
    kind: 'edge' | 'dashed' | 'trace' | 'outline';
    label?: string;
  }[];
  labels: { at: Vec2; text: string; kind: 'control' | 'mark' | 'note' }[];
  notes: string[];
}

const PAGE = { width: 842, height: 595 };
const DRAWING = { left: 40, bottom: 150, width: 762, height: 365 };
const INK = rgb(0.11, 0.15, 0.2);
const FAINT = rgb(0.45, 0.48, 0.5);
const MARK = rgb(0.72, 0.31, 0.12);

const STROKES = {
  edge: { thickness: 0.8, color: FAINT },
  dashed: { thickness: 0.6, color: FAINT, dashArray: [6, 5] },
  trace: { thickness: 1.3, color: MARK },
  outline: { thickness: 1.1, color: INK },
};

export async function sketchPdf(sketch: Sketch): Promise<Buffer> {
  const document = await PDFDocument.create({ updateMetadata: false });
  const date = new Date(sketch.date);
  document.setTitle(sketch.title);
  document.setAuthor(sketch.author);
  document.setProducer('Centrode demo world');
  document.setCreator('Quellmere Reconstruction Laboratory (invented)');
  document.setCreationDate(date);
  document.setModificationDate(date);
  const plain = await document.embedFont(StandardFonts.Helvetica);
  const bold = await document.embedFont(StandardFonts.HelveticaBold);
  const page = document.addPage([PAGE.width, PAGE.height]);
  heading(page, sketch, bold, plain);
  drawing(page, sketch, plain);
  sketch.notes.forEach((note, i) =>
    page.drawText(note, { x: 40, y: 126 - i * 12.5, size: 8.5, font: plain, color: INK }),
  );
  return Buffer.from(await document.save());
}

function heading(page: PDFPage, sketch: Sketch, bold: PDFFont, plain: PDFFont): void {
  page.drawText(sketch.title, { x: 40, y: 556, size: 16, font: bold, color: INK });
  page.drawText(sketch.subtitle, { x: 40, y: 538, size: 9.5, font: plain, color: INK });
  page.drawText(`${sketch.author}, ${sketch.date.slice(0, 10)}`, {
    x: 620,
    y: 556,
    size: 9.5,
    font: plain,
    color: INK,
  });
  page.drawText(
    'Invented demonstration data. Not to scale beyond the printed bar; measure the survey.',
    {
      x: 40,
      y: 20,
      size: 7.5,
      font: plain,
      color: FAINT,
    },
  );
}

function drawing(page: PDFPage, sketch: Sketch, font: PDFFont): void {
  const [low, high] = sketch.window;
  const scale = Math.min(DRAWING.width / (high[0] - low[0]), DRAWING.height / (high[1] - low[1]));
  const onPage = ([x, y]: Vec2): { x: number; y: number } => ({
    x: DRAWING.left + (x - low[0]) * scale,
    y: DRAWING.bottom + (y - low[1]) * scale,
  });
  const frame = {
    x: DRAWING.left,
    y: DRAWING.bottom,
    width: DRAWING.width,
    height: DRAWING.height,
  };
  page.drawRectangle({ ...frame, borderColor: FAINT, borderWidth: 0.5 });
  const within = ([x, y]: Vec2): boolean =>
    x >= low[0] && y >= low[1] && x <= low[0] + DRAWING.width / scale && y <= high[1];
  for (const line of sketch.lines) {
    line.points.slice(1).forEach((point, i) => {
      const from = line.points[i];
      if (within(from) && within(point)) {
        page.drawLine({ start: onPage(from), end: onPage(point), ...STROKES[line.kind] });
      }
    });
    const end = line.points[line.points.length - 1];
    if (line.label !== undefined && within(end)) {
      const place = onPage(end);
      const text = { x: place.x + 4, y: place.y + 3, size: 7.5, font, color: MARK };
      page.drawText(line.label, text);
    }
  }
  for (const label of sketch.labels) {
    const place = onPage(label.at);
    const color = label.kind === 'mark' ? MARK : INK;
    if (label.kind === 'control') {
      page.drawCircle({ ...place, size: 3, borderColor: INK, borderWidth: 0.8 });
      page.drawLine({
        start: { ...place, x: place.x - 5 },
        end: { ...place, x: place.x + 5 },
        thickness: 0.5,
      });
    } else if (label.kind === 'mark') page.drawCircle({ ...place, size: 1.8, color });
    page.drawText(label.text, { x: place.x + 4, y: place.y + 4, size: 7, font, color });
  }
  scaleAndArrow(page, sketch, scale, font);
}

function scaleAndArrow(page: PDFPage, sketch: Sketch, scale: number, font: PDFFont): void {
  const left = 640;
  const bar = sketch.scaleBar.length * scale;
  for (let part = 0; part < 4; part += 1) {
    const fill = part % 2 === 0 ? INK : rgb(1, 1, 1);
    const piece = { x: left + (part * bar) / 4, y: 118, width: bar / 4, height: 5 };
    page.drawRectangle({ ...piece, color: fill, borderColor: INK, borderWidth: 0.5 });
  }
  page.drawText(sketch.scaleBar.label, { x: left, y: 106, size: 8, font, color: INK });
  const north = sketch.bearingOfX === null ? 90 : sketch.bearingOfX;
  const angle = (north * Math.PI) / 180;
  const foot = { x: left + 40, y: 62 };
  const tip = { x: foot.x + 30 * Math.cos(angle), y: foot.y + 30 * Math.sin(angle) };
  page.drawLine({ start: foot, end: tip, thickness: 1.2, color: INK });
  page.drawText(sketch.bearingOfX === null ? 'up' : 'N', {
    x: tip.x + 4 * Math.cos(angle),
    y: tip.y + 4 * Math.sin(angle),
    size: 9,
    font,
    color: INK,
  });
}
