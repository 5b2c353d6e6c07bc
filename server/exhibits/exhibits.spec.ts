import { createHash } from 'node:crypto';
import { readdirSync, statSync, writeFileSync, chmodSync } from 'node:fs';
import { setTimeout } from 'node:timers/promises';
import { crc32, deflateSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import type { LedgerEntry } from '#shared/contracts/custody';
import { v7 as newId } from 'uuid';
import { startTestApi, type TestApi, type TestPerson } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';
import { registerTestExhibit, sendTestFile, takeInTestFile, testPicture } from './testing';

let api: TestApi;
let open: TestCase;
beforeAll(async () => {
  api = await startTestApi({ MAX_UPLOAD_BYTES: String(3 * 1024 * 1024) });
  open = await openTestCase(api);
});
afterAll(() => api.stop());

const ledgerOf = async (person: TestPerson, caseId: string, exhibit?: string) => {
  const query = exhibit === undefined ? '' : `?exhibit=${encodeURIComponent(exhibit)}`;
  const answer = await person.get(`/api/cases/${caseId}/custody${query}`).expect(200);
  return (answer.body.entries as LedgerEntry[]).map(({ event }) => event);
};

/** What a request leaves behind is cleared when its answer is out: a moment later. */
async function expectNothingIncoming(): Promise<void> {
  const left = (): string[] => readdirSync(api.services.store.incomingDir);
  for (let i = 0; i < 100 && left().length > 0; i++) await setTimeout(20);
  expect(left()).toEqual([]);
}

describe('registering an exhibit', () => {
  it('when it is registered, then it has a number, a holder and its first events', async () => {
    const { investigator, id, file } = await openTestCase(api);
    const exhibit = await registerTestExhibit(investigator, id, {
      collectedBy: 'R. Ostler',
      collectedAt: '2026-11-03T09:30:00Z',
      collectedPlace: 'Marl Lane',
      source: 'The keeper of the vehicle',
      condition: 'worn to 2 mm',
      packaging: 'paper sack',
      sealNumber: 'S-77',
    });
    expect(exhibit.number).toBe(`${file.number}/1`);
    expect(exhibit.custody).toEqual({
      holderId: investigator.id,
      holder: investigator.account?.name,
      location: '',
      sealNumber: 'S-77',
      pending: null,
    });
    const [collected, received, ...more] = await ledgerOf(investigator, id, exhibit.number);
    expect(more).toEqual([]);
    expect(collected).toMatchObject({
      kind: 'collected',
      happenedAt: '2026-11-03T09:30:00Z',
      location: 'Marl Lane',
      receivedBy: 'R. Ostler',
      previous: '0'.repeat(64),
    });
    expect(received).toMatchObject({
      kind: 'received',
      releasedBy: 'The keeper of the vehicle',
      receivedBy: investigator.account?.name,
      condition: 'worn to 2 mm',
      sealAfter: 'S-77',
      refersTo: 1,
      note: 'physical item: Left rear tyre; packaging: paper sack',
    });
    const again = await investigator.get(`/api/cases/${id}/exhibits/${exhibit.id}`).expect(200);
    expect(again.body).toEqual(exhibit);
    expect(again.get('ETag')).toBe('"1"');
  });

  it('when twelve are registered at once, then numbers and events run without gap or double', async () => {
    const { investigator, id, file } = await openTestCase(api);
    const made = await Promise.all(
      Array.from({ length: 12 }, () => registerTestExhibit(investigator, id)),
    );
    const numbers = made.map(({ number }) => number).sort();
    const expected = Array.from({ length: 12 }, (_, i) => `${file.number}/${i + 1}`).sort();
    expect(numbers).toEqual(expected);
    const events = await ledgerOf(investigator, id);
    expect(events.map(({ sequence }) => sequence)).toEqual(
      Array.from({ length: 12 }, (_, i) => i + 1),
    );
  });

  it('when the same key is sent twice, then one exhibit is registered and both get its number', async () => {
    const { investigator, id } = await openTestCase(api);
    const key = newId();
    const send = () =>
      investigator
        .post(`/api/cases/${id}/exhibits`, { kind: 'sample', description: 'Paint' })
        .set('Idempotency-Key', key)
        .expect(201);
    const [first, second] = await Promise.all([send(), send()]);
    expect(second.body.id).toBe(first.body.id);
    const list = await investigator.get(`/api/cases/${id}/exhibits`).expect(200);
    expect(list.body.items).toHaveLength(1);
  });

  it('when it is taken from another exhibit, then that one must be of the case', async () => {
    const { investigator, id } = await openTestCase(api);
    const parent = await registerTestExhibit(investigator, id);
    const child = await registerTestExhibit(investigator, id, { parentNumber: parent.number });
    expect(child.parentNumber).toBe(parent.number);
    const wrong = await investigator
      .post(`/api/cases/${id}/exhibits`, {
        kind: 'sample',
        description: 'x',
        parentNumber: '2020-001/9',
      })
      .expect(422);
    expect(wrong.body.errors[0].field).toBe('parentNumber');
  });

  it.each([
    [{ kind: 'vehicle', description: 'x' }, 'kind'],
    [{ kind: 'sample', description: '  ' }, 'description'],
    [{ kind: 'sample', description: 'x', collectedAt: '3 November' }, 'collectedAt'],
    [{ kind: 'sample', description: 'x', collectedAt: '2999-01-01T00:00:00Z' }, 'collectedAt'],
    [{ kind: 'sample', description: 'x', sealNumber: 'S'.repeat(81) }, 'sealNumber'],
  ])('when the entry is %j, then the answer names %s', async (entry, field) => {
    const answer = await open.investigator
      .post(`/api/cases/${open.id}/exhibits`, entry)
      .expect(422);
    expect(answer.body.errors[0].field).toBe(field);
  });

  it('when the description is changed, then the old one stays in the ledger', async () => {
    const { investigator, id } = await openTestCase(api);
    const exhibit = await registerTestExhibit(investigator, id);
    const path = `/api/cases/${id}/exhibits/${exhibit.id}`;
    const edited = await investigator
      .patch(path, { description: 'Right rear tyre' }, 1)
      .expect(200);
    expect(edited.body).toMatchObject({ description: 'Right rear tyre', version: 2 });
    const stale = await investigator.patch(path, { description: 'x' }, 1).expect(412);
    expect(stale.body.current.description).toBe('Right rear tyre');
    await investigator.call('patch', path, { description: 'x' }).expect(428);
    const events = await ledgerOf(investigator, id, exhibit.number);
    expect(events.at(-1)).toMatchObject({
      kind: 'corrected',
      refersTo: 1,
      note: 'description: "Left rear tyre" is now "Right rear tyre"',
    });
  });
});

describe('who may', () => {
  it('when nobody, a stranger, an attorney or the lead registers, then it is refused', async () => {
    const stranger = await api.as('investigator');
    const attorney = await api.as('attorney');
    await assignTo(open.lead, open.id, attorney, 'attorney', open.file.parties[0].id);
    const entry = { kind: 'sample', description: 'x' };
    const path = `/api/cases/${open.id}/exhibits`;
    await api.nobody().get(path).expect(401);
    await stranger.post(path, entry).expect(404);
    await attorney.post(path, entry).expect(404);
    await open.lead.post(path, entry).expect(403);
    await open.lead.get(path).expect(200);
  });

  it('when an exhibit of another case is named, then it does not exist', async () => {
    const other = await openTestCase(api);
    const foreign = await registerTestExhibit(other.investigator, other.id);
    await open.investigator.get(`/api/cases/${open.id}/exhibits/${foreign.id}`).expect(404);
    await open.investigator.get(`/api/cases/${other.id}/exhibits/${foreign.id}`).expect(404);
    const picture = await testPicture();
    await sendTestFile(open.investigator, open.id, foreign.id, picture, 'a.jpg').expect(404);
    await expectNothingIncoming();
  });

  it('when an upload is not allowed, then nothing of it is read or kept', async () => {
    const exhibit = await registerTestExhibit(open.investigator, open.id);
    const stranger = await api.as('investigator');
    const picture = await testPicture();
    await sendTestFile(stranger, open.id, exhibit.id, picture, 'a.jpg').expect(404);
    await sendTestFile(open.lead, open.id, exhibit.id, picture, 'a.jpg').expect(403);
    await expectNothingIncoming();
  });
});

describe('taking in a file', () => {
  let exhibit: Exhibit;
  beforeAll(async () => {
    exhibit = await registerTestExhibit(open.investigator, open.id, { kind: 'photographs' });
  });

  it('when a picture is sent, then row, event, object and pictures for the screen are there', async () => {
    const content = await testPicture(7, {
      taken: '2026:11:03 14:05:22',
      offset: '+01:00',
      position: [47.3, -8.25],
    });
    const file = await takeInTestFile(open.investigator, open.id, exhibit.id, content, 'Spur.jpg');
    const hex = (name: string): string => createHash(name).update(content).digest('hex');
    expect(file).toMatchObject({
      name: 'Spur.jpg',
      mediaType: 'image/jpeg',
      size: content.length,
      sha256: hex('sha256'),
      sha512: hex('sha512'),
      hasThumbnail: true,
      picture: {
        width: 640,
        height: 480,
        make: 'Invented',
        model: 'Camera 7',
        takenAtLocal: '2026-11-03T14:05:22',
        takenAtOffset: '+01:00',
      },
    });
    expect(file.picture?.latitude).toBeCloseTo(47.3, 5);
    expect(file.picture?.longitude).toBeCloseTo(-8.25, 5);
    expect(statSync(api.services.store.pathOf(file.sha256)).mode & 0o777).toBe(0o444);
    await expectNothingIncoming();
    const event = (await ledgerOf(open.investigator, open.id, exhibit.number)).at(-1);
    expect(event).toMatchObject({
      kind: 'file taken in',
      files: [{ name: 'Spur.jpg', size: content.length, sha256: file.sha256, sha512: file.sha512 }],
    });
  });

  it('when the name lies about its direction or folders, then it is made harmless', async () => {
    const content = await testPicture(8);
    const name = '../../etc/a\u202egpj.x.jpg';
    const file = await takeInTestFile(open.investigator, open.id, exhibit.id, content, name);
    expect(file.name).toBe('a_gpj.x.jpg');
  });

  it('when the giver states a hash, then the ledger records whether it agrees', async () => {
    const right = await testPicture(9);
    const sha256 = createHash('sha256').update(right).digest('hex');
    const send = (content: Buffer, name: string) =>
      takeInTestFile(open.investigator, open.id, exhibit.id, content, name, {
        statedSha256: sha256,
      });
    const agreeing = await send(right, 'right.jpg');
    expect(agreeing.statedSha256).toBe(agreeing.sha256);
    const other = await send(await testPicture(10), 'other.jpg');
    expect(other.statedSha256).not.toBe(other.sha256);
    const [first, second] = (await ledgerOf(open.investigator, open.id, exhibit.number)).slice(-2);
    expect(first.note).toBe(`The giver stated SHA-256 ${sha256}: it agrees.`);
    expect(second.note).toContain('it does not agree with the file as received');
  });

  it('when the stated hash is not one, then nothing is kept', async () => {
    const content = await testPicture(11);
    const answer = await sendTestFile(open.investigator, open.id, exhibit.id, content, 'a.jpg', {
      statedSha256: 'abc',
    }).expect(422);
    expect(answer.body.errors[0].field).toBe('statedSha256');
    await expectNothingIncoming();
  });

  it('when the same content comes again, then it is noticed and stored once', async () => {
    const content = await testPicture(12);
    const second = await registerTestExhibit(open.investigator, open.id, { kind: 'photographs' });
    const first = await takeInTestFile(open.investigator, open.id, exhibit.id, content, 'a.jpg');
    const again = await takeInTestFile(open.investigator, open.id, second.id, content, 'b.jpg');
    expect(again.sameContentAs).toEqual([exhibit.number]);
    expect(again.sha256).toBe(first.sha256);
    const answer = await sendTestFile(
      open.investigator,
      open.id,
      exhibit.id,
      content,
      'c.jpg',
    ).expect(409);
    expect(answer.body.detail).toContain('holds the same content already');
  });

  it('when the stored copy of the same content was changed, then nobody relies on it', async () => {
    const content = await testPicture(13);
    const file = await takeInTestFile(open.investigator, open.id, exhibit.id, content, 'a.jpg');
    const stored = api.services.store.pathOf(file.sha256);
    chmodSync(stored, 0o600);
    writeFileSync(stored, Buffer.concat([content, Buffer.from('x')]));
    const second = await registerTestExhibit(open.investigator, open.id);
    await sendTestFile(open.investigator, open.id, second.id, content, 'b.jpg').expect(409);
    writeFileSync(stored, content);
    await sendTestFile(open.investigator, open.id, second.id, content, 'b.jpg').expect(201);
  });

  const refused: [string, () => Promise<Buffer> | Buffer, string, RegExp][] = [
    ['an empty file', () => Buffer.alloc(0), 'a.txt', /empty/],
    ['a ZIP that is called a picture', () => zip, 'a.jpg', /ends in ".jpg" but .*zip/],
    ['text that is called a picture', () => Buffer.from('hello'), 'a.png', /text\/plain/],
    ['a page that is called a table', () => Buffer.from('<html><p>'), 'a.csv', /text\/html/],
    ['bytes that are called a table', () => Buffer.from([0, 1, 2, 255]), 'a.csv', /no known kind/],
    ['half a picture', async () => half(await testPicture(14)), 'a.jpg', /damaged or cut short/],
    ['a picture cut by its last kilobyte', async () => cut(await testPicture(15)), 'a.jpg', /cut/],
    ['a picture of 60 000 × 60 000 pixels', () => bomb, 'a.png', /60000 × 60000/],
  ];
  it.each(refused)('when %s is sent, then it is refused and nothing is kept', async (...row) => {
    const [, content, name, message] = row;
    const before = await ledgerOf(open.investigator, open.id);
    const answer = await sendTestFile(
      open.investigator,
      open.id,
      exhibit.id,
      await content(),
      name,
    ).expect(422);
    expect(answer.body.errors).toEqual([
      { field: 'file', message: expect.stringMatching(message) },
    ]);
    await expectNothingIncoming();
    expect(await ledgerOf(open.investigator, open.id)).toHaveLength(before.length);
  });

  it('when it is larger than the limit, then the answer names the limit', async () => {
    const answer = await sendTestFile(
      open.investigator,
      open.id,
      exhibit.id,
      Buffer.alloc(3 * 1024 * 1024 + 1, 'a'),
      'a.txt',
    ).expect(413);
    expect(answer.body.detail).toContain('3 MiB');
    await expectNothingIncoming();
  });

  it('when it has exactly the limit, then it is taken in', async () => {
    const content = Buffer.alloc(3 * 1024 * 1024, 'a');
    const file = await takeInTestFile(open.investigator, open.id, exhibit.id, content, 'a.txt');
    expect(file.mediaType).toBe('text/plain');
  });

  it('when there are two files, no file or odd fields, then the request is refused whole', async () => {
    const path = `/api/cases/${open.id}/exhibits/${exhibit.id}/files`;
    const two = open.investigator.call('post', path);
    await two
      .attach('file', Buffer.from('a'), 'a')
      .attach('file', Buffer.from('b'), 'b')
      .expect(400);
    await open.investigator.call('post', path).attach('other', Buffer.from('a'), 'a').expect(400);
    await open.investigator.call('post', path).field('statedSha256', 'a'.repeat(64)).expect(422);
    await sendTestFile(open.investigator, open.id, exhibit.id, Buffer.from('q'), 'q.bin', {
      surprise: '1',
    }).expect(422);
    await expectNothingIncoming();
  });
});

describe('serving a file', () => {
  let exhibit: Exhibit;
  let picture: ExhibitFile;
  let content: Buffer;
  const pathOf = (file: ExhibitFile): string =>
    `/api/cases/${open.id}/exhibits/${exhibit.id}/files/${file.id}`;
  beforeAll(async () => {
    exhibit = await registerTestExhibit(open.investigator, open.id, { sensitive: true });
    content = await testPicture(20, { position: [10, 20] }, 2000);
    picture = await takeInTestFile(
      open.investigator,
      open.id,
      exhibit.id,
      content,
      'Straße "1".jpg',
    );
  });

  it('when the original is asked for, then it comes as an attachment, byte for byte', async () => {
    const answer = await open.investigator.get(`${pathOf(picture)}/content`).expect(200);
    expect(Buffer.compare(answer.body as Buffer, content)).toBe(0);
    expect(answer.get('Content-Disposition')).toBe(
      `attachment; filename="Stra?e \\"1\\".jpg"; filename*=UTF-8''Stra%C3%9Fe%20%221%22.jpg`,
    );
    expect(answer.get('Content-Type')).toBe('image/jpeg');
    expect(answer.get('X-Content-Type-Options')).toBe('nosniff');
    expect(answer.get('Content-Security-Policy')).toContain('sandbox');
    expect(answer.get('Content-Encoding')).toBeUndefined();
  });

  it('when a range is asked for, then just that comes', async () => {
    const get = (range: string) =>
      open.investigator.get(`${pathOf(picture)}/content`).set('Range', range);
    const part = await get('bytes=100-199').expect(206);
    expect(part.get('Content-Range')).toBe(`bytes 100-199/${content.length}`);
    expect(Buffer.compare(part.body as Buffer, content.subarray(100, 200))).toBe(0);
    const tail = await get('bytes=-10').expect(206);
    expect(Buffer.compare(tail.body as Buffer, content.subarray(-10))).toBe(0);
    const none = await get(`bytes=${content.length}-`).expect(416);
    expect(none.get('Content-Range')).toBe(`bytes */${content.length}`);
  });

  it('when pictures for the screen are asked for, then they are small, bare and logged', async () => {
    const sharp = (await import('sharp')).default;
    for (const [size, longest] of [
      ['thumbnail', 320],
      ['thumbnail-blurred', 320],
      ['screen', 1600],
    ] as const) {
      const answer = await open.investigator
        .get(`${pathOf(picture)}/picture?size=${size}`)
        .expect(200);
      const shown = await sharp(answer.body as Buffer).metadata();
      expect([shown.width, shown.exif]).toEqual([longest, undefined]);
    }
    const log = await open.investigator.get(`/api/cases/${open.id}/events?limit=200`).expect(200);
    const looks = (log.body.items as { action: string; detail: string }[])
      .filter(({ action }) => action === 'looked at picture')
      .map(({ detail }) => detail);
    expect(looks).toEqual(['Straße "1".jpg (screen)', 'Straße "1".jpg (thumbnail)']);
    await open.investigator.get(`${pathOf(picture)}/picture?size=huge`).expect(400);
  });

  it('when a page or a drawing with script was taken in, then it leaves as plain bytes', async () => {
    const page = await takeInTestFile(
      open.investigator,
      open.id,
      exhibit.id,
      Buffer.from('<!doctype html><script>alert(1)</script>'),
      'page.html',
    );
    const drawing = await takeInTestFile(
      open.investigator,
      open.id,
      exhibit.id,
      Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>'),
      'plan.svg',
    );
    expect([page.mediaType, drawing.mediaType]).toEqual(['text/html', 'image/svg+xml']);
    expect([page.hasThumbnail, drawing.hasThumbnail]).toEqual([false, false]);
    for (const file of [page, drawing]) {
      const answer = await open.investigator.get(`${pathOf(file)}/content`).expect(200);
      expect(answer.get('Content-Type')).toBe('application/octet-stream');
      expect(answer.get('Content-Disposition')).toMatch(/^attachment/);
      await open.investigator.get(`${pathOf(file)}/picture?size=screen`).expect(404);
    }
  });

  it('when a table is read as text, then its encoding is told', async () => {
    const send = (bytes: Buffer, name: string) =>
      takeInTestFile(open.investigator, open.id, exhibit.id, bytes, name);
    const utf8 = await send(Buffer.from('\ufeffpunkt;größe\n1;2,5\n'), 'a.csv');
    const older = await send(Buffer.from('punkt;größe\n1;2,5\n', 'latin1'), 'b.csv');
    const wide = await send(Buffer.from('\ufeffpunkt;größe\n', 'utf16le'), 'c.csv');
    const read = async (file: ExhibitFile) =>
      (await open.investigator.get(`${pathOf(file)}/text`).expect(200)).body as object;
    expect(await read(utf8)).toEqual({
      name: 'a.csv',
      encoding: 'UTF-8',
      text: 'punkt;größe\n1;2,5\n',
    });
    expect(await read(older)).toMatchObject({
      encoding: 'Windows-1252',
      text: 'punkt;größe\n1;2,5\n',
    });
    expect(await read(wide)).toMatchObject({ encoding: 'UTF-16LE', text: 'punkt;größe\n' });
    await open.investigator.get(`${pathOf(picture)}/text`).expect(422);
  });

  it('when somebody else asks, then there is nothing', async () => {
    const stranger = await api.as('investigator');
    await stranger.get(`${pathOf(picture)}/content`).expect(404);
    await stranger.get(`${pathOf(picture)}/picture?size=thumbnail`).expect(404);
    await api
      .nobody()
      .get(`${pathOf(picture)}/content`)
      .expect(401);
  });

  it('when the stored file was changed, then the download breaks off and an alarm is logged', async () => {
    const { investigator, id } = await openTestCase(api);
    const item = await registerTestExhibit(investigator, id);
    const bytes = Buffer.alloc(2_500_000, 'evidence ');
    const file = await takeInTestFile(investigator, id, item.id, bytes, 'long.txt');
    const stored = api.services.store.pathOf(file.sha256);
    chmodSync(stored, 0o600);
    bytes[10] ^= 1;
    writeFileSync(stored, bytes);
    await expect(
      investigator.get(`/api/cases/${id}/exhibits/${item.id}/files/${file.id}/content`),
    ).rejects.toThrow(/aborted/);
    const log = await investigator.get(`/api/cases/${id}/events`).expect(200);
    expect(log.body.items[0].action).toBe('integrity alarm');
  });
});

/** An empty ZIP archive with its local header made up: enough to be recognised. */
const zip = Buffer.concat([Buffer.from('PK\u0003\u0004'), Buffer.alloc(60, 1)]);

const half = (bytes: Buffer): Buffer => bytes.subarray(0, Math.floor(bytes.length / 2));
const cut = (bytes: Buffer): Buffer => bytes.subarray(0, bytes.length - 1024);

const chunk = (type: string, data: Buffer): Buffer => {
  const body = Buffer.concat([Buffer.from(type), data]);
  const frame = Buffer.alloc(8);
  frame.writeUInt32BE(data.length);
  frame.writeUInt32BE(crc32(body), 4);
  return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)]);
};

/** A small PNG that says it has 60 000 × 60 000 pixels. */
const bomb = Buffer.concat([
  Buffer.from('89504e470d0a1a0a', 'hex'),
  chunk('IHDR', Buffer.from('0000ea600000ea600802000000', 'hex')),
  chunk('IDAT', deflateSync(Buffer.alloc(200_000))),
  chunk('IEND', Buffer.alloc(0)),
]);
