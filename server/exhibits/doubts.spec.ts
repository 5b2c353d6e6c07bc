import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from '@jest/globals';
import { readMetadata, type CameraMetadata } from '../store/metadata';
import { distance, doubtsOf, middleOf, type Circumstances } from './doubts';
import { testPicture } from './testing';

const folder = mkdtempSync(join(tmpdir(), 'doubts-'));
afterAll(() => rmSync(folder, { recursive: true }));

const sound: CameraMetadata = {
  make: 'Invented',
  model: 'Camera',
  lens: null,
  focalLengthMm: 24,
  takenAtLocal: '2026-11-03T14:05:22',
  takenAtOffset: '+01:00',
  changedAtLocal: '2026-11-03T14:05:22',
  satelliteTime: '2026-11-03T13:05:20Z',
  latitude: 47.3,
  longitude: 8.25,
  software: 'Firmware 3.1',
  editHistory: false,
};
const usual: Circumstances = {
  takenInAt: new Date('2026-11-05T08:00:00Z'),
  collectedAt: new Date('2026-11-03T14:00:00Z'),
  incidentOn: '2026-11-02',
  middle: { latitude: 47.3, longitude: 8.25 },
};
const at2019 = {
  takenAtLocal: '2019-01-01T00:00:09',
  changedAtLocal: null,
  satelliteTime: null,
};
const codes = (change: Partial<CameraMetadata>, about: Partial<Circumstances> = {}): string[] =>
  doubtsOf({ ...sound, ...change }, { ...usual, ...about }).map(({ code }) => code);

describe('doubts about a picture', () => {
  it('has none where everything agrees', () => {
    expect(codes({})).toEqual([]);
  });

  it.each<[string, string[], Partial<CameraMetadata>, Partial<Circumstances>]>([
    ['its clock was never set', ['before-incident'], { ...at2019 }, {}],
    ['an editing program wrote it', ['edited'], { software: 'Marl Retouch 4.2' }, {}],
    ['no time was written', ['no-time'], { takenAtLocal: null, changedAtLocal: null }, {}],
    ['no zone was written', ['zone-unknown'], { takenAtOffset: null }, {}],
    [
      'it arrived before it was taken',
      ['after-intake'],
      {},
      { takenInAt: at('2026-11-03T13:00:00Z') },
    ],
    [
      'it was collected a day before',
      ['after-collection'],
      {},
      { collectedAt: at('2026-11-02T12:00:00Z') },
    ],
    ['the clock is 40 min fast', ['clock-differs'], { satelliteTime: '2026-11-03T12:25:20Z' }, {}],
    ['it was saved a day later', ['saved-later'], { changedAtLocal: '2026-11-04T09:00:00' }, {}],
    ['it tells of editing', ['edited'], { editHistory: true }, {}],
    ['it was taken elsewhere', ['far-away'], { latitude: 47.4 }, {}],
  ])('finds that %s', (_what, expected, change, about) => {
    expect(codes(change, about)).toEqual(expected);
  });

  it('says that a file without metadata tells nothing', () => {
    expect(doubtsOf(null, usual).map(({ code }) => code)).toEqual(['no-metadata']);
  });

  it('takes whole quarters of an hour for the zone where none was written', () => {
    const without = { takenAtOffset: null };
    expect(codes({ ...without, satelliteTime: '2026-11-03T08:35:22Z' })).toEqual(['zone-unknown']);
    expect(codes({ ...without, satelliteTime: '2026-11-03T08:28:22Z' })).toEqual([
      'zone-unknown',
      'clock-differs',
    ]);
  });

  it('without a zone, accuses only what no zone explains', () => {
    const local = {
      takenAtOffset: null,
      takenAtLocal: '2026-11-05T20:00:00',
      changedAtLocal: null,
    };
    expect(codes({ ...local, satelliteTime: null }, { collectedAt: null })).toEqual([
      'zone-unknown',
    ]);
    const later = { ...local, takenAtLocal: '2026-11-05T23:00:00', satelliteTime: null };
    expect(codes(later, { collectedAt: null })).toEqual(['zone-unknown', 'after-intake']);
  });
});

describe('places', () => {
  it('are a quarter of the meridian apart from equator to pole', () => {
    const quarter = (Math.PI / 2) * 6_371_008.8;
    expect(distance({ latitude: 0, longitude: 0 }, { latitude: 90, longitude: 0 })).toBeCloseTo(
      quarter,
      6,
    );
    expect(
      distance({ latitude: 5, longitude: 179.5 }, { latitude: 5, longitude: -179.5 }),
    ).toBeLessThan(112_000);
  });

  it('have a middle that one stray picture does not move, and none where few tell', () => {
    const near = [1, 2, 3, 4].map((i) => ({ latitude: 47 + i / 1e4, longitude: 8 }));
    const stray = { latitude: -33, longitude: 151 };
    expect(middleOf([...near, stray])?.latitude).toBeCloseTo(47.0002, 6);
    expect(middleOf(near.slice(1))).toBeNull();
  });
});

describe('metadata', () => {
  const read = (name: string, bytes: Buffer) => {
    const path = join(folder, name);
    writeFileSync(path, bytes);
    return readMetadata(path);
  };

  it('is read as the camera wrote it, in no zone of this machine', async () => {
    const zone = process.env['TZ'];
    process.env['TZ'] = 'Pacific/Auckland';
    const tags = await read(
      'a.jpg',
      await testPicture(1, {
        taken: '2026:11:03 14:05:22',
        offset: '+01:00',
        changed: '2026:11:04 09:00:00',
        software: 'Firmware 3.1',
        position: [-47.5, 8.25],
      }),
    );
    if (zone === undefined) delete process.env['TZ'];
    else process.env['TZ'] = zone;
    expect(tags).toMatchObject({
      takenAtLocal: '2026-11-03T14:05:22',
      takenAtOffset: '+01:00',
      changedAtLocal: '2026-11-04T09:00:00',
      software: 'Firmware 3.1',
    });
    expect(tags?.latitude).toBeCloseTo(-47.5, 6);
    expect(tags?.longitude).toBeCloseTo(8.25, 6);
  });

  it('does not take a clock that was never set for a time', async () => {
    const tags = await read('b.jpg', await testPicture(2, { taken: '0000:00:00 00:00:00' }));
    expect(tags?.takenAtLocal).toBeNull();
  });

  it('is nothing, and no error, where the file is damaged', async () => {
    const picture = await testPicture(3, { taken: '2026:11:03 14:05:22' });
    for (let i = 20; i < 200; i++) picture[i] ^= 0xff;
    expect(await read('c.jpg', picture)).toBeNull();
    expect(await read('d.jpg', Buffer.from('no picture'))).toBeNull();
  });
});

function at(text: string): Date {
  return new Date(text);
}
