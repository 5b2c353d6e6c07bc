import sharp from 'sharp';
import { ContradictingType, findMediaType } from './content-type';
import { readMetadata, type CameraMetadata } from './metadata';
import { UnreadablePicture, isShown, renderPicture, type Rendered } from './picture';

// One picture uses one core; the pool decides how many are opened at once.
sharp.concurrency(1);
sharp.cache(false);

export interface InspectionTask {
  readonly path: string;
  readonly name: string;
}

/** Errors do not cross threads with their class, so a refusal is an answer. */
export type Inspection =
  | { readonly refused: string }
  | {
      readonly mediaType: string;
      readonly metadata: CameraMetadata | null;
      readonly picture: Rendered | null;
    };

const mayHaveMetadata = (mediaType: string): boolean => mediaType.startsWith('image/');

/** Looks into one file: its type, its metadata, and what the screen shows of it. */
export default async function inspect({ path, name }: InspectionTask): Promise<Inspection> {
  try {
    const mediaType = await findMediaType(path, name);
    const picture = isShown(mediaType) ? await renderPicture(path) : null;
    const metadata = mayHaveMetadata(mediaType) ? await readMetadata(path) : null;
    return { mediaType, metadata, picture };
  } catch (error) {
    if (error instanceof ContradictingType || error instanceof UnreadablePicture) {
      return { refused: error.message };
    }
    throw error;
  }
}
