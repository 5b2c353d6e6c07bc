import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';

export const caseId = '0190b6f4-0000-7000-8000-000000000001';
export const ownId = '0190b6f4-0000-7000-8000-000000000002';
export const otherId = '0190b6f4-0000-7000-8000-000000000003';

export const testFile = (over: Partial<ExhibitFile> = {}): ExhibitFile => ({
  id: '0190b6f4-0000-7000-8000-0000000000f1',
  name: 'spur.jpg',
  mediaType: 'image/jpeg',
  size: 12_345,
  sha256: 'ab'.repeat(32),
  sha512: 'cd'.repeat(64),
  statedSha256: null,
  takenInAt: '2026-12-01T10:00:00.000Z',
  picture: {
    width: 640,
    height: 480,
    make: 'Invented',
    model: 'Camera',
    lens: null,
    focalLengthMm: 24,
    takenAtLocal: '2026-11-03T14:05:22',
    takenAtOffset: null,
    latitude: 47.3,
    longitude: -8.25,
    software: null,
    doubts: [{ code: 'zone-unknown', message: 'The camera wrote the time without its zone.' }],
  },
  hasThumbnail: true,
  sameContentAs: [],
  ...over,
});

export const testExhibit = (over: Partial<Exhibit> = {}): Exhibit => ({
  id: '0190b6f4-0000-7000-8000-0000000000e1',
  number: '2026-014/1',
  kind: 'photographs',
  description: 'Photographs of the bend',
  source: '',
  collectedBy: '',
  collectedAt: null,
  collectedPlace: '',
  condition: '',
  packaging: '',
  sealNumber: '',
  sensitive: false,
  parentNumber: null,
  registeredAt: '2026-12-01T09:00:00.000Z',
  version: 1,
  custody: {
    holderId: ownId,
    holder: 'Ines Farrow',
    location: 'cage 2',
    sealNumber: 'S-7',
    pending: null,
  },
  files: [],
  ...over,
});

export const testOffer = (
  over: Partial<NonNullable<Exhibit['custody']['pending']>> = {},
): Exhibit['custody'] => ({
  holderId: ownId,
  holder: 'Ines Farrow',
  location: '',
  sealNumber: '',
  pending: {
    sequence: 4,
    fromId: ownId,
    from: 'Ines Farrow',
    toId: otherId,
    to: 'A. Colleague',
    offeredAt: '2026-12-01T09:30:00.000000Z',
    purpose: 'measuring',
    ...over,
  },
});
