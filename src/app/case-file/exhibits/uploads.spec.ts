import { HttpEventType, provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { TestBed } from '@angular/core/testing';
import { afterEach, beforeEach, describe, expect, it } from '@jest/globals';
import { Api } from '../../core/api/api';
import { caseId, testExhibit, testFile } from './testing';
import { Uploads } from './uploads';

const { id: exhibitId } = testExhibit();
const url = `/api/cases/${caseId}/exhibits/${exhibitId}/files`;
const named = (name: string): File => new File(['content'], name);

describe('uploads', () => {
  let uploads: Uploads;
  let http: HttpTestingController;
  const taken: string[] = [];
  const add = (...names: string[]): void =>
    uploads.add(caseId, exhibitId, names.map(named), '', ({ name }) => taken.push(name));
  const states = (): string[] => uploads.all().map(({ file, state }) => `${file.name} ${state}`);

  beforeEach(() => {
    taken.length = 0;
    TestBed.configureTestingModule({
      providers: [provideHttpClient(), provideHttpClientTesting(), Uploads],
    });
    TestBed.inject(Api).csrfToken.set('token-1');
    uploads = TestBed.inject(Uploads);
    http = TestBed.inject(HttpTestingController);
  });
  afterEach(() => http.verify());

  it('when two are added, then they go one after the other, with the token', async () => {
    add('a.jpg', 'b.jpg');
    const first = http.expectOne(url);
    expect(first.request.headers.get('X-CSRF-Token')).toBe('token-1');
    expect((first.request.body as FormData).get('file')).toBeInstanceOf(File);
    expect(states()).toEqual(['a.jpg sending', 'b.jpg waiting']);
    first.event({ type: HttpEventType.UploadProgress, loaded: 50, total: 200 });
    expect(uploads.all()[0]?.sent).toBe(0.25);
    first.event({ type: HttpEventType.UploadProgress, loaded: 200, total: 200 });
    expect(states()[0]).toBe('a.jpg checking');
    first.flush(testFile({ name: 'a.jpg' }), { status: 201, statusText: '' });
    await Promise.resolve();
    http.expectOne(url).flush(testFile({ name: 'b.jpg' }), { status: 201, statusText: '' });
    await Promise.resolve();
    expect(states()).toEqual(['a.jpg done', 'b.jpg done']);
    expect(taken).toEqual(['a.jpg', 'b.jpg']);
    expect(uploads.underWay()).toBe(false);
  });

  it('when one is refused, then it says why, the next goes on, and it can be tried again', async () => {
    add('a.jpg', 'b.jpg');
    http
      .expectOne(url)
      .flush(
        { type: 'about:blank', title: 'Please correct', status: 422, detail: 'The file is empty.' },
        { status: 422, statusText: '' },
      );
    await Promise.resolve();
    http.expectOne(url).flush(testFile(), { status: 201, statusText: '' });
    await Promise.resolve();
    expect(states()).toEqual(['a.jpg failed', 'b.jpg done']);
    const [failed] = uploads.all();
    expect(failed?.problem?.detail).toBe('The file is empty.');
    if (failed) uploads.retry(failed, caseId, () => undefined);
    http.expectOne(url).flush(testFile(), { status: 201, statusText: '' });
    expect(states()[0]).toBe('a.jpg done');
  });

  it('when it is stopped, then the request ends and the next one goes', async () => {
    add('a.jpg', 'b.jpg');
    const first = http.expectOne(url);
    const [stopped] = uploads.all();
    if (stopped) uploads.remove(stopped);
    expect(first.cancelled).toBe(true);
    await Promise.resolve();
    http.expectOne(url).flush(testFile(), { status: 201, statusText: '' });
    expect(states()).toEqual(['b.jpg done']);
  });

  it('when the exhibit is sensitive, then its picture is the blurred one until asked for', () => {
    const sensitive = testExhibit({ sensitive: true });
    const size = (address: string): string | null =>
      new URL(address, 'http://host').searchParams.get('size');
    expect(size(uploads.pictureAddress(caseId, sensitive, testFile(), true))).toBe(
      'thumbnail-blurred',
    );
    expect(size(uploads.pictureAddress(caseId, sensitive, testFile(), false))).toBe('thumbnail');
    expect(size(uploads.pictureAddress(caseId, testExhibit(), testFile(), true))).toBe('thumbnail');
  });
});
