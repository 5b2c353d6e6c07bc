import type { PictureMetadata } from '#shared/contracts/exhibits';

export interface PictureFact {
  readonly name: string;
  readonly value: string;
}

/** What a picture's metadata says, in the order in which people ask; only what is there. */
export function pictureFacts(picture: PictureMetadata | null): PictureFact[] {
  if (picture === null) return [];
  const facts: PictureFact[] = [
    { name: 'Taken', value: taken(picture) },
    { name: 'Camera', value: [picture.make, picture.model].filter(Boolean).join(' ') },
    { name: 'Lens', value: lens(picture) },
    { name: 'Position', value: position(picture) },
    { name: 'Written by', value: picture.software ?? '' },
    {
      name: 'Size',
      value:
        picture.width === null || picture.height === null
          ? ''
          : `${picture.width} × ${picture.height} pixels`,
    },
  ];
  return facts.filter(({ value }) => value !== '');
}

function taken({ takenAtLocal, takenAtOffset }: PictureMetadata): string {
  if (takenAtLocal === null) return '';
  const time = takenAtLocal.replace('T', ', ');
  return takenAtOffset === null ? `${time}, zone not told` : `${time}, UTC${takenAtOffset}`;
}

function lens({ lens, focalLengthMm }: PictureMetadata): string {
  const focal = focalLengthMm === null ? '' : `${Number(focalLengthMm.toPrecision(3))} mm`;
  return [lens ?? '', focal].filter((part) => part !== '').join(', ');
}

/** Five decimals of a degree are about a metre; cameras do not know better. */
function position({ latitude, longitude }: PictureMetadata): string {
  if (latitude === null || longitude === null) return '';
  const north = `${Math.abs(latitude).toFixed(5)}° ${latitude < 0 ? 'S' : 'N'}`;
  const east = `${Math.abs(longitude).toFixed(5)}° ${longitude < 0 ? 'W' : 'E'}`;
  return `${north}, ${east}`;
}
