import sharp, { type Sharp } from 'sharp';

/** A picture that cannot be shown in full: cut short, damaged, or too large to open safely. */
export class UnreadablePicture extends Error {}

/** Media types that are opened here; others are kept and offered for download only. */
const shown = new Set([
  'image/jpeg',
  'image/png',
  'image/apng',
  'image/webp',
  'image/gif',
  'image/tiff',
  'image/avif',
]);

export const isShown = (mediaType: string): boolean => shown.has(mediaType);

/** 2 × 10^8 pixels, 800 MB as RGBA: above every camera's single frame, below what fells the machine. */
export const mostPixels = 200_000_000;

export const pictureSizes = ['thumbnail', 'thumbnail-blurred', 'screen'] as const;
export type PictureSize = (typeof pictureSizes)[number];

export interface Rendition {
  readonly size: PictureSize;
  readonly mediaType: 'image/jpeg';
  readonly width: number;
  readonly height: number;
  /** How it was made from the original, for the record. */
  readonly recipe: string;
  readonly bytes: Uint8Array;
}

export interface Rendered {
  /** Of the original as stored, before it is turned upright. */
  readonly width: number;
  readonly height: number;
  readonly renditions: readonly Rendition[];
}

const longest = { thumbnail: 320, screen: 1600 };
const steps = 'first frame, turned upright by its orientation, sRGB, on white, metadata left out';

/**
 * Decodes a picture in full and makes what the screen shows of it. The renditions carry no metadata.
 * @throws UnreadablePicture with the reason in plain words.
 */
export async function renderPicture(path: string): Promise<Rendered> {
  const { width, height } = await declaredSize(path);
  if (width * height > mostPixels) {
    throw new UnreadablePicture(
      `The picture says that it has ${width} × ${height} pixels; at most ${mostPixels / 1e6} million are opened.`,
    );
  }
  try {
    const screen = await encode(
      sharp(path, { failOn: 'error', limitInputPixels: mostPixels, sequentialRead: true })
        .autoOrient()
        .toColourspace('srgb')
        .flatten({ background: '#ffffff' })
        .resize({ ...box(longest.screen), withoutEnlargement: true }),
    );
    const thumbnail = await encode(
      sharp(screen.data).resize({ ...box(longest.thumbnail), withoutEnlargement: true }),
    );
    // Shrunk to a few pixels first: what was there cannot be guessed back from the blur.
    const few = await sharp(thumbnail.data).resize(box(16)).png().toBuffer();
    const blurred = await encode(
      sharp(few)
        .resize(thumbnail.info.width, thumbnail.info.height, { fit: 'fill', kernel: 'cubic' })
        .blur(12),
    );
    return {
      width,
      height,
      renditions: [
        rendition('screen', screen, `longest side ${longest.screen}`),
        rendition('thumbnail', thumbnail, `longest side ${longest.thumbnail}`),
        rendition('thumbnail-blurred', blurred, 'shrunk to 16 pixels, enlarged and blurred'),
      ],
    };
  } catch (error) {
    throw new UnreadablePicture(
      `The picture is damaged or cut short and cannot be shown in full (${reason(error)}). ` +
        'If it must be kept as it is, put it into a ZIP file and take that in.',
    );
  }
}

async function declaredSize(path: string): Promise<{ width: number; height: number }> {
  try {
    const { width, height, pageHeight } = await sharp(path, {
      failOn: 'error',
      limitInputPixels: false,
    }).metadata();
    return { width, height: pageHeight ?? height };
  } catch (error) {
    throw new UnreadablePicture(`The picture cannot be read (${reason(error)}).`);
  }
}

type Encoded = Awaited<ReturnType<typeof encode>>;

const encode = (picture: Sharp) =>
  picture.jpeg({ quality: 82 }).toBuffer({ resolveWithObject: true });

const box = (side: number) => ({ width: side, height: side, fit: 'inside' as const });

const rendition = (size: PictureSize, { data, info }: Encoded, how: string): Rendition => ({
  size,
  mediaType: 'image/jpeg',
  width: info.width,
  height: info.height,
  recipe: `sharp ${sharp.versions.sharp}: ${steps}; ${how}; JPEG quality 82`,
  bytes: data,
});

/** The library's first line; the rest repeats it. */
const reason = (error: unknown): string =>
  error instanceof Error ? error.message.split('\n')[0].slice(0, 160) : 'unknown reason';
